import type { Operator } from '../operators';
import { symmetricEigen } from './dense';
import { addCombination, axpy, dot, norm, orthogonalise, scale } from './vectors';

export interface Pairs {
  /** Ascending. */
  readonly values: number[];
  /** Orthonormal. */
  readonly vectors: Float64Array[];
  /** ‖A x − λ x‖₂ of each. */
  readonly residuals: number[];
}

/**
 * The best eigenpairs of A within a space (Rayleigh–Ritz), with true residuals.
 * @param span linearly independent vectors; made orthonormal here, and orthogonal to `outside`
 */
export function rayleighRitz(op: Operator, span: Float64Array[], outside: readonly Float64Array[]): Pairs {
  const k = span.length;
  for (let i = 0; i < k; i++) {
    const others = [...outside, ...span.slice(0, i)];
    orthogonalise(span[i]!, others);
    scale(span[i]!, 1 / norm(span[i]!));
  }
  const images = span.map((x) => {
    const out = new Float64Array(op.n);
    op.multiply(x, out);
    return out;
  });
  const g = new Float64Array(k * k);
  for (let i = 0; i < k; i++)
    for (let j = i; j < k; j++) g[i * k + j] = g[j * k + i] = dot(span[i]!, images[j]!);
  const eigen = symmetricEigen(g, k);
  const values = Array.from(eigen.values);
  const vectors: Float64Array[] = [];
  const residuals: number[] = [];
  const r = new Float64Array(op.n);
  for (let l = 0; l < k; l++) {
    const row = eigen.vectors.subarray(l * k, (l + 1) * k);
    const x = new Float64Array(op.n);
    addCombination(span, k, row, 1, x);
    r.fill(0);
    addCombination(images, k, row, 1, r);
    axpy(-values[l]!, x, r);
    vectors.push(x);
    residuals.push(norm(r));
  }
  return { values, vectors, residuals };
}
