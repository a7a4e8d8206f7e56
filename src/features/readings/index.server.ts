export { exportReading } from './export.server';
export { readingEnded, readingJob } from './job.server';
export { makeReading } from './make.server';
export { readingMembers } from './members.server';
export { getReading, listReadings } from './read.server';
