export { FilterChips, fieldTitle, filterWords } from './FilterChips';
export { SavedViews } from './SavedViews';
export { useViewState, type StateControl } from './use-view-state';
