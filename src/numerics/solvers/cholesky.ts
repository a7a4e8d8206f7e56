import { NotConvergedError } from '../types';

/**
 * In-place Cholesky factor of a dense symmetric positive definite matrix, row-major lower triangle: A = G Gᵀ.
 * @returns log |A|
 * @throws NotConvergedError when a pivot is not positive
 */
export function cholesky(a: Float64Array, n: number): number {
  let logDeterminant = 0;
  for (let j = 0; j < n; j++) {
    const rowJ = j * n;
    for (let i = 0; i < j; i++) {
      // Row j against the finished row i: both run along memory.
      const rowI = i * n;
      let sum = a[rowJ + i]!;
      for (let k = 0; k < i; k++) sum -= a[rowJ + k]! * a[rowI + k]!;
      a[rowJ + i] = sum / a[rowI + i]!;
    }
    let pivot = a[rowJ + j]!;
    for (let k = 0; k < j; k++) pivot -= a[rowJ + k]! * a[rowJ + k]!;
    if (!(pivot > 0)) throw new NotConvergedError('A matrix that must be positive definite is not.', pivot);
    a[rowJ + j] = Math.sqrt(pivot);
    logDeterminant += Math.log(pivot);
  }
  return logDeterminant;
}

/** Solves G Gᵀ x = b in place. */
export function choleskySolve(g: Float64Array, n: number, b: Float64Array): void {
  for (let i = 0; i < n; i++) {
    let sum = b[i]!;
    for (let k = 0; k < i; k++) sum -= g[i * n + k]! * b[k]!;
    b[i] = sum / g[i * n + i]!;
  }
  for (let i = n - 1; i >= 0; i--) {
    b[i]! /= g[i * n + i]!;
    for (let k = 0; k < i; k++) b[k]! -= g[i * n + k]! * b[i]!;
  }
}
