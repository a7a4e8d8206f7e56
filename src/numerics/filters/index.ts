export { applyFilter, checkFilter, type ChosenFilter, type Filtered } from './chosen';
