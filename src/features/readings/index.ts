export { readingFilterSchema, type ReadingFilter } from './filter';
export { readingOperations } from './operations';
export type { MakeReading, ReadingLine, ReadingMemberView, ReadingView, Warp } from './readings';
export { filterWords, THRESHOLD } from './words';
