import { UnanswerableError, type Network } from '../types';

/** Members with a value, and the ties among them. */
export interface ObservedTies {
  /** Members with a value. */
  readonly n: number;
  /** Those of them with at least one neighbour that has a value: the n of the global statistics. */
  readonly entered: number;
  /** Member of each place. */
  readonly members: Int32Array;
  readonly offsets: Int32Array;
  readonly targets: Int32Array;
  readonly weights: Float64Array;
  /** Deviations from the mean of all members with a value. */
  readonly z: Float64Array;
  /** Σ z². */
  readonly squares: number;
}

/**
 * What autocorrelation statistics work on: the ties among members with a value. Mean and spread are over all of
 * them; n counts those with an observed neighbour (the `adjust.n` convention of Bivand & Wong 2018).
 * @param alone whether members without an observed neighbour count in n: never in the product, but in some libraries
 * @throws UnanswerableError when fewer than four members enter, or all values are equal
 */
export function observedTies(
  net: Network,
  values: Float64Array,
  alone: 'left-out' | 'counted' = 'left-out',
): ObservedTies {
  const place = new Int32Array(net.n).fill(-1);
  const members: number[] = [];
  for (let i = 0; i < net.n; i++)
    if (!Number.isNaN(values[i]!)) {
      place[i] = members.length;
      members.push(i);
    }
  const n = members.length;
  const offsets = new Int32Array(n + 1);
  let stored = 0;
  let entered = 0;
  members.forEach((i, at) => {
    const before = stored;
    for (let k = net.offsets[i]!; k < net.offsets[i + 1]!; k++) if (place[net.targets[k]!]! >= 0) stored++;
    offsets[at + 1] = stored;
    if (stored > before) entered++;
  });
  if (entered < 4)
    throw new UnanswerableError(
      'too-few-observed',
      `Only ${entered} members have a value and a neighbour with a value; at least 4 are needed.`,
    );
  const targets = new Int32Array(stored);
  const weights = new Float64Array(stored);
  let next = 0;
  for (const i of members)
    for (let k = net.offsets[i]!; k < net.offsets[i + 1]!; k++) {
      const j = place[net.targets[k]!]!;
      if (j < 0) continue;
      targets[next] = j;
      weights[next++] = net.weights[k]!;
    }
  let mean = 0;
  for (const i of members) mean += values[i]! / n;
  const z = Float64Array.from(members, (i) => values[i]! - mean);
  const squares = z.reduce((sum, one) => sum + one * one, 0);
  const scale = members.reduce((most, i) => Math.max(most, Math.abs(values[i]!)), 0);
  if (!(squares > 1e-24 * n * scale * scale))
    throw new UnanswerableError(
      'constant-attribute',
      'All observed values are equal, so nothing can be shared or stand apart.',
    );
  const counted = alone === 'counted' ? n : entered;
  return { n, entered: counted, members: Int32Array.from(members), offsets, targets, weights, z, squares };
}

/** Weights divided by their row's sum: style W. */
export function rowStandardised(ties: ObservedTies): Float64Array {
  const out = Float64Array.from(ties.weights);
  for (let i = 0; i < ties.n; i++) {
    let sum = 0;
    for (let k = ties.offsets[i]!; k < ties.offsets[i + 1]!; k++) sum += out[k]!;
    for (let k = ties.offsets[i]!; k < ties.offsets[i + 1]!; k++) out[k]! /= sum;
  }
  return out;
}
