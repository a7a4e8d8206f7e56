export { enqueue, type NewJob } from './enqueue';
export type { JobContext, JobHandler, JobKind, JobRegistry } from './context';
export { runJob } from './run-job';
export { startWorker, sweep } from './worker-process';
