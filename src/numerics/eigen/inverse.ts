import type { LaplacianOperator } from '../operators';
import type { Random } from '../random';
import { NotConvergedError } from '../types';
import { factoriseLaplacian, type LaplacianFactor } from './elimination';
import { Krylov } from './krylov';
import type { Pairs } from './rayleigh-ritz';
import type { Supply } from './supply';
import { axpy, norm, randomUnit } from './vectors';

/** out = (A − shift)⁻¹ x on the complement of the null vector of A. */
export interface Inverse {
  readonly shift: number;
  solve(x: Float64Array, out: Float64Array): void;
}

/**
 * The inverse of a Laplacian on the complement of its null vector, through a factorisation, for networks with so small
 * a gap that polynomials of the Laplacian converge slowly. Null where the factor would grow too large.
 *
 * The regularised kind is shifted by just under σ = min τ/(d_i + τ), the largest shift that keeps
 * `L + τI − σD_τ` a Laplacian plus a diagonal that is not negative; all its eigenvalues but 0 lie above σ.
 */
export function shiftedInverse(op: LaplacianOperator): Inverse | null {
  const { network, scale, n, tau } = op;
  const budget = Math.min(2e9, 4000 * (network.targets.length + n));
  if (op.kind !== 'regularised') {
    const factor = factoriseLaplacian(network, null, budget);
    return factor && { shift: 0, solve: (x, out) => solveCentred(factor, scale, x, out) };
  }
  let largest = 0;
  for (const d of network.strength) largest = Math.max(largest, d);
  const shift = (tau / (largest + tau)) * (1 - 1e-9);
  const ground = network.strength.map((d) => tau - shift * (d + tau));
  const factor = factoriseLaplacian(network, ground, budget);
  if (factor === null) return null;
  // The rank-one part only matters along one direction, K⁻¹1, whose share makes the result orthogonal to the null vector.
  const ones = new Float64Array(n).fill(1);
  factor.solve(ones, ones);
  const weighed = (y: Float64Array): number =>
    y.reduce((sum, value, i) => sum + value * (network.strength[i]! + tau), 0);
  const whole = weighed(ones);
  return {
    shift,
    solve: (x, out) => {
      solveCentred(factor, scale, x, out);
      for (let i = 0; i < n; i++) out[i]! *= scale[i]!;
      const excess = weighed(out) / whole;
      for (let i = 0; i < n; i++) out[i] = (out[i]! - excess * ones[i]!) / scale[i]!;
    },
  };
}

/** S⁻¹ K⁻¹ S⁻¹ x with S = D^{-1/2}. S⁻¹x adds up to 0 as x is orthogonal to the null vector; rounding is taken off. */
function solveCentred(
  factor: LaplacianFactor,
  scale: Float64Array,
  x: Float64Array,
  out: Float64Array,
): void {
  const n = x.length;
  let sum = 0;
  for (let i = 0; i < n; i++) {
    out[i] = x[i]! / scale[i]!;
    sum += out[i]!;
  }
  for (let i = 0; i < n; i++) out[i]! -= sum / n;
  factor.solve(out, out);
  for (let i = 0; i < n; i++) out[i]! /= scale[i]!;
}

const relativeAccuracy = 1e-11;

/**
 * Smallest pairs by thick-restart Lanczos on the inverse, whose largest eigenvalues are wanted. λ is taken as
 * shift + 1/μ, which keeps the digits of tiny values; residuals are those of the operator itself.
 *
 * @param above when given, stop as soon as the smallest is seen to lie above it (empty result)
 */
export function inversePairs(
  op: LaplacianOperator,
  inverse: Inverse,
  count: number,
  outside: readonly Float64Array[],
  above: number | null,
  random: Random,
  supply: Supply,
  look: () => void,
): Pairs {
  const capacity = Math.min(op.n - outside.length, Math.max(30, 2 * count + 10));
  const keep = Math.min(capacity - 2, count + Math.floor(0.4 * (capacity - count)));
  const krylov = new Krylov(op.n, capacity, outside, random, supply);
  krylov.begin((start) => randomUnit(start, random, outside));
  for (let cycle = 0; cycle < 200; cycle++) {
    while (!krylov.full) {
      krylov.step(inverse.solve);
      look();
      if (krylov.size < count || (krylov.size % 3 !== 0 && !krylov.full)) continue;
      const ritz = krylov.ritz();
      const exhausted = krylov.size + outside.length >= op.n;
      let settled = true;
      for (let i = 0; i < count; i++) settled &&= ritz.residuals[i]! <= relativeAccuracy * ritz.values[i]!;
      if (
        above !== null &&
        krylov.size >= 12 &&
        (ritz.values[0]! + ritz.residuals[0]!) * (above - inverse.shift) < 1
      ) {
        krylov.release();
        return { values: [], vectors: [], residuals: [] };
      }
      if (!settled && !exhausted) continue;
      const pairs = measured(op, inverse.shift, krylov, ritz, count);
      krylov.release();
      return pairs;
    }
    krylov.restart(keep, krylov.ritz());
  }
  throw new NotConvergedError('The inverse iteration did not settle.', NaN);
}

function measured(
  op: LaplacianOperator,
  shift: number,
  krylov: Krylov,
  ritz: { values: Float64Array; rows: Float64Array },
  count: number,
): Pairs {
  const m = krylov.size;
  const values: number[] = [];
  const vectors: Float64Array[] = [];
  const residuals: number[] = [];
  const r = new Float64Array(op.n);
  for (let i = 0; i < count; i++) {
    const x = krylov.combination(ritz.rows.subarray(i * m, (i + 1) * m));
    const value = shift + 1 / ritz.values[i]!;
    op.multiply(x, r);
    axpy(-value, x, r);
    values.push(value);
    vectors.push(x);
    residuals.push(norm(r));
  }
  return { values, vectors, residuals };
}
