export { groupingOperations } from './operations';
export {
  CUTS,
  LAPLACIANS,
  METHODS,
  MOST_GROUPS,
  seedSchema,
  type Boundary,
  type Comparison,
  type Group,
  type GroupingMemberView,
  type GroupingResult,
  type GroupingSummary,
  type GroupingView,
  type MakeGrouping,
} from './groupings';
