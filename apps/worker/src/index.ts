export { ComputeWorker, type WorkerOptions } from './worker.ts';
