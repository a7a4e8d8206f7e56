export { exportGrouping } from './export.server';
export { groupingEnded, groupingJob } from './job.server';
export { makeGrouping } from './make.server';
export { changeGrouping, compareGrouping, getGrouping, groupingMembers, listGroupings } from './read.server';
export { smootherGroups } from './smoother.server';
