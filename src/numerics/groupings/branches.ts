import type { Network } from '../types';

/**
 * Lets members on small trees that hang on the rest follow the member they hang on: rows of a few loose members say little about
 * where they belong, and wherever else they are put costs a tie. Peels ends off until a core is left in which everybody
 * has two neighbours (the 2-core, Seidman 1983); a tree of `largest` members or more keeps its labels, as does a
 * component that is nothing but a tree.
 *
 * @returns new labels, length n
 */
export function followBranches(net: Network, labels: Int32Array, largest: number): Int32Array {
  const { n, offsets, targets } = net;
  const left = Int32Array.from({ length: n }, (_, i) => offsets[i + 1]! - offsets[i]!);
  const hangsOn = new Int32Array(n).fill(-1);
  const sizes = new Int32Array(n).fill(1);
  const peeled = Array.from(left.keys()).filter((i) => left[i] === 1);
  for (const i of peeled) {
    // The last of a component that is a tree has nobody left to hang on.
    if (left[i] === 0) continue;
    left[i] = 0;
    for (let p = offsets[i]!; p < offsets[i + 1]!; p++) {
      const j = targets[p]!;
      if (left[j] === 0) continue;
      hangsOn[i] = j;
      sizes[j]! += sizes[i]!;
      left[j]!--;
      if (left[j] === 1) peeled.push(j);
      break;
    }
  }
  const next = labels.slice();
  // Backwards, so that whoever a member hangs on has its place already; −2 marks trees that keep their labels.
  const root = new Int32Array(n).fill(-1);
  for (let at = peeled.length - 1; at >= 0; at--) {
    const i = peeled[at]!;
    const j = hangsOn[i]!;
    if (j < 0) {
      root[i] = -2;
      continue;
    }
    const inCore = hangsOn[j] === -1 && left[j]! > 1;
    root[i] = inCore ? (sizes[i]! < largest ? j : -2) : root[j]!;
    if (root[i]! >= 0) next[i] = labels[root[i]!]!;
  }
  return next;
}
