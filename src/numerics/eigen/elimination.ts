import type { Network } from '../types';

/** A factor of the combinatorial Laplacian of a connected network, by which L z = b is solved for b ⊥ 1. */
export interface LaplacianFactor {
  /** z with (L + G) z = b; without G up to a constant, and b must add up to 0. `z` may be the same array as `b`. */
  solve(b: Float64Array, z: Float64Array): void;
  /** Entries of the factor. */
  readonly fill: number;
}

/**
 * Eliminates the members one by one, always one with fewest ties (minimum degree; Rose 1972): an L D Lᵀ factorisation
 * in which every Schur complement is a Laplacian again, so that no subtraction occurs and even tiny eigenvalues keep
 * their digits. Cheap on rings, trees, grids and other thin networks; on social networks the fill explodes.
 *
 * @param ground a diagonal G ≥ 0 to be added (ties to a grounded node), or null
 * @param budget ceiling on elementary operations
 * @returns null when the budget ran out, or is seen to
 */
export function factoriseLaplacian(
  net: Network,
  ground: Float64Array | null,
  budget: number,
): LaplacianFactor | null {
  const { n } = net;
  const neighbours: number[][] = [];
  const weights: number[][] = [];
  const buckets: number[][] = [];
  const file = (i: number): void => {
    const degree = neighbours[i]!.length;
    while (buckets.length <= degree) buckets.push([]);
    buckets[degree]!.push(i);
  };
  for (let i = 0; i < n; i++) {
    neighbours.push(Array.from(net.targets.subarray(net.offsets[i], net.offsets[i + 1])));
    weights.push(Array.from(net.weights.subarray(net.offsets[i], net.offsets[i + 1])));
  }
  for (let i = n - 1; i >= 0; i--) file(i);
  const grounded = ground?.slice() ?? new Float64Array(n);
  const gone = new Uint8Array(n);
  const mark = new Int32Array(n);
  const order = new Int32Array(n);
  const pivots = new Float64Array(n);
  // Thin networks are nearly used up before their least degree rises; where it rises early the fill will explode.
  const crowded = Math.max(20, (1.5 * net.targets.length) / n + 4);
  let work = 0;
  let lowest = 0;
  for (let k = 0; k < n; k++) {
    let v = -1;
    while (v < 0) {
      while (lowest < buckets.length && buckets[lowest]!.length === 0) lowest++;
      const candidate = buckets[lowest]!.pop()!;
      if (gone[candidate] === 0 && neighbours[candidate]!.length === lowest) v = candidate;
    }
    const around = neighbours[v]!;
    const share = weights[v]!;
    let pivot = grounded[v]!;
    for (const w of share) pivot += w;
    order[k] = v;
    pivots[k] = pivot;
    gone[v] = 1;
    for (let x = 0; x < around.length; x++) {
      const a = around[x]!;
      grounded[a]! += (share[x]! * grounded[v]!) / pivot;
      const list = neighbours[a]!;
      const values = weights[a]!;
      work += list.length + around.length;
      for (let y = 0; y < list.length; y++) mark[list[y]!] = y + 1;
      const out = mark[v]! - 1;
      for (let y = 0; y < around.length; y++) {
        const b = around[y]!;
        if (y === x) continue;
        const added = (share[x]! * share[y]!) / pivot;
        const at = mark[b]!;
        if (at > 0) values[at - 1]! += added;
        else {
          list.push(b);
          values.push(added);
        }
      }
      for (const b of list) mark[b] = 0;
      list[out] = list[list.length - 1]!;
      values[out] = values[values.length - 1]!;
      list.pop();
      values.pop();
      file(a);
      lowest = Math.min(lowest, list.length);
    }
    for (let x = 0; x < share.length; x++) share[x]! /= pivot;
    if (work > budget || (lowest > crowded && n - k > 0.35 * n)) return null;
  }
  return flatten(n, order, pivots, neighbours, weights);
}

/** The factor in the order of elimination, in flat arrays. */
function flatten(
  n: number,
  order: Int32Array,
  pivots: Float64Array,
  neighbours: number[][],
  shares: number[][],
): LaplacianFactor {
  const place = new Int32Array(n);
  for (let k = 0; k < n; k++) place[order[k]!] = k;
  const offsets = new Int32Array(n + 1);
  for (let k = 0; k < n; k++) offsets[k + 1] = offsets[k]! + neighbours[order[k]!]!.length;
  const columns = new Int32Array(offsets[n]!);
  const values = new Float64Array(offsets[n]!);
  for (let k = 0, at = 0; k < n; k++) {
    const list = neighbours[order[k]!]!;
    for (let x = 0; x < list.length; x++, at++) {
      columns[at] = place[list[x]!]!;
      values[at] = shares[order[k]!]![x]!;
    }
  }
  const y = new Float64Array(n);
  return {
    fill: values.length,
    solve: (b, z) => {
      for (let k = 0; k < n; k++) y[k] = b[order[k]!]!;
      for (let k = 0; k < n; k++) {
        const value = y[k]!;
        for (let p = offsets[k]!; p < offsets[k + 1]!; p++) y[columns[p]!]! += values[p]! * value;
      }
      for (let k = n - 1; k >= 0; k--) {
        // Without ground the last pivot is 0 (the null vector); its unknown is free and set to 0.
        let value = pivots[k]! > 0 ? y[k]! / pivots[k]! : 0;
        for (let p = offsets[k]!; p < offsets[k + 1]!; p++) value += values[p]! * y[columns[p]!]!;
        y[k] = value;
      }
      for (let k = 0; k < n; k++) z[order[k]!] = y[k]!;
    },
  };
}
