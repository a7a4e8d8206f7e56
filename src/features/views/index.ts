export {
  colourSchema,
  fieldSchema,
  fieldsOf,
  filterSchema,
  filtersSchema,
  stateFromQuery,
  stateToQuery,
  viewStateSchema,
  type Colour,
  type Filter,
  type ViewState,
} from './state';
export { viewOperations, type Comment, type SavedView, type Share } from './views';
export {
  colourField,
  colourTitle,
  type ExploreAttribute,
  type ExploreGroup,
  type ExploreGrouping,
  type ExploreProps,
  type ExploreReading,
} from './explore';
