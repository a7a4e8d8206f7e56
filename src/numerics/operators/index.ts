export {
  laplacianOperator,
  matrixBytes,
  meanStrength,
  type LaplacianOperator,
  type Operator,
} from './laplacian';
