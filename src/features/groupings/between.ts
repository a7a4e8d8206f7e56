import type { Network } from '@/numerics/types';
import type { Boundary } from './groupings';

/** Groups shown in the matrix; more would be unreadable and its size grows with the square. */
const MOST_IN_MATRIX = 40;
const MOST_BOUNDARY = 40;

/**
 * Ties between groups: their weight, and their number per 1,000 pairs of members that could be tied
 * (null where a pair cannot exist). Symmetric, the first 40 groups.
 */
export function matrixOf(
  pairs: readonly { a: number; b: number; ties: number; weight: number }[],
  sizes: readonly number[],
): { weights: number[][]; perThousand: (number | null)[][] } {
  const k = Math.min(sizes.length, MOST_IN_MATRIX);
  const fill = <T>(value: (a: number, b: number) => T): T[][] =>
    Array.from({ length: k }, (_, a) => Array.from({ length: k }, (__, b) => value(a, b)));
  const possible = (a: number, b: number): number =>
    a === b ? (sizes[a]! * (sizes[a]! - 1)) / 2 : sizes[a]! * sizes[b]!;
  const weights = fill(() => 0);
  const perThousand = fill<number | null>((a, b) => (possible(a, b) > 0 ? 0 : null));
  for (const { a, b, ties, weight } of pairs) {
    if (a >= k || b >= k) continue;
    weights[a]![b] = weights[b]![a] = weight;
    perThousand[a]![b] = perThousand[b]![a] = (1000 * ties) / possible(a, b);
  }
  return { weights, perThousand };
}

/**
 * Members who hold two groups together: those with the most ties on the smaller of the two sides (own group, and
 * the one other group they have most ties to), the more even split first, then member order.
 */
export function boundaryMembers(net: Network, labels: Int32Array): Boundary[] {
  const found: Boundary[] = [];
  const tally = new Map<number, number>();
  for (let i = 0; i < net.n; i++) {
    const group = labels[i]!;
    if (group < 0) continue;
    tally.clear();
    for (let e = net.offsets[i]!; e < net.offsets[i + 1]!; e++) {
      const other = labels[net.targets[e]!]!;
      if (other >= 0) tally.set(other, (tally.get(other) ?? 0) + 1);
    }
    const inside = tally.get(group) ?? 0;
    let other = -1;
    let across = 0;
    for (const [label, count] of tally)
      if (label !== group && (count > across || (count === across && label < other)))
        [other, across] = [label, count];
    if (inside > 0 && across > 0) found.push({ ordinal: i, group, other, inside, across });
  }
  const even = (one: Boundary): number => Math.abs(one.inside - one.across);
  return found
    .sort(
      (a, b) =>
        Math.min(b.inside, b.across) - Math.min(a.inside, a.across) ||
        even(a) - even(b) ||
        a.ordinal - b.ordinal,
    )
    .slice(0, MOST_BOUNDARY);
}
