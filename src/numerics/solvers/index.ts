export { cholesky, choleskySolve } from './cholesky';
export { solveShifted, type SolveResult } from './conjugate-gradient';
