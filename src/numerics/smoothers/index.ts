export { EXACT_UP_TO, smooth, type Smoothing, type Strength } from './smooth';
export type { Fit, Problem } from './model';
