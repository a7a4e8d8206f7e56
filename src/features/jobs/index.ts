export { acceptedSchema, jobOperations, jobSchema, type JobView } from './jobs';
