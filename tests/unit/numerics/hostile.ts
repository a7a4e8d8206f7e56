import { expect } from 'vitest';
import {
  buildNetwork,
  NotConvergedError,
  takeReading,
  UnanswerableError,
  type LaplacianKind,
  type Network,
  type ReadingFilter,
} from '@/numerics';
import { complete, fromTies, path, ring, star } from './networks';

/** Places of numbers in a result that are not finite, NaN and infinities alike. */
function notFinite(result: unknown, at = ''): string[] {
  if (typeof result === 'number') return Number.isFinite(result) ? [] : [at];
  if (result instanceof Float64Array) return result.every(Number.isFinite) ? [] : [at];
  if (ArrayBuffer.isView(result) || typeof result !== 'object' || result === null) return [];
  if (Array.isArray(result)) return result.flatMap((one) => notFinite(one, at));
  return Object.entries(result).flatMap(([key, one]) => notFinite(one, at === '' ? key : `${at}.${key}`));
}

/**
 * Runs; the result must be finite but for the places where NaN is documented to stand for "none", and an error must be
 * one of ours, in words.
 */
export function answers(run: () => unknown, none = /^$/): 'answered' | string {
  let result: unknown;
  try {
    result = run();
  } catch (error) {
    if (!(error instanceof UnanswerableError || error instanceof NotConvergedError)) throw error;
    expect(error.message).toMatch(/^\S.{15,}\.$/);
    return error instanceof UnanswerableError ? error.code : 'not-converged';
  }
  expect(notFinite(result).filter((place) => !none.test(place))).toEqual([]);
  return 'answered';
}

export const values = (n: number, of: (i: number) => number): Float64Array =>
  Float64Array.from({ length: n }, (_, i) => of(i));
export const chain = (n: number, weight: (i: number) => number): Network =>
  fromTies(
    n,
    Array.from({ length: n - 1 }, (_, i) => [i, i + 1, weight(i)] as const),
  );
export const pairs = (count: number): Network => {
  const firsts = Int32Array.from({ length: count }, (_, i) => 2 * i);
  return buildNetwork(
    2 * count,
    firsts,
    firsts.map((i) => i + 1),
    new Float64Array(count).fill(1),
  );
};
export const wideStar = (n: number): Network =>
  buildNetwork(
    n,
    new Int32Array(n - 1),
    Int32Array.from({ length: n - 1 }, (_, i) => i + 1),
    new Float64Array(n - 1).fill(1),
  );

export const NETWORKS: [string, Network][] = [
  ['nobody', fromTies(0, [])],
  ['one member', fromTies(1, [])],
  ['two members', path(2)],
  ['two members apart', fromTies(2, [])],
  ['three members', path(3)],
  ['no ties', fromTies(30, [])],
  ['one tie, the rest alone', fromTies(12, [[0, 1]])],
  ['weights over twelve orders of magnitude', chain(60, (i) => 10 ** ((i % 13) - 6))],
  ['weights of 1e-300', chain(30, () => 1e-300)],
  ['weights of 1e140', chain(30, () => 1e140)],
  ['ten pairs', pairs(10)],
  ['a star', star(12)],
  ['a complete network', complete(9)],
  ['a ring', ring(12)],
];
export const SIGNALS: [string, (n: number) => Float64Array][] = [
  ['usual', (n) => values(n, (i) => Math.sin(i * i))],
  ['constant', (n) => values(n, () => 3)],
  ['constant but for rounding', (n) => values(n, (i) => 1e9 + 1e-7 * (i % 2))],
  ['all missing', (n) => values(n, () => NaN)],
  ['one value', (n) => values(n, (i) => (i === 0 ? 1 : NaN))],
  ['half missing', (n) => values(n, (i) => (i % 2 === 0 ? Math.sin(i) : NaN))],
  ['one differs', (n) => values(n, (i) => (i === 0 ? 1 : 0))],
  ['duplicates', (n) => values(n, (i) => i % 2)],
  ['infinite', (n) => values(n, (i) => (i === 0 ? -Infinity : i))],
  ['as large as doubles go', (n) => values(n, (i) => 1e307 * Math.sin(i + 1))],
  ['as small as doubles go', (n) => values(n, (i) => 1e-307 * Math.sin(i + 1))],
];

export const LAPLACIANS: LaplacianKind[] = ['combinatorial', 'normalised', 'regularised'];
export const FILTERS: ReadingFilter[] = [
  { kind: 'two-level' },
  { kind: 'tikhonov', alpha: 1 },
  { kind: 'tikhonov', alpha: 'gcv' },
  { kind: 'tikhonov', alpha: 'hold-out' },
  { kind: 'heat', tau: 1 },
  { kind: 'low-pass', keep: 3 },
  { kind: 'high-pass', keep: 3 },
  { kind: 'high-pass', cutoff: 0.5 },
  { kind: 'band-pass', from: 0.1, to: 1 },
];
/** Where NaN stands for "none": see the docstrings of ReadingColumns, ReadingResult, LocalMoran and GlobalStatistic. */
export const NO_READING =
  /^columns\.(value|smoothed|standardError|departure|leverage|z|p|q)$|^columns\.local\.|^columns\.localPermutationP$|^alpha$|^typical$|^(moran|geary)\.(row|raw)\.(z|p)$/;
export const NO_GLOBAL = /^(moran|geary)\.(z|p)$/;
export const NO_LOCAL = /^(I|expectation|variance|z|p|q)$/;

export const reading = (
  net: Network,
  signal: Float64Array,
  filter: ReadingFilter,
  laplacian: LaplacianKind,
  more = {},
) =>
  takeReading(net, {
    values: signal,
    precision: null,
    groups: null,
    filter,
    laplacian,
    neighbourFloor: 1,
    permutations: 9,
    seed: 1,
    ...more,
  });
