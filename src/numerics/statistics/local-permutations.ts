import { createRandom } from '../random';
import { CancelledError, type Watch } from '../types';
import { rowStandardised, type ObservedTies } from './weights';

/** Conditional-permutation p of local Moran by the +1 rule; NaN for members without an observed neighbour. */
export interface LocalPermutations {
  /** Of an I as large, as small, the smaller of both, and twice that, at most 1. */
  readonly greater: Float64Array;
  readonly less: Float64Array;
  readonly folded: Float64Array;
  readonly twoSided: Float64Array;
}

/**
 * Local Moran under conditional randomisation (Anselin 1995): a member's own value stays, the neighbours' values are
 * drawn from all others. One seeded permutation serves all members: the first d of its values are the draw of a member
 * with d neighbours, and where they hold the member's own value, the next one stands in for it, which leaves a uniform
 * draw without replacement. Rows of equal weights need only the running sums of the permutation.
 *
 * @param total members of the network; results are in their order
 */
export function localPermutations(
  ties: ObservedTies,
  total: number,
  permutations: number,
  seed: number,
  style: 'row' | 'raw' = 'row',
  watch?: Watch,
): LocalPermutations {
  const w = style === 'row' ? rowStandardised(ties) : ties.weights;
  const { n, z, offsets } = ties;
  const rows = summarise(ties, w);
  const random = createRandom(seed);
  const order = Int32Array.from({ length: n }, (_, i) => i);
  const place = Int32Array.from(order);
  const drawn = Math.min(n, rows.most + 1);
  const value = new Float64Array(drawn);
  const running = new Float64Array(drawn + 1);
  const above = new Int32Array(n);
  const below = new Int32Array(n);
  for (let round = 0; round < permutations; round++) {
    if (round % 16 === 0) {
      if (watch?.cancelled?.()) throw new CancelledError();
      watch?.progress?.(round / permutations, 'Shuffling neighbours’ scores');
    }
    for (let a = 0; a < drawn; a++) {
      const b = a + random.int(n - a);
      const [first, second] = [order[a]!, order[b]!];
      order[a] = second;
      order[b] = first;
      place[second] = a;
      place[first] = b;
      value[a] = z[second]!;
      running[a + 1] = running[a]! + value[a]!;
    }
    for (let i = 0; i < n; i++) {
      const from = offsets[i]!;
      const d = offsets[i + 1]! - from;
      if (d === 0) continue;
      const own = place[i]!;
      let lag = 0;
      if (rows.even[i] === 1) {
        lag = running[d]!;
        if (own < d) lag += value[d]! - z[i]!;
        lag *= w[from]!;
      } else {
        for (let k = 0; k < d; k++) lag += w[from + k]! * value[k]!;
        if (own < d) lag += w[from + own]! * (value[d]! - z[i]!);
      }
      // Equal draws count for both sides; sums in another order may differ by rounding.
      const step = z[i]! * (lag - rows.lag[i]!);
      const rounding = 1e-11 * Math.abs(z[i]!) * rows.scale[i]!;
      if (step >= -rounding) above[i]!++;
      if (step <= rounding) below[i]!++;
    }
  }
  const p = (count: (i: number) => number): Float64Array => {
    const out = new Float64Array(total).fill(NaN);
    ties.members.forEach((member, i) => {
      if (offsets[i + 1]! > offsets[i]!) out[member] = count(i);
    });
    return out;
  };
  const share = (count: number): number => (1 + count) / (1 + permutations);
  const smaller = (i: number): number => share(Math.min(above[i]!, below[i]!));
  return {
    greater: p((i) => share(above[i]!)),
    less: p((i) => share(below[i]!)),
    folded: p(smaller),
    twoSided: p((i) => Math.min(1, 2 * smaller(i))),
  };
}

/** Of each row: the observed lag, the size of its terms, and whether all weights are equal; and the most neighbours. */
function summarise(ties: ObservedTies, w: Float64Array) {
  const { n, z, offsets, targets } = ties;
  const lag = new Float64Array(n);
  const scale = new Float64Array(n);
  const even = new Uint8Array(n).fill(1);
  const widest = z.reduce((most, one) => Math.max(most, Math.abs(one)), 0);
  let most = 0;
  for (let i = 0; i < n; i++) {
    const from = offsets[i]!;
    most = Math.max(most, offsets[i + 1]! - from);
    for (let k = from; k < offsets[i + 1]!; k++) {
      lag[i]! += w[k]! * z[targets[k]!]!;
      scale[i]! += w[k]! * widest;
      if (w[k] !== w[from]) even[i] = 0;
    }
  }
  return { lag, scale, even, most };
}
