export {
  laplacianOperator,
  matrixBytes,
  meanStrength,
  type LaplacianOperator,
  type Operator,
} from './laplacian';
export { advance8, direct8, WIDTH } from './eight';
