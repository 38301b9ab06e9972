// A worker whose entry is TypeScript, for development and tests: a thread does not take over its parent's loader.
import { workerData } from 'node:worker_threads';
import { register } from 'tsx/esm/api';

register();
await import(workerData.entry);
