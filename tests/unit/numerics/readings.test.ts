import { describe, expect, test } from 'vitest';
import {
  buildNetwork,
  components,
  laplacianOperator,
  takeReading,
  UnanswerableError,
  type Network,
  type ReadingInput,
} from '@/numerics';
import { exactBasis } from '@/numerics/smoothers/exact-basis';
import { ExactSystem } from '@/numerics/smoothers/exact-system';
import { ShiftedSystems } from '@/numerics/solvers';
import { LargeSystem } from '@/numerics/smoothers/large-system';
import type { Problem } from '@/numerics/smoothers';
import { plant } from './planted';

const base = {
  precision: null,
  groups: null,
  laplacian: 'combinatorial',
  neighbourFloor: 5,
  permutations: 0,
  seed: 1,
} as const;
const read = (network: Network, input: Partial<ReadingInput> & Pick<ReadingInput, 'values' | 'filter'>) =>
  takeReading(network, { ...base, ...input });

const community = plant({ n: 120, seed: 3 });
const problem = (() => {
  const { network, values, groups } = community;
  const observed = Uint8Array.from(values, (one) => (Number.isNaN(one) ? 0 : 1));
  const made: Problem = {
    l: laplacianOperator(network, 'combinatorial'),
    observed,
    y: values.map((one) => (Number.isNaN(one) ? 0 : one)),
    s: Float64Array.from(observed),
    groups,
    nullity: components(network).count,
  };
  return made;
})();
const none = new Uint8Array(120);

test('left-out departures are those of really leaving each member out, levels of groups included', () => {
  const fit = new ExactSystem(problem, exactBasis(problem), none).fit(2);
  const observed = [...problem.observed.keys()].filter((i) => problem.observed[i] === 1);
  for (const i of observed.slice(0, 25)) {
    const without: Problem = {
      ...problem,
      observed: problem.observed.with(i, 0),
      s: problem.s.with(i, 0),
      y: problem.y.with(i, 0),
    };
    const refit = new ExactSystem(without, exactBasis(without), none).fit(2);
    const departure = (problem.y[i]! - fit.smoothed[i]!) / (1 - fit.leverage[i]!);
    expect(departure).toBeCloseTo(problem.y[i]! - refit.smoothed[i]!, 8);
  }
});

test('a member of weight 0 is predicted as if the score were missing', () => {
  const i = problem.observed.indexOf(1);
  const basis = exactBasis(problem);
  const zeroed = new ExactSystem(problem, basis, none.with(i, 1)).fit(2);
  const without: Problem = {
    ...problem,
    observed: problem.observed.with(i, 0),
    s: problem.s.with(i, 0),
    y: problem.y.with(i, 0),
  };
  const refit = new ExactSystem(without, exactBasis(without), none).fit(2);
  expect(zeroed.smoothed[i]).toBeCloseTo(refit.smoothed[i]!, 8);
  expect(zeroed.variance[i]).toBeCloseTo(refit.variance[i]!, 8);
  expect(zeroed.quadratic).toBeCloseTo(refit.quadratic, 8);
});

test('the path for large networks agrees with the exact one', () => {
  const exact = new ExactSystem(problem, exactBasis(problem), none);
  const large = new LargeSystem(problem, none, 1, new ShiftedSystems(problem.l));
  const [a, b] = [exact.fit(2), large.fit(2)];
  b.refine([...problem.observed.keys()]);
  a.smoothed.forEach((one, i) => expect(b.smoothed[i]).toBeCloseTo(one, 7));
  a.variance.forEach((one, i) => expect(b.variance[i]).toBeCloseTo(one, 6));
  expect(b.quadratic / a.quadratic).toBeCloseTo(1, 8);
  expect(b.degrees).toBe(a.degrees);
});

test('leverages sum to the effective degrees of freedom, between 1 and the number observed', () => {
  const { network, values } = community;
  const { columns, effectiveDegrees, observed } = read(network, {
    values,
    filter: { kind: 'tikhonov', alpha: 1 },
  });
  const sum = columns.leverage.reduce((total, one) => total + (Number.isNaN(one) ? 0 : one), 0);
  expect(sum).toBeCloseTo(effectiveDegrees, 10);
  expect(effectiveDegrees).toBeGreaterThan(1);
  expect(effectiveDegrees).toBeLessThan(observed);
});

test('the planted benchmark, four small communities: the aims of the default smoother against plain Tikhonov', () => {
  const total = { true: 0, false: 0, planted: 0, error: 0, plain: 0, covered: 0, counted: 0 };
  for (const seed of [1, 2, 3, 4]) {
    const { network, groups, values, truth, planted } = plant({ n: 400, seed });
    const { columns } = read(network, { values, groups, filter: { kind: 'two-level' } });
    const plain = read(network, { values, filter: { kind: 'tikhonov', alpha: 'gcv' } }).columns;
    truth.forEach((one, i) => {
      if (columns.tested[i] === 1 && columns.q[i]! <= 0.1) total[planted[i] === 1 ? 'true' : 'false']++;
      if (columns.tested[i] === 1 && planted[i] === 1) total.planted++;
      total.error += (columns.smoothed[i]! - one) ** 2;
      total.plain += (plain.smoothed[i]! - one) ** 2;
      total.counted++;
      if (Math.abs(columns.smoothed[i]! - one) <= 1.96 * columns.standardError[i]!) total.covered++;
    });
  }
  expect(total.false / (total.true + total.false)).toBeLessThan(0.15);
  expect(total.true / total.planted).toBeGreaterThan(0.85);
  expect(total.error / total.plain).toBeLessThan(0.4);
  expect(total.covered / total.counted).toBeGreaterThan(0.85);
});

describe('what cannot be answered is said in words', () => {
  const pair = buildNetwork(
    6,
    Int32Array.of(0, 1, 2, 3, 4),
    Int32Array.of(1, 2, 3, 4, 5),
    new Float64Array(5).fill(1),
  );
  const lonely = buildNetwork(3, new Int32Array(), new Int32Array(), new Float64Array());
  test.each<[string, Network, number[], string]>([
    ['all equal', pair, [2, 2, 2, 2, 2, 2], 'constant-attribute'],
    ['all missing', pair, [NaN, NaN, NaN, NaN, NaN, NaN], 'all-missing'],
    ['one value', pair, [1, NaN, NaN, NaN, NaN, NaN], 'too-few-observed'],
    ['no ties', lonely, [1, 2, 3], 'no-ties'],
  ])('%s', (_name, network, values, code) => {
    const run = (): unknown =>
      read(network, { values: Float64Array.from(values), filter: { kind: 'two-level' } });
    expect(run).toThrow(UnanswerableError);
    try {
      run();
    } catch (error) {
      expect((error as UnanswerableError).code).toBe(code);
    }
  });

  test('a component without a score has no estimate, never 0', () => {
    const network = buildNetwork(
      9,
      Int32Array.of(0, 1, 2, 3, 6, 7),
      Int32Array.of(1, 2, 3, 4, 7, 8),
      new Float64Array(6).fill(1),
    );
    const { smoothed } = read(network, {
      values: Float64Array.of(1, 2, 4, 3, 5, NaN, NaN, NaN, NaN),
      filter: { kind: 'tikhonov', alpha: 1 },
    }).columns;
    expect([...smoothed].map(Number.isNaN)).toEqual([
      false,
      false,
      false,
      false,
      false,
      true,
      true,
      true,
      true,
    ]);
  });

  test('weights over twelve orders of magnitude give finite scores', () => {
    const ends = Array.from({ length: 39 }, (_, i) => i);
    const network = buildNetwork(
      40,
      Int32Array.from(ends),
      Int32Array.from(ends, (i) => i + 1),
      Float64Array.from(ends, (i) => 10 ** ((i % 13) - 6)),
    );
    const { smoothed } = read(network, {
      values: Float64Array.from({ length: 40 }, (_, i) => Math.sin(i)),
      filter: { kind: 'two-level' },
    }).columns;
    expect(smoothed.every(Number.isFinite)).toBe(true);
  });

  test('ten thousand components of two members, and a star of a hundred thousand, are answered', () => {
    const starts = Int32Array.from({ length: 10_000 }, (_, i) => 2 * i);
    const pairs = buildNetwork(
      20_000,
      starts,
      starts.map((i) => i + 1),
      new Float64Array(10_000).fill(1),
    );
    const rays = Int32Array.from({ length: 99_999 }, (_, i) => i + 1);
    const star = buildNetwork(100_000, new Int32Array(99_999), rays, new Float64Array(99_999).fill(1));
    for (const network of [pairs, star]) {
      const values = Float64Array.from({ length: network.n }, (_, i) => Math.sin(i * i));
      const { columns, residual, alpha } = read(network, { values, filter: { kind: 'two-level' } });
      expect(columns.smoothed.every(Number.isFinite)).toBe(true);
      expect(Number.isFinite(alpha)).toBe(true);
      expect(residual).toBeLessThanOrEqual(1e-10);
    }
  });
});
