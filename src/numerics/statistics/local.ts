import { benjaminiHochberg } from './false-discovery';
import { twoSidedP } from './normal';
import { rowStandardised, weightUnit, type ObservedTies } from './weights';

/** Codes of `quadrant`: own deviation, then the neighbours'. 0 where undefined. */
export const QUADRANTS = [null, 'HH', 'LL', 'HL', 'LH'] as const;

/** Of each member; I and its moments are NaN for members without a value. */
export interface LocalMoran {
  readonly I: Float64Array;
  readonly expectation: Float64Array;
  readonly variance: Float64Array;
  /** NaN also where there is nothing to test: at the mean, without an observed neighbour, or tied alike to everyone. */
  readonly z: Float64Array;
  /** Two-sided normal p and its Benjamini–Hochberg q; NaN where z is. */
  readonly p: Float64Array;
  readonly q: Float64Array;
  /** Place in QUADRANTS. */
  readonly quadrant: Uint8Array;
}

/**
 * Local Moran I_i = z_i Σ_j w_ij z_j / m₂, m₂ = Σz²/n (Anselin 1995), with moments under conditional
 * randomisation (Sokal, Oden & Thomson 1998), two-sided normal p, and q by Benjamini & Hochberg.
 * @param total members of the network; entries of members that did not enter are NaN
 * @param style `row`: weights divided by their row's sum; `raw`: as they are, I in their unit
 */
export function localMoran(ties: ObservedTies, total: number, style: 'row' | 'raw' = 'row'): LocalMoran {
  const unit = style === 'row' ? 1 : weightUnit(ties.weights);
  const w = style === 'row' ? rowStandardised(ties) : ties.weights.map((one) => one / unit);
  const { n, z, squares } = ties;
  const m2 = squares / n;
  const nan = (): Float64Array => new Float64Array(total).fill(NaN);
  const out = {
    I: nan(),
    expectation: nan(),
    variance: nan(),
    z: nan(),
    p: nan(),
    quadrant: new Uint8Array(total),
  };
  for (let i = 0; i < n; i++) {
    let lag = 0;
    let sum = 0;
    let sumSquares = 0;
    for (let k = ties.offsets[i]!; k < ties.offsets[i + 1]!; k++) {
      lag += w[k]! * z[ties.targets[k]!]!;
      sum += w[k]!;
      sumSquares += w[k]! * w[k]!;
    }
    const own = z[i]!;
    const member = ties.members[i]!;
    const value = (own * lag) / m2;
    const expectation = (-sum * own * own) / ((n - 1) * m2);
    // Var = (z_i/m₂)² · n/(n−2) · (Σw² − (Σw)²/(n−1)) · (m₂ − z_i²/(n−1))
    const variance =
      (own / m2) ** 2 * (n / (n - 2)) * (sumSquares - (sum * sum) / (n - 1)) * (m2 - (own * own) / (n - 1));
    out.I[member] = value * unit;
    out.expectation[member] = expectation * unit;
    out.variance[member] = Math.max(0, variance) * unit * unit;
    // A member at the mean, or tied to everyone: the neighbours cannot be drawn otherwise, so there is no test.
    const spread = sumSquares - (sum * sum) / (n - 1);
    const testable = spread > 1e-12 * sumSquares && sum > 0 && own !== 0 && variance > 0;
    const score = testable ? (value - expectation) / Math.sqrt(variance) : NaN;
    out.z[member] = score;
    if (testable) out.p[member] = twoSidedP(score);
    // Without observed neighbours I is 0 by its formula, and there is no quadrant.
    if (sum > 0) out.quadrant[member] = own >= 0 ? (lag >= 0 ? 1 : 3) : lag < 0 ? 2 : 4;
  }
  return { ...out, q: benjaminiHochberg(out.p) };
}
