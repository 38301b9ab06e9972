export * from './audit.ts';
export * from './library.ts';
export * from './mail.ts';
export * from './rate-limits.ts';
export * from './sessions.ts';
export * from './teams.ts';
export * from './users.ts';
