/** The door of the numerical core: pure functions over typed arrays, no input or output. */
export * from './types';
export { createRandom, type Random } from './random';
export * from './network';
export * from './operators';
export * from './eigen';
export * from './groupings';
export * from './statistics';
export * from './solvers';
export * from './smoothers';
export * from './filters';
export * from './reading';
