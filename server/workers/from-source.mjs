// For runs from the sources: a thread does not inherit the loader of TypeScript, so it registers it first.
import { workerData } from 'node:worker_threads';
import { register } from 'tsx/esm/api';

register();
await import(workerData.entry);
