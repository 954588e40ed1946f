// Plain JavaScript, since Node cannot start a TypeScript file as a worker thread: loads the real entry through tsx.
import { workerData } from 'node:worker_threads';
import { tsImport } from 'tsx/esm/api';

await tsImport(workerData.entry, import.meta.url);
