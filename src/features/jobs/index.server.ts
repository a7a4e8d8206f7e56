export { cancelJob, jobEvents, jobFor, presentJob } from './jobs.server';
