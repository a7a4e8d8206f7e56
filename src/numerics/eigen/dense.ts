import { CancelledError, type Watch } from '../types';
import { tridiagonalEigen } from './tridiagonal';

export interface DenseEigen {
  /** Eigenvalues, ascending, length n. */
  readonly values: Float64Array;
  /** Row l is the unit eigenvector of values[l]; row-major n × n. */
  readonly vectors: Float64Array;
}

/**
 * Full decomposition of a dense symmetric matrix: Householder reduction to tridiagonal form, then implicit QL
 * (Wilkinson & Reinsch 1971, contributions II/2 and II/3), on flat arrays walked along rows only.
 * About 7 n³ operations; memory 2 n² numbers.
 *
 * @param a n × n row-major, symmetric; destroyed
 */
export function symmetricEigen(a: Float64Array, n: number, watch?: Watch): DenseEigen {
  const look = (done: number): void => {
    if (watch?.cancelled?.()) throw new CancelledError();
    watch?.progress?.(done, 'Full decomposition');
  };
  const d = new Float64Array(n);
  const e = new Float64Array(n);
  const taus = new Float64Array(n);
  reduce(a, n, d, e, taus, (k) => (k % 32 === 0 ? look((0.3 * k) / n) : undefined));
  const z = accumulate(a, n, taus);
  look(0.45);
  tridiagonalEigen(d, e, z, n, (found) => (found % 16 === 0 ? look(0.45 + (0.55 * found) / n) : undefined));
  return sorted(d, z, n);
}

/**
 * Reduction A = Q T Qᵀ by reflectors H_k = I − τ v vᵀ that act on k + 1…n − 1; v is left in row k of `a`
 * (columns k + 1…), with v[k + 1] = 1 stored explicitly.
 */
function reduce(
  a: Float64Array,
  n: number,
  d: Float64Array,
  e: Float64Array,
  taus: Float64Array,
  step: (k: number) => void,
): void {
  const p = new Float64Array(n);
  const v = new Float64Array(n);
  for (let k = 0; k < n - 1; k++) {
    step(k);
    const row = k * n;
    d[k] = a[row + k]!;
    let largest = 0;
    for (let j = k + 2; j < n; j++) largest = Math.max(largest, Math.abs(a[row + j]!));
    const alpha = a[row + k + 1]!;
    if (largest === 0) {
      e[k] = alpha;
      taus[k] = 0;
      continue;
    }
    const unit = Math.max(largest, Math.abs(alpha));
    let sum = 0;
    for (let j = k + 1; j < n; j++) sum += (a[row + j]! / unit) ** 2;
    const beta = (alpha > 0 ? -1 : 1) * unit * Math.sqrt(sum);
    const tau = (beta - alpha) / beta;
    const inverse = 1 / (alpha - beta);
    v[k + 1] = 1;
    for (let j = k + 2; j < n; j++) v[j] = a[row + j]! * inverse;
    for (let j = k + 1; j < n; j++) a[row + j] = v[j]!;
    e[k] = beta;
    taus[k] = tau;
    // p = τ A v over the trailing block, from its upper triangle only.
    p.fill(0, k + 1);
    for (let i = k + 1; i < n; i++) {
      const at = i * n;
      const vi = v[i]!;
      let dot = a[at + i]! * vi;
      for (let j = i + 1; j < n; j++) {
        const value = a[at + j]!;
        dot += value * v[j]!;
        p[j]! += value * vi;
      }
      p[i]! += dot;
    }
    let pv = 0;
    for (let i = k + 1; i < n; i++) {
      p[i]! *= tau;
      pv += p[i]! * v[i]!;
    }
    const half = 0.5 * tau * pv;
    for (let i = k + 1; i < n; i++) p[i]! -= half * v[i]!;
    for (let i = k + 1; i < n; i++) {
      const at = i * n;
      const vi = v[i]!;
      const pi = p[i]!;
      for (let j = i; j < n; j++) a[at + j]! -= vi * p[j]! + pi * v[j]!;
    }
  }
  if (n > 0) d[n - 1] = a[n * n - 1]!;
}

/** Rows of Qᵀ, where Q = H_0 H_1 … H_{n−2}: column j of Q is row j of the result. */
function accumulate(a: Float64Array, n: number, taus: Float64Array): Float64Array {
  const z = new Float64Array(n * n);
  for (let i = 0; i < n; i++) z[i * n + i] = 1;
  // Qᵀ = H_{n−2} … H_0; Q is built from the last reflector outwards, so that only the trailing block is touched:
  // Q ← H_k Q, whose columns (our rows) change by −τ v (vᵀ column).
  for (let k = n - 2; k >= 0; k--) {
    const tau = taus[k]!;
    if (tau === 0) continue;
    const v = k * n;
    for (let r = k + 1; r < n; r++) {
      const row = r * n;
      let dot = 0;
      for (let j = k + 1; j < n; j++) dot += a[v + j]! * z[row + j]!;
      dot *= tau;
      for (let j = k + 1; j < n; j++) z[row + j]! -= dot * a[v + j]!;
    }
  }
  return z;
}

function sorted(d: Float64Array, z: Float64Array, n: number): DenseEigen {
  const order = Array.from({ length: n }, (_, i) => i).sort((x, y) => d[x]! - d[y]! || x - y);
  const values = new Float64Array(n);
  const vectors = new Float64Array(n * n);
  for (let l = 0; l < n; l++) {
    const from = order[l]! * n;
    values[l] = d[order[l]!]!;
    vectors.set(z.subarray(from, from + n), l * n);
  }
  return { values, vectors };
}
