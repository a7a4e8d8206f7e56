export { cholesky, choleskySolve } from './cholesky';
export { ShiftedSystems, type SolveOptions, type SolveResult } from './shifted-systems';
