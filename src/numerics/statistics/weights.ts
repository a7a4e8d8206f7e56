import { UnanswerableError, type Network } from '../types';
import { checkValues } from './deviations';

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
 * @throws UnanswerableError `too-few-observed` when fewer than four members enter; `constant-attribute` when all values
 *   are equal; `bad-values` on infinite ones and those beyond 1e100
 */
export function observedTies(
  net: Network,
  values: Float64Array,
  alone: 'left-out' | 'counted' = 'left-out',
): ObservedTies {
  if (values.length !== net.n)
    throw new UnanswerableError('bad-values', 'The attribute is not of the members of this network.');
  checkValues(values);
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

/** Weights divided by their row's sum: style W; one for each stored tie. */
export function rowStandardised(ties: ObservedTies): Float64Array {
  const out = Float64Array.from(ties.weights);
  for (let i = 0; i < ties.n; i++) {
    let sum = 0;
    for (let k = ties.offsets[i]!; k < ties.offsets[i + 1]!; k++) sum += out[k]!;
    for (let k = ties.offsets[i]!; k < ties.offsets[i + 1]!; k++) out[k]! /= sum;
  }
  return out;
}

/**
 * A power of two of about the size of the largest weight, 1 without weights. Dividing by it is exact and keeps squares
 * of weights within the range of doubles; statistics that do not change with the unit of the weights keep every digit.
 */
export function weightUnit(weights: Float64Array): number {
  const most = weights.reduce((largest, one) => Math.max(largest, one), 0);
  return most > 0 ? 2 ** Math.round(Math.log2(most)) : 1;
}
