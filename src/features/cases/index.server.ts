export { getCase } from './case.server';
export { listCases } from './list.server';
export { openCases } from './open.server';
export { queueFor } from './queue.server';
export { addNote, changeCase, decideCase, reopenCase } from './work.server';
