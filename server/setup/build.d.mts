/** Builds `dist/NAME` unless it is there, from the sources as they are. */
export function ensureBuilt(name: 'client' | 'server' | 'cli'): Promise<void>;
