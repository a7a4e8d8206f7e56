import type { ImportOptions } from './imports';
import type { TieRows } from './ties';

/** Distinct ties, source < target, sorted by source and target. */
export interface CombinedTies {
  readonly sources: Int32Array;
  readonly targets: Int32Array;
  readonly weights: Float64Array;
  /** Rows behind each tie. */
  readonly counts: Int32Array;
  /** Most frequent kind, null for none. */
  readonly kinds: (string | null)[];
  /** Rows of ties that the choices leave out. */
  readonly leftOut: number;
}

type Choices = Pick<ImportOptions, 'directions' | 'repeats' | 'logWeight' | 'minimumWeight'>;

/** Row numbers ordered by the lower and then the higher of their two members: two counting passes. */
function orderOf({ sources, targets }: TieRows, n: number): Int32Array {
  const rows = sources.length;
  const by = (key: (row: number) => number, order: Int32Array): Int32Array => {
    const starts = new Int32Array(n + 1);
    for (let i = 0; i < rows; i++) starts[key(i) + 1]!++;
    for (let i = 0; i < n; i++) starts[i + 1]! += starts[i]!;
    const sorted = new Int32Array(rows);
    for (const row of order) sorted[starts[key(row)]!++] = row;
    return sorted;
  };
  const first = Int32Array.from({ length: rows }, (_, i) => i);
  const byHigher = by((row) => Math.max(sources[row]!, targets[row]!), first);
  return by((row) => Math.min(sources[row]!, targets[row]!), byHigher);
}

/** Folds one direction of a pair. */
const fold = (repeats: Choices['repeats'], before: number, weight: number): number => {
  if (repeats === 'count') return before + 1;
  return repeats === 'sum' ? before + weight : Math.max(before, weight);
};

function mostFrequent(kinds: Map<number, number>): number {
  let best = 0;
  let most = 0;
  for (const [kind, count] of kinds)
    if (kind !== 0 && count > most) {
      best = kind;
      most = count;
    }
  return best;
}

/** Whether a weight is enough for a tie. */
const isTie = (weight: number, { minimumWeight }: Pick<Choices, 'minimumWeight'>): boolean =>
  weight > 0 && Number.isFinite(weight) && weight >= (minimumWeight ?? 0);

/**
 * Makes undirected ties of rows: repeats in one direction are folded first, then the two directions become one
 * weight, then the logarithm and the smallest weight are applied.
 * @param n number of members
 */
export function combineTies(rows: TieRows, n: number, choices: Choices): CombinedTies {
  const order = orderOf(rows, n);
  const sources = new Int32Array(order.length);
  const targets = new Int32Array(order.length);
  const weights = new Float64Array(order.length);
  const counts = new Int32Array(order.length);
  const kindsOfTies: (string | null)[] = [];
  let ties = 0;
  let leftOut = 0;
  const kinds = new Map<number, number>();
  for (let start = 0; start < order.length;) {
    const low = Math.min(rows.sources[order[start]!]!, rows.targets[order[start]!]!);
    const high = Math.max(rows.sources[order[start]!]!, rows.targets[order[start]!]!);
    let there = 0;
    let back = 0;
    let end = start;
    kinds.clear();
    for (; end < order.length; end++) {
      const row = order[end]!;
      const source = rows.sources[row]!;
      const target = rows.targets[row]!;
      if (Math.min(source, target) !== low || Math.max(source, target) !== high) break;
      if (source === low) there = fold(choices.repeats, there, rows.weights[row]!);
      else back = fold(choices.repeats, back, rows.weights[row]!);
      const kind = rows.kindOf[row]!;
      if (kind !== 0) kinds.set(kind, (kinds.get(kind) ?? 0) + 1);
    }
    let weight = choices.directions === 'larger' ? Math.max(there, back) : there + back;
    if (choices.directions === 'mutual' && (there === 0 || back === 0)) weight = 0;
    if (choices.logWeight) weight = Math.log1p(weight);
    if (isTie(weight, choices)) {
      sources[ties] = low;
      targets[ties] = high;
      weights[ties] = weight;
      counts[ties] = end - start;
      kindsOfTies.push(rows.kinds[mostFrequent(kinds) - 1] ?? null);
      ties++;
    } else leftOut += end - start;
    start = end;
  }
  return {
    sources: sources.slice(0, ties),
    targets: targets.slice(0, ties),
    weights: weights.slice(0, ties),
    counts: counts.slice(0, ties),
    kinds: kindsOfTies,
    leftOut,
  };
}

/** Ties of an earlier snapshot, by the places of this import. */
export type EarlierTies = Omit<CombinedTies, 'leftOut'>;

/**
 * Adds ties that are new since an earlier snapshot to those that it had. Its weights are aged by the half-life first;
 * the logarithm is taken back, and taken again of the total.
 * @param fresh made by combineTies without logarithm and smallest weight
 * @param age half-lives passed since the earlier snapshot
 */
export function addToEarlier(
  earlier: EarlierTies,
  fresh: CombinedTies,
  n: number,
  age: number,
  choices: Choices,
): CombinedTies & { touched: number } {
  const key = (source: number, target: number): number => source * n + target;
  const place = new Map<number, number>();
  const sources: number[] = [];
  const targets: number[] = [];
  const weights: number[] = [];
  const counts: number[] = [];
  const kinds: (string | null)[] = [];
  for (let t = 0; t < earlier.sources.length; t++) {
    const [low, high] = [earlier.sources[t]!, earlier.targets[t]!].sort((a, b) => a - b) as [number, number];
    place.set(key(low, high), t);
    sources.push(low);
    targets.push(high);
    const raw = choices.logWeight ? Math.expm1(earlier.weights[t]!) : earlier.weights[t]!;
    weights.push(raw * 0.5 ** age);
    counts.push(earlier.counts[t]!);
    kinds.push(earlier.kinds[t]!);
  }
  const rowsOf = new Map<number, number>();
  for (let t = 0; t < fresh.sources.length; t++) {
    const at = place.get(key(fresh.sources[t]!, fresh.targets[t]!)) ?? sources.length;
    rowsOf.set(at, fresh.counts[t]!);
    if (at === sources.length) {
      sources.push(fresh.sources[t]!);
      targets.push(fresh.targets[t]!);
      weights.push(fresh.weights[t]!);
      counts.push(fresh.counts[t]!);
      kinds.push(fresh.kinds[t]!);
      continue;
    }
    weights[at] =
      choices.repeats === 'largest'
        ? Math.max(weights[at]!, fresh.weights[t]!)
        : weights[at]! + fresh.weights[t]!;
    counts[at]! += fresh.counts[t]!;
    kinds[at] = fresh.kinds[t] ?? kinds[at]!;
  }
  let leftOut = fresh.leftOut;
  let touched = 0;
  const kept: number[] = [];
  weights.forEach((weight, at) => {
    weights[at] = choices.logWeight ? Math.log1p(weight) : weight;
    const rows = rowsOf.get(at) ?? 0;
    if (isTie(weights[at], choices)) {
      kept.push(at);
      if (rows > 0) touched++;
    } else leftOut += rows;
  });
  kept.sort((a, b) => sources[a]! - sources[b]! || targets[a]! - targets[b]!);
  return {
    sources: Int32Array.from(kept, (at) => sources[at]!),
    targets: Int32Array.from(kept, (at) => targets[at]!),
    weights: Float64Array.from(kept, (at) => weights[at]!),
    counts: Int32Array.from(kept, (at) => counts[at]!),
    kinds: kept.map((at) => kinds[at]!),
    leftOut,
    touched,
  };
}
