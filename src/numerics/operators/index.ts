export { laplacianOperator, meanStrength, type LaplacianOperator, type Operator } from './laplacian';
