import { fileURLToPath } from 'node:url';
import { join, resolve } from 'node:path';

/** The project's own folder, wherever it was cloned to. */
export const root = fileURLToPath(new URL('../..', import.meta.url)).replace(/\/$/, '');

/** Where everything private lives: the database, the secrets. `STEPWELL_DATA` moves it. */
export const dataFolder = resolve(root, process.env.STEPWELL_DATA || '.data');

export const inRoot = (...parts) => join(root, ...parts);
