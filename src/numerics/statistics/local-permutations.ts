import { createRandom, type Random } from '../random';
import { CancelledError, UnanswerableError, type Watch } from '../types';
import { rowStandardised, type ObservedTies } from './weights';

/** Conditional-permutation p of local Moran by the +1 rule; NaN for members without an observed neighbour. */
export interface LocalPermutations {
  /** Of an I as large, as small, the smaller of both, and twice that, at most 1. */
  readonly greater: Float64Array;
  readonly less: Float64Array;
  readonly folded: Float64Array;
  readonly twoSided: Float64Array;
}

/** Shuffles that are worked on in one pass over the ties. */
const TOGETHER = 8;

/**
 * Local Moran under conditional randomisation (Anselin 1995): a member's own value stays, the neighbours' values are
 * drawn from all others. One seeded permutation serves all members: the first d of its values are the draw of a member
 * with d neighbours, and where they hold the member's own value, the next one stands in for it, which leaves a uniform
 * draw without replacement.
 *
 * A member stands in its own draw in d of n permutations only, so all are counted as if none did, and those few are put
 * right. Rows of equal weights need only the running sum of the first d values: the sums of all permutations are sorted
 * once for every d, and a member's count is two searches. Other rows are added up, eight permutations in a pass.
 *
 * @param total members of the network; results are in their order
 * @param permutations P ≥ 1; O(P m / 8 passes) time for uneven weights, O(P · most neighbours + n log P) for equal ones
 * @param style `row`: weights divided by their row's sum; `raw`: as they are
 * @throws UnanswerableError `bad-permutations`
 */
export function localPermutations(
  ties: ObservedTies,
  total: number,
  permutations: number,
  seed: number,
  style: 'row' | 'raw' = 'row',
  watch?: Watch,
): LocalPermutations {
  if (!Number.isInteger(permutations) || permutations < 1)
    throw new UnanswerableError(
      'bad-permutations',
      'The number of shuffles must be a whole number of 1 or more.',
    );
  const rows = summarise(ties, style === 'row' ? rowStandardised(ties) : ties.weights);
  const random = createRandom(seed);
  const order = Int32Array.from({ length: ties.n }, (_, i) => i);
  for (let first = 0; first < permutations; first += TOGETHER) {
    if (watch?.cancelled?.()) throw new CancelledError();
    watch?.progress?.(first / permutations, 'Shuffling neighbours’ scores');
    const width = Math.min(TOGETHER, permutations - first);
    for (let lane = 0; lane < width; lane++) {
      draw(ties.z, order, random, rows, lane);
      for (const [d, sums] of rows.sums) sums.push(rows.running[d]!);
      putRight(ties, order, rows, lane);
    }
    for (let lane = width; lane < TOGETHER; lane++)
      for (let a = 0; a < rows.drawn; a++) rows.table[a * TOGETHER + lane] = NaN;
    countUneven(
      rows.uneven,
      ties.offsets,
      rows.w,
      rows.table,
      rows.low,
      rows.high,
      rows.atLeast,
      rows.atMost,
    );
  }
  countEven(ties, rows);
  return shares(ties, rows, total, permutations);
}

interface Rows {
  readonly w: Float64Array;
  /** 1 where all weights of a row are equal. */
  readonly even: Uint8Array;
  readonly uneven: Int32Array;
  /** The observed sum of a row's terms, less and more what rounding may do to it; without the weight on even rows. */
  readonly low: Float64Array;
  readonly high: Float64Array;
  /** Draws at or above low, and at or below high. */
  readonly atLeast: Int32Array;
  readonly atMost: Int32Array;
  /** Values that any member needs of a permutation. */
  readonly drawn: number;
  /** First values of the permutations at work, drawn × TOGETHER, and the running sums of the last one. */
  readonly table: Float64Array;
  readonly running: Float64Array;
  /** Running sums of the first d values, of every permutation, for each d of an even row. */
  readonly sums: Map<number, number[]>;
}

function summarise(ties: ObservedTies, w: Float64Array): Rows {
  const { n, z, offsets, targets } = ties;
  const low = new Float64Array(n);
  const high = new Float64Array(n);
  const even = new Uint8Array(n).fill(1);
  const sums = new Map<number, number[]>();
  const widest = z.reduce((most, one) => Math.max(most, Math.abs(one)), 0);
  let most = 0;
  for (let i = 0; i < n; i++) {
    const from = offsets[i]!;
    const to = offsets[i + 1]!;
    most = Math.max(most, to - from);
    for (let k = from; k < to; k++) if (w[k] !== w[from]) even[i] = 0;
    let lag = 0;
    let weight = 0;
    for (let k = from; k < to; k++) {
      const one = even[i] === 1 ? 1 : w[k]!;
      lag += one * z[targets[k]!]!;
      weight += one;
    }
    // Equal draws count for both sides; sums in another order may differ by rounding.
    low[i] = lag - 1e-11 * weight * widest;
    high[i] = lag + 1e-11 * weight * widest;
    if (even[i] === 1 && to > from && !sums.has(to - from)) sums.set(to - from, []);
  }
  const drawn = Math.min(n, most + 1);
  return {
    w,
    even,
    uneven: Int32Array.from(even.keys()).filter((i) => even[i] === 0),
    low,
    high,
    atLeast: new Int32Array(n),
    atMost: new Int32Array(n),
    drawn,
    table: new Float64Array(drawn * TOGETHER),
    running: new Float64Array(drawn + 1),
    sums,
  };
}

/** The first values of the next permutation, by as much of Fisher & Yates's shuffle. */
function draw(
  z: Float64Array,
  order: Int32Array,
  random: Random,
  { drawn, table, running }: Rows,
  lane: number,
): void {
  const n = order.length;
  for (let a = 0; a < drawn; a++) {
    const b = a + random.int(n - a);
    const held = order[a]!;
    const taken = order[b]!;
    order[a] = taken;
    order[b] = held;
    const value = z[taken]!;
    table[a * TOGETHER + lane] = value;
    running[a + 1] = running[a]! + value;
  }
}

/** Members that stand in their own draw: the next value stands in, and the count of the draw as it was is undone. */
function putRight({ z, offsets }: ObservedTies, order: Int32Array, rows: Rows, lane: number): void {
  const { w, even, low, high, atLeast, atMost, drawn, table, running } = rows;
  for (let a = 0; a < drawn; a++) {
    const i = order[a]!;
    const from = offsets[i]!;
    const d = offsets[i + 1]! - from;
    if (a >= d) continue;
    const change = table[d * TOGETHER + lane]! - z[i]!;
    let before = 0;
    let after: number;
    if (even[i] === 1) {
      before = running[d]!;
      after = before + change;
    } else {
      for (let k = 0; k < d; k++) before += w[from + k]! * table[k * TOGETHER + lane]!;
      after = before + w[from + a]! * change;
    }
    atLeast[i]! += (after >= low[i]! ? 1 : 0) - (before >= low[i]! ? 1 : 0);
    atMost[i]! += (after <= high[i]! ? 1 : 0) - (before <= high[i]! ? 1 : 0);
  }
}

/** Adds up the rows of unequal weights for all lanes of the table, with the sums of a row in registers. */
function countUneven(
  uneven: Int32Array,
  offsets: Int32Array,
  w: Float64Array,
  table: Float64Array,
  low: Float64Array,
  high: Float64Array,
  atLeast: Int32Array,
  atMost: Int32Array,
): void {
  for (const i of uneven) {
    let [a, b, c, d, e, f, g, h] = [0, 0, 0, 0, 0, 0, 0, 0];
    for (let k = offsets[i]!, at = 0, end = offsets[i + 1]!; k < end; k++, at += TOGETHER) {
      const weight = w[k]!;
      a += weight * table[at]!;
      b += weight * table[at + 1]!;
      c += weight * table[at + 2]!;
      d += weight * table[at + 3]!;
      e += weight * table[at + 4]!;
      f += weight * table[at + 5]!;
      g += weight * table[at + 6]!;
      h += weight * table[at + 7]!;
    }
    // Lanes without a permutation are NaN, which is neither.
    const l = low[i]!;
    const m = high[i]!;
    atLeast[i]! +=
      +(a >= l) + +(b >= l) + +(c >= l) + +(d >= l) + +(e >= l) + +(f >= l) + +(g >= l) + +(h >= l);
    atMost[i]! +=
      +(a <= m) + +(b <= m) + +(c <= m) + +(d <= m) + +(e <= m) + +(f <= m) + +(g <= m) + +(h <= m);
  }
}

function countEven({ n, offsets }: ObservedTies, { even, sums, low, high, atLeast, atMost }: Rows): void {
  const sorted = new Map([...sums].map(([d, all]) => [d, Float64Array.from(all).sort()]));
  for (let i = 0; i < n; i++) {
    const all = sorted.get(offsets[i + 1]! - offsets[i]!);
    if (even[i] === 0 || !all) continue;
    atLeast[i]! += all.length - placeOf(all, low[i]!, false);
    atMost[i]! += placeOf(all, high[i]!, true);
  }
}

/** How many of ascending values are below a bound, or at it too. */
function placeOf(sorted: Float64Array, bound: number, equal: boolean): number {
  let from = 0;
  let to = sorted.length;
  while (from < to) {
    const middle = (from + to) >> 1;
    if (sorted[middle]! < bound || (equal && sorted[middle] === bound)) from = middle + 1;
    else to = middle;
  }
  return from;
}

/** By the +1 rule; a large I is a large sum for a member above the mean, a small sum for one below. */
function shares(ties: ObservedTies, rows: Rows, total: number, permutations: number): LocalPermutations {
  const nan = (): Float64Array => new Float64Array(total).fill(NaN);
  const out = { greater: nan(), less: nan(), folded: nan(), twoSided: nan() };
  ties.members.forEach((member, i) => {
    if (ties.offsets[i + 1] === ties.offsets[i]) return;
    const own = ties.z[i]!;
    const share = (count: number): number => (1 + (own === 0 ? permutations : count)) / (1 + permutations);
    const [large, small] = [share(rows.atLeast[i]!), share(rows.atMost[i]!)];
    out.greater[member] = own < 0 ? small : large;
    out.less[member] = own < 0 ? large : small;
    out.folded[member] = Math.min(large, small);
    out.twoSided[member] = Math.min(1, 2 * out.folded[member]);
  });
  return out;
}
