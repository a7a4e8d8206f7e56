export { guessMemberColumns, guessRole, guessTieColumns } from './guess';
export {
  importOperations,
  importOptionsSchema,
  type ImportCounts,
  type ImportLimits,
  type ImportOptions,
  type ImportView,
} from './imports';
export { recipeOperations } from './recipes';
