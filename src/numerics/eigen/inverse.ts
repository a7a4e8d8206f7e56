import type { LaplacianOperator } from '../operators';
import type { Random } from '../random';
import { NotConvergedError } from '../types';
import { factoriseLaplacian, type LaplacianFactor } from './elimination';
import { Krylov } from './krylov';
import type { Pairs } from './rayleigh-ritz';
import { axpy, norm, randomUnit } from './vectors';

/**
 * The pseudo-inverse of a Laplacian through a factorisation, for networks with so small a gap that polynomials
 * of the Laplacian converge slowly. Null for the regularised kind (its gap is never small) and where the factor
 * would grow too large.
 */
export function pseudoInverse(op: LaplacianOperator): ((x: Float64Array, out: Float64Array) => void) | null {
  if (op.kind === 'regularised') return null;
  const { network, scale, n } = op;
  const factor: LaplacianFactor | null = factoriseLaplacian(
    network,
    4e7 + 100 * (network.targets.length + n),
  );
  if (factor === null) return null;
  return (x, out) => {
    // 𝓛 = S L S with S = D^{-1/2}, so 𝓛 z = b is solved by z = S⁻¹ L⁺ S⁻¹ b, up to the null vector.
    let sum = 0;
    for (let i = 0; i < n; i++) {
      out[i] = x[i]! / scale[i]!;
      sum += out[i]!;
    }
    // Rounding only: x is orthogonal to the null vector, so the sum is 0 but for the last bits.
    for (let i = 0; i < n; i++) out[i]! -= sum / n;
    factor.solve(out, out);
    for (let i = 0; i < n; i++) out[i]! /= scale[i]!;
  };
}

const relativeAccuracy = 1e-11;

/**
 * Smallest pairs by thick-restart Lanczos on the pseudo-inverse, whose largest eigenvalues are wanted. λ is taken as
 * 1/μ, which keeps the digits of tiny values; residuals are those of the operator itself.
 *
 * @param above when given, stop as soon as the smallest is seen to lie above it (empty result)
 */
export function inversePairs(
  op: LaplacianOperator,
  solve: (x: Float64Array, out: Float64Array) => void,
  count: number,
  outside: readonly Float64Array[],
  above: number | null,
  random: Random,
  look: () => void,
): Pairs {
  const capacity = Math.min(op.n - outside.length, Math.max(30, 2 * count + 10));
  const keep = Math.min(capacity - 2, count + Math.floor(0.4 * (capacity - count)));
  const krylov = new Krylov(op.n, capacity, outside, random);
  krylov.begin(randomUnit(op.n, random, outside));
  for (let cycle = 0; cycle < 200; cycle++) {
    while (!krylov.full) {
      krylov.step(solve);
      look();
      if (krylov.size < count || (krylov.size % 3 !== 0 && !krylov.full)) continue;
      const ritz = krylov.ritz();
      const exhausted = krylov.size + outside.length >= op.n;
      let settled = true;
      for (let i = 0; i < count; i++) settled &&= ritz.residuals[i]! <= relativeAccuracy * ritz.values[i]!;
      if (above !== null && krylov.size >= 12 && (ritz.values[0]! + ritz.residuals[0]!) * above < 1) {
        return { values: [], vectors: [], residuals: [] };
      }
      if (settled || exhausted) return measured(op, krylov, ritz, count);
    }
    krylov.restart(keep, krylov.ritz());
  }
  throw new NotConvergedError('The inverse iteration did not settle.', NaN);
}

function measured(
  op: LaplacianOperator,
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
    const value = 1 / ritz.values[i]!;
    op.multiply(x, r);
    axpy(-value, x, r);
    values.push(value);
    vectors.push(x);
    residuals.push(norm(r));
  }
  return { values, vectors, residuals };
}
