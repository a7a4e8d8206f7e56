import { EigenvalueDecomposition, Matrix } from 'ml-matrix';

export interface PseudoInverse {
  /** Symmetric pseudo-inverse, g × g row-major. */
  readonly matrix: Float64Array;
  readonly rank: number;
  /** Logarithm of the product of the eigenvalues that are not null. */
  readonly logDeterminant: number;
}

/**
 * Pseudo-inverse of a small symmetric positive semi-definite matrix. Group levels and the free constants of the
 * components overlap, so a null direction is expected.
 */
export function pseudoInverse(a: Float64Array, g: number): PseudoInverse {
  if (g === 0) return { matrix: new Float64Array(), rank: 0, logDeterminant: 0 };
  const rows = Array.from({ length: g }, (_, i) => Array.from(a.subarray(i * g, (i + 1) * g)));
  const { realEigenvalues, eigenvectorMatrix } = new EigenvalueDecomposition(new Matrix(rows), {
    assumeSymmetric: true,
  });
  const most = Math.max(...realEigenvalues.map(Math.abs), 1e-300);
  const matrix = new Float64Array(g * g);
  let rank = 0;
  let logDeterminant = 0;
  realEigenvalues.forEach((value, k) => {
    if (value <= 1e-7 * most) return;
    rank++;
    logDeterminant += Math.log(value);
    for (let i = 0; i < g; i++)
      for (let j = 0; j < g; j++)
        matrix[i * g + j]! += (eigenvectorMatrix.get(i, k) * eigenvectorMatrix.get(j, k)) / value;
  });
  return { matrix, rank, logDeterminant };
}

/** vᵀ C v of a g × g matrix. */
export function quadraticForm(c: Float64Array, v: ArrayLike<number>): number {
  const g = v.length;
  let sum = 0;
  for (let i = 0; i < g; i++) for (let j = 0; j < g; j++) sum += v[i]! * c[i * g + j]! * v[j]!;
  return sum;
}

/** C v. */
export function times(c: Float64Array, v: ArrayLike<number>): Float64Array {
  const g = v.length;
  return Float64Array.from({ length: g }, (_, i) => {
    let sum = 0;
    for (let j = 0; j < g; j++) sum += c[i * g + j]! * v[j]!;
    return sum;
  });
}
