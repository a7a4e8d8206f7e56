export { guessMemberColumns, guessRole, guessTieColumns } from './guess';
export { importOperations, LIMITS, type ImportCounts, type ImportOptions, type ImportView } from './imports';
