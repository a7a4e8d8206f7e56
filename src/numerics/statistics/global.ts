import { createRandom } from '../random';
import type { Watch } from '../types';
import { CancelledError } from '../types';
import { twoSidedP } from './normal';
import { rowStandardised, weightUnit, type ObservedTies } from './weights';

export interface GlobalStatistic {
  readonly value: number;
  readonly expectation: number;
  /** Under randomisation; 0 where no order of the values would change the statistic, as on a complete network. */
  readonly variance: number;
  /** Positive when neighbours are alike, for Moran and for Geary; NaN where the variance is 0. */
  readonly z: number;
  /** Two-sided; NaN where the variance is 0. */
  readonly p: number;
  /** Seeded permutations with the +1 rule; NaN without permutations. */
  readonly permutationP: number;
  readonly n: number;
}

export interface GlobalStatistics {
  readonly moran: GlobalStatistic;
  readonly geary: GlobalStatistic;
}

/** S₀, S₁, S₂ of Cliff & Ord 1981, and the kurtosis of the values. */
function sums(ties: ObservedTies, w: Float64Array): { s0: number; s1: number; s2: number; b2: number } {
  const { n, offsets, targets } = ties;
  const rows = new Float64Array(n);
  const columns = new Float64Array(n);
  let s0 = 0;
  for (let i = 0; i < n; i++)
    for (let k = offsets[i]!; k < offsets[i + 1]!; k++) {
      s0 += w[k]!;
      rows[i]! += w[k]!;
      columns[targets[k]!]! += w[k]!;
    }
  let s1 = 0;
  // Rows are ascending and every tie stands in both, so the ties back to i come up in each row in turn.
  const back = offsets.slice(0, n);
  for (let i = 0; i < n; i++)
    for (let k = offsets[i]!; k < offsets[i + 1]!; k++) s1 += (w[k]! + w[back[targets[k]!]!++]!) ** 2 / 2;
  let s2 = 0;
  for (let i = 0; i < n; i++) s2 += (rows[i]! + columns[i]!) ** 2;
  const m2 = ties.squares / n;
  const m4 = ties.z.reduce((sum, one) => sum + one ** 4, 0) / n;
  return { s0, s1, s2, b2: m4 / (m2 * m2) };
}

function moranOf(ties: ObservedTies, w: Float64Array, z: Float64Array, s0: number): number {
  let cross = 0;
  for (let i = 0; i < ties.n; i++) {
    let lag = 0;
    for (let k = ties.offsets[i]!; k < ties.offsets[i + 1]!; k++) lag += w[k]! * z[ties.targets[k]!]!;
    cross += z[i]! * lag;
  }
  return ((ties.entered / s0) * cross) / ties.squares;
}

function gearyOf(ties: ObservedTies, w: Float64Array, z: Float64Array, s0: number): number {
  let differences = 0;
  for (let i = 0; i < ties.n; i++)
    for (let k = ties.offsets[i]!; k < ties.offsets[i + 1]!; k++)
      differences += w[k]! * (z[i]! - z[ties.targets[k]!]!) ** 2;
  return ((ties.entered - 1) * differences) / (2 * s0 * ties.squares);
}

/**
 * Moran's I and Geary's C with their moments under randomisation (Cliff & Ord 1981) and a seeded permutation p.
 * @param style `row`: weights divided by their row's sum; `raw`: as they are
 * @param permutations 0 or more shuffles of the values over the members
 */
export function globalStatistics(
  ties: ObservedTies,
  style: 'row' | 'raw',
  permutations: number,
  seed: number,
  watch?: Watch,
): GlobalStatistics {
  const unit = weightUnit(ties.weights);
  const w = style === 'row' ? rowStandardised(ties) : ties.weights.map((one) => one / unit);
  const n = ties.entered;
  const { s0, s1, s2, b2 } = sums(ties, w);
  const moran = moranOf(ties, w, ties.z, s0);
  const geary = gearyOf(ties, w, ties.z, s0);
  const expectation = -1 / (n - 1);
  const first =
    n * ((n * n - 3 * n + 3) * s1 - n * s2 + 3 * s0 * s0) -
    b2 * ((n * n - n) * s1 - 2 * n * s2 + 6 * s0 * s0);
  const second = first / ((n - 1) * (n - 2) * (n - 3) * s0 * s0);
  const moranVariance = beyondRounding(second - expectation ** 2, second);
  const gearyTerms = [
    (n - 1) * s1 * (n * n - 3 * n + 3 - (n - 1) * b2),
    -0.25 * (n - 1) * s2 * (n * n + 3 * n - 6 - (n * n - n + 2) * b2),
    s0 * s0 * (n * n - 3 - (n - 1) ** 2 * b2),
  ].map((term) => term / (n * (n - 2) * (n - 3) * s0 * s0));
  const gearyVariance = beyondRounding(
    gearyTerms.reduce((sum, term) => sum + term, 0),
    gearyTerms.reduce((sum, term) => sum + Math.abs(term), 0),
  );
  const { moranP, gearyP } = permuted(ties, w, s0, moran - expectation, geary - 1, permutations, seed, watch);
  const z = moranVariance > 0 ? (moran - expectation) / Math.sqrt(moranVariance) : NaN;
  const gearyZ = gearyVariance > 0 ? (1 - geary) / Math.sqrt(gearyVariance) : NaN;
  return {
    moran: {
      value: moran,
      expectation,
      variance: moranVariance,
      z,
      p: twoSidedP(z),
      permutationP: moranP,
      n,
    },
    geary: {
      value: geary,
      expectation: 1,
      variance: gearyVariance,
      z: gearyZ,
      p: twoSidedP(gearyZ),
      permutationP: gearyP,
      n,
    },
  };
}

/** A variance that was left by terms of the given size; 0 where it is their rounding. */
const beyondRounding = (variance: number, size: number): number =>
  variance > 1e-12 * Math.abs(size) ? variance : 0;

function permuted(
  ties: ObservedTies,
  w: Float64Array,
  s0: number,
  moran: number,
  geary: number,
  permutations: number,
  seed: number,
  watch?: Watch,
): { moranP: number; gearyP: number } {
  if (permutations === 0) return { moranP: NaN, gearyP: NaN };
  const random = createRandom(seed);
  const z = Float64Array.from(ties.z);
  // Equal orders count; where all are, as on a complete network, both sides are rounding.
  let moranBeyond = 0;
  let gearyBeyond = 0;
  for (let round = 0; round < permutations; round++) {
    if (round % 16 === 0 && watch?.cancelled?.()) throw new CancelledError();
    random.shuffle(z);
    if (Math.abs(moranOf(ties, w, z, s0) + 1 / (ties.entered - 1)) >= Math.abs(moran) * (1 - 1e-12) - 1e-13)
      moranBeyond++;
    if (Math.abs(gearyOf(ties, w, z, s0) - 1) >= Math.abs(geary) * (1 - 1e-12) - 1e-13) gearyBeyond++;
  }
  return { moranP: (1 + moranBeyond) / (1 + permutations), gearyP: (1 + gearyBeyond) / (1 + permutations) };
}
