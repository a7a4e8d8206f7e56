export { matchingMembers, memberColumn, memberHandles } from './columns.server';
export { memberCode } from './codes.server';
export { exportMembers } from './export/export.server';
export { memberDetail } from './detail.server';
export { memberRows } from './rows.server';
