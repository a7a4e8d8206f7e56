import type { Operator } from '../operators';
import { symmetricEigen } from './dense';
import type { Supply } from './supply';
import { axpy, dot, norm, orthogonalise, rotate, scale } from './vectors';

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
 * @param span linearly independent vectors; made orthonormal here, and orthogonal to `outside`; they become the result
 */
export function rayleighRitz(
  op: Operator,
  span: Float64Array[],
  outside: readonly Float64Array[],
  supply: Supply,
): Pairs {
  const k = span.length;
  for (let i = 0; i < k; i++) {
    const others = [...outside, ...span.slice(0, i)];
    orthogonalise(span[i]!, others);
    scale(span[i]!, 1 / norm(span[i]!));
  }
  const images = span.map((x) => {
    const out = supply.take();
    op.multiply(x, out);
    return out;
  });
  const g = new Float64Array(k * k);
  for (let i = 0; i < k; i++)
    for (let j = i; j < k; j++) g[i * k + j] = g[j * k + i] = dot(span[i]!, images[j]!);
  const eigen = symmetricEigen(g, k);
  const values = Array.from(eigen.values);
  rotate(span, k, k, eigen.vectors, supply);
  rotate(images, k, k, eigen.vectors, supply);
  const residuals = images.map((r, l) => {
    axpy(-values[l]!, span[l]!, r);
    return norm(r);
  });
  supply.give(...images);
  return { values, vectors: span, residuals };
}
