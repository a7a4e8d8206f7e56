export {
  combineVectors,
  maximumDense,
  nullVector,
  spectrum,
  type Spectrum,
  type SpectrumOptions,
} from './spectrum';
export { symmetricEigen, type DenseEigen } from './dense';
export { dot, fixSign, norm } from './vectors';
