import type { Network } from '../types';

export interface Components {
  readonly count: number;
  /** Component of each member, numbered in the order their first members stand. */
  readonly labels: Int32Array;
  /** Number of members of each component. */
  readonly sizes: Int32Array;
  /** Index of the component with most members (lowest index on equal sizes); −1 when there are no members. */
  readonly largest: number;
  /** Number of members without ties. */
  readonly isolated: number;
}

/** Connected components by breadth-first search, O(n + m). */
export function components(net: Network): Components {
  const { n, offsets, targets } = net;
  const labels = new Int32Array(n).fill(-1);
  const queue = new Int32Array(n);
  const sizes: number[] = [];
  let isolated = 0;
  for (let root = 0; root < n; root++) {
    if (labels[root] !== -1) continue;
    const label = sizes.length;
    let head = 0;
    let tail = 1;
    queue[0] = root;
    labels[root] = label;
    while (head < tail) {
      const i = queue[head++]!;
      for (let p = offsets[i]!; p < offsets[i + 1]!; p++) {
        const j = targets[p]!;
        if (labels[j] === -1) {
          labels[j] = label;
          queue[tail++] = j;
        }
      }
    }
    sizes.push(tail);
    if (tail === 1) isolated++;
  }
  let largest = sizes.length === 0 ? -1 : 0;
  for (let c = 1; c < sizes.length; c++) if (sizes[c]! > sizes[largest]!) largest = c;
  return { count: sizes.length, labels, sizes: Int32Array.from(sizes), largest, isolated };
}

/** Members of each component in ascending order, as slices of one array. */
export function componentMembers(parts: Components): Int32Array[] {
  const starts = new Int32Array(parts.count + 1);
  for (let c = 0; c < parts.count; c++) starts[c + 1] = starts[c]! + parts.sizes[c]!;
  const all = new Int32Array(parts.labels.length);
  const cursor = starts.slice();
  for (let i = 0; i < parts.labels.length; i++) all[cursor[parts.labels[i]!]!++] = i;
  return Array.from({ length: parts.count }, (_, c) => all.subarray(starts[c], starts[c + 1]));
}
