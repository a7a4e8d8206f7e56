import { UnanswerableError, type Network } from '../types';

export type CutRule = 'sign' | 'median' | 'sweep';

export interface Sweep {
  /** Members in ascending order of the vector. */
  readonly order: Int32Array;
  /** conductance[p] of the first p + 1 members of the order against the rest; length n − 1. */
  readonly conductance: Float64Array;
  /** 1 where the values on both sides of the cut differ, so that cutting there is allowed; length n − 1. */
  readonly distinct: Uint8Array;
}

/** Values closer than this share of the largest magnitude count as equal; rounding must not split what symmetry ties. */
export function tieTolerance(vector: Float64Array, relative: number): number {
  let largest = 0;
  for (const value of vector) largest = Math.max(largest, Math.abs(value));
  return largest * relative;
}

/** Conductance of every prefix of the members ordered by `vector`, in O(m + n log n). */
export function sweep(net: Network, vector: Float64Array, tolerance: number): Sweep {
  const { n, offsets, targets, weights, strength } = net;
  const order = Int32Array.from({ length: n }, (_, i) => i).sort((a, b) => vector[a]! - vector[b]! || a - b);
  const rank = new Int32Array(n);
  for (let r = 0; r < n; r++) rank[order[r]!] = r;
  let total = 0;
  for (let i = 0; i < n; i++) total += strength[i]!;
  const conductance = new Float64Array(Math.max(0, n - 1));
  const distinct = new Uint8Array(Math.max(0, n - 1));
  let volume = 0;
  let cut = 0;
  for (let r = 0; r < n - 1; r++) {
    const i = order[r]!;
    for (let p = offsets[i]!; p < offsets[i + 1]!; p++)
      cut += rank[targets[p]!]! < r ? -weights[p]! : weights[p]!;
    volume += strength[i]!;
    const smaller = Math.min(volume, total - volume);
    conductance[r] = smaller > 0 ? Math.max(0, cut) / smaller : 1;
    distinct[r] = vector[order[r + 1]!]! - vector[i]! > tolerance ? 1 : 0;
  }
  return { order, conductance, distinct };
}

/**
 * Where to cut the order: the number of members in the lower part.
 * `sign`: below 0 (a member whose value is 0 within the tolerance goes with the upper part);
 * `median`: the allowed cut nearest to the middle; `sweep`: the lowest conductance. Of equally good cuts, as mirror
 * images are, the highest position is taken.
 * A part smaller than `minimumSize` is not allowed under `median` and `sweep`.
 *
 * @throws UnanswerableError `no-cut` when the rule allows none
 */
export function chooseCut(
  rule: CutRule,
  vector: Float64Array,
  swept: Sweep,
  minimumSize: number,
  tolerance: number,
): number {
  const n = vector.length;
  if (rule === 'sign') {
    let below = 0;
    for (let i = 0; i < n; i++) if (vector[i]! < -tolerance) below++;
    if (below > 0 && below < n) return below;
    throw new UnanswerableError(
      'no-cut',
      'All values of the vector have the same sign, so the sign rule splits nothing.',
    );
  }
  let best = -1;
  let score = Infinity;
  for (let r = 0; r < n - 1; r++) {
    const size = r + 1;
    if (swept.distinct[r] === 0 || size < minimumSize || n - size < minimumSize) continue;
    const cost = rule === 'median' ? Math.abs(2 * size - n) : swept.conductance[r]!;
    if (cost <= score * (1 + 1e-12)) {
      score = Math.min(score, cost);
      best = size;
    }
  }
  if (best < 0) {
    throw new UnanswerableError(
      'no-cut',
      `No cut leaves at least ${minimumSize} members on both sides without separating members with equal values.`,
    );
  }
  return best;
}
