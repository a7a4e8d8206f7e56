import { describe, expect, it } from 'vitest';
import {
  cholesky,
  choleskySolve,
  components,
  createRandom,
  laplacianOperator,
  takeReading,
  UnanswerableError,
  type LaplacianKind,
  type LaplacianOperator,
  type Network,
  type ReadingInput,
} from '@/numerics';
import { foldsOf, FOLDS, HoldOut } from '@/numerics/smoothers/hold-out';
import { ShiftedSystems } from '@/numerics/solvers';
import { exactBasis } from '@/numerics/smoothers/exact-basis';
import { ExactSystem } from '@/numerics/smoothers/exact-system';
import type { Problem } from '@/numerics/smoothers';
import { fromTies, path } from './networks';
import { plant } from './planted';

const solver = ({ l }: { readonly l: LaplacianOperator }): ShiftedSystems => new ShiftedSystems(l);

const base = {
  precision: null,
  groups: null,
  laplacian: 'combinatorial',
  neighbourFloor: 1,
  permutations: 0,
  seed: 5,
} as const;
const read = (network: Network, values: Float64Array, more: Partial<ReadingInput> = {}) =>
  takeReading(network, { ...base, values, filter: { kind: 'tikhonov', alpha: 'hold-out' }, ...more });

function problemOf(network: Network, values: Float64Array, laplacian: LaplacianKind): Problem {
  const random = createRandom(8);
  const observed = Uint8Array.from(values, (one) => (Number.isNaN(one) ? 0 : 1));
  return {
    l: laplacianOperator(network, laplacian),
    observed,
    y: values.map((one) => (Number.isNaN(one) ? 0 : one)),
    s: Float64Array.from(observed, (one) => one * (0.5 + random.next())),
    groups: null,
    nullity: 1,
  };
}

/** Leaves out each fold, solves densely, and adds up. */
function bruteForce({ l, s, y, observed }: Problem, alpha: number, seed: number): number {
  const fold = foldsOf(observed, FOLDS, seed);
  const n = l.n;
  const dense = l.dense();
  let total = 0;
  let count = 0;
  for (let f = 0; f < FOLDS; f++) {
    const a = dense.map((one) => alpha * one);
    const b = new Float64Array(n);
    for (let i = 0; i < n; i++) {
      if (fold[i] === f) continue;
      a[i * n + i]! += s[i]!;
      b[i] = s[i]! * y[i]!;
    }
    cholesky(a, n);
    choleskySolve(a, n, b);
    for (let i = 0; i < n; i++)
      if (fold[i] === f) {
        total += s[i]! * (y[i]! - b[i]!) ** 2;
        count++;
      }
  }
  return total / count;
}

const { network, values } = plant({ n: 90, seed: 4, shifted: 0, within: 1.5 });

it('folds: seeded, of observed members only, their sizes at most one apart', () => {
  const observed = Uint8Array.from({ length: 57 }, (_, i) => (i % 5 === 0 ? 0 : 1));
  const fold = foldsOf(observed, 10, 3);
  expect(foldsOf(observed, 10, 3)).toEqual(fold);
  expect(foldsOf(observed, 10, 4)).not.toEqual(fold);
  const sizes = new Array<number>(10).fill(0);
  fold.forEach((f, i) => {
    expect(f === -1).toBe(observed[i] === 0);
    if (f >= 0) sizes[f]!++;
  });
  expect(Math.max(...sizes) - Math.min(...sizes)).toBeLessThanOrEqual(1);
});

describe('against brute force: every fold left out and solved densely', () => {
  it.each(['combinatorial', 'normalised', 'regularised'] as const)('the criterion (%s)', (laplacian) => {
    const problem = problemOf(network, values, laplacian);
    for (const basis of [
      null,
      exactBasis({ ...problem, nullity: laplacian === 'regularised' ? 1 : components(network).count }),
    ]) {
      const folds = new HoldOut(problem, 7, basis ?? solver(problem));
      for (const alpha of [0.01, 0.3, 2, 40, 1_000])
        expect(folds.error(alpha) / bruteForce(problem, alpha, 7)).toBeCloseTo(1, basis ? 9 : 6);
    }
  });

  it('the strength: none on a fine grid is better', () => {
    for (const seed of [1, 2, 3]) {
      const { alpha, columns } = read(network, values, { seed });
      const observed = Uint8Array.from(values, (one) => (Number.isNaN(one) ? 0 : 1));
      const problem = { ...problemOf(network, values, 'combinatorial'), s: Float64Array.from(observed) };
      const chosen = bruteForce(problem, alpha, seed);
      for (let place = -4; place <= 4; place += 0.05)
        expect(chosen).toBeLessThanOrEqual(bruteForce(problem, 10 ** place, seed) * (1 + 1e-4));
      // And the reading is the one that this strength gives.
      const given = read(network, values, { seed, filter: { kind: 'tikhonov', alpha } });
      expect(columns.smoothed).toEqual(given.columns.smoothed);
    }
  });

  it('really leaving a fold out of a reading gives the same predictions', () => {
    const seed = 2;
    const observed = Uint8Array.from(values, (one) => (Number.isNaN(one) ? 0 : 1));
    const problem = { ...problemOf(network, values, 'combinatorial'), s: Float64Array.from(observed) };
    const fold = foldsOf(observed, FOLDS, seed);
    let total = 0;
    for (let f = 0; f < FOLDS; f++) {
      const without = values.map((one, i) => (fold[i] === f ? NaN : one));
      const { smoothed } = read(network, without, { filter: { kind: 'tikhonov', alpha: 3 } }).columns;
      values.forEach((one, i) => (total += fold[i] === f ? (one - smoothed[i]!) ** 2 : 0));
    }
    const count = observed.reduce((sum, one) => sum + one, 0);
    expect(new HoldOut(problem, seed, solver(problem)).error(3)).toBeCloseTo(total / count, 6);
  });
});

it('ten observed members are left out one at a time: Σ ((y − ŷ)/(1 − h))² / 10 in closed form (Golub, Heath & Wahba 1979)', () => {
  const some = Float64Array.from({ length: 14 }, (_, i) => (i % 7 < 2 ? NaN : Math.sin(i)));
  const problem = { ...problemOf(path(14), some, 'combinatorial') };
  for (const alpha of [0.1, 1, 20]) {
    const fit = new ExactSystem(problem, exactBasis(problem), new Uint8Array(14)).fit(alpha);
    let total = 0;
    problem.s.forEach((s, i) => {
      if (s > 0) total += s * ((problem.y[i]! - fit.smoothed[i]!) / (1 - fit.leverage[i]!)) ** 2;
    });
    expect(new HoldOut(problem, 3, solver(problem)).error(alpha)).toBeCloseTo(total / 10, 8);
  }
});

it('the same seed gives the same bytes', () => {
  expect(read(network, values)).toEqual(read(network, values));
});

it('on the path for large networks no strength on the grid is better', () => {
  const large = plant({ n: 2_200, seed: 2 });
  const { alpha } = read(large.network, large.values);
  const observed = Uint8Array.from(large.values, (one) => (Number.isNaN(one) ? 0 : 1));
  const problem = {
    ...problemOf(large.network, large.values, 'combinatorial'),
    s: Float64Array.from(observed),
  };
  const folds = new HoldOut(problem, base.seed, solver(problem));
  const chosen = folds.error(alpha);
  for (let place = -4; place <= 4; place += 0.5)
    expect(chosen).toBeLessThanOrEqual(folds.error(10 ** place) * (1 + 1e-4));
});

describe('members that nobody else can predict', () => {
  it('do not count, and change nothing for the others', () => {
    const line = Float64Array.from({ length: 20 }, (_, i) => Math.sin(i / 2) + (i % 3) / 4);
    const alone = fromTies(
      23,
      [...Array(19).keys()].map((i) => [i, i + 1] as const),
    );
    const problem = problemOf(alone, Float64Array.of(...line, 50, NaN, 7), 'combinatorial');
    const fold = foldsOf(problem.observed, FOLDS, 1);
    const error = new HoldOut(problem, 1, solver(problem)).error(1);
    // By hand: the two members apart (places 20 and 22) are left out of both sums.
    const rest = bruteForceOn(path(20), line, problem.s.slice(0, 20), fold.slice(0, 20));
    expect(error).toBeCloseTo(rest, 6);
  });

  it('are refused in words when there is nobody else', () => {
    const pairs = fromTies(8, [
      [0, 1],
      [2, 3],
      [4, 5],
      [6, 7],
    ]);
    const lonely = Float64Array.of(1, NaN, 2, NaN, 3, NaN, 5, NaN);
    const unanswerable = problemOf(pairs, lonely, 'combinatorial');
    expect(() => new HoldOut(unanswerable, 1, solver(unanswerable))).toThrow(UnanswerableError);
  });
});

function bruteForceOn(net: Network, y: Float64Array, s: Float64Array, fold: Int32Array): number {
  const dense = laplacianOperator(net, 'combinatorial').dense();
  let total = 0;
  let count = 0;
  for (let f = 0; f < FOLDS; f++) {
    const a = Float64Array.from(dense);
    const b = new Float64Array(net.n);
    for (let i = 0; i < net.n; i++) {
      if (fold[i] === f) continue;
      a[i * net.n + i]! += s[i]!;
      b[i] = s[i]! * y[i]!;
    }
    cholesky(a, net.n);
    choleskySolve(a, net.n, b);
    fold.forEach((one, i) => {
      if (one !== f) return;
      total += s[i]! * (y[i]! - b[i]!) ** 2;
      count++;
    });
  }
  return total / count;
}
