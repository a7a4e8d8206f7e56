export { applyFilter, type ChosenFilter, type Filtered } from './chosen';
