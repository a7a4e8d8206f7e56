import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  chiSquaredP,
  chiSquaredQuantile,
  createRandom,
  erfc,
  incompleteGamma,
  multiDeparture,
  UnanswerableError,
} from '@/numerics';
import { consistencyFactor, smallSampleFactor } from '@/numerics/statistics/covariance-factors';
import { coveredCount, minimumCovariance } from '@/numerics/statistics/minimum-covariance';
import { isSingular, scatterOf, squaredDistances } from '@/numerics/statistics/scatter';
import { columnsOf, HAWKINS_BRADU_KASS, STACK_LOSS } from './published';

const noise = (n: number, k: number, seed: number): Float64Array[] => {
  const random = createRandom(seed);
  return Array.from({ length: k }, () => Float64Array.from({ length: n }, () => random.normal()));
};
const flagged = (p: Float64Array, line: number): number[] =>
  [...p.keys()].filter((i) => p[i]! <= line).map((i) => i + 1);

function* choices(n: number, size: number, from = 0): Generator<number[]> {
  if (size === 0) yield [];
  else
    for (let i = from; i <= n - size; i++) for (const rest of choices(n, size - 1, i + 1)) yield [i, ...rest];
}

describe('chi-squared', () => {
  it.each([0.01, 0.5, 1, 2.7, 8, 30, 200, 1_000])(
    'finite sums at x = %f (Abramowitz & Stegun 1964, 26.4.4–5)',
    (x) => {
      let even = Math.exp(-x / 2);
      let evenTerm = even;
      let odd = erfc(Math.sqrt(x / 2));
      let oddTerm = Math.sqrt((2 * x) / Math.PI) * Math.exp(-x / 2);
      for (let k = 1; k <= 15; k += 2) {
        expect(chiSquaredP(x, k) / odd).toBeCloseTo(1, 11);
        expect(chiSquaredP(x, k + 1) / even).toBeCloseTo(1, 11);
        odd += oddTerm;
        oddTerm *= x / (k + 2);
        evenTerm *= x / (k + 1);
        even += evenTerm;
      }
    },
  );

  it('for two degrees of freedom p is exp(−x/2), and the quantile −2 log(1 − share)', () => {
    for (const x of [0.1, 1, 5, 40, 300]) expect(chiSquaredP(x, 2) / Math.exp(-x / 2)).toBeCloseTo(1, 12);
    for (const share of [0.01, 0.5, 0.975, 0.9999])
      expect(chiSquaredQuantile(share, 2)).toBeCloseTo(-2 * Math.log1p(-share), 10);
  });

  it('percentiles of Abramowitz & Stegun 1964, table 26.8', () => {
    expect(chiSquaredQuantile(0.95, 1)).toBeCloseTo(3.84146, 5);
    expect(chiSquaredQuantile(0.975, 3)).toBeCloseTo(9.3484, 4);
    expect(chiSquaredQuantile(0.99, 10)).toBeCloseTo(23.2093, 4);
    expect(chiSquaredQuantile(0.005, 30)).toBeCloseTo(13.7867, 4);
  });

  it('P and Q add to 1, also where the series meets the fraction, and at the ends', () => {
    for (const a of [0.5, 1, 3.5, 50])
      for (const x of [a + 1 - 1e-9, a + 1 + 1e-9]) {
        const { P, Q } = incompleteGamma(a, x);
        expect(P + Q).toBeCloseTo(1, 14);
        expect(Q).toBeCloseTo(incompleteGamma(a, a + 1).Q, 8);
      }
    expect(incompleteGamma(2, 0)).toEqual({ P: 0, Q: 1 });
    expect(incompleteGamma(2, Infinity)).toEqual({ P: 1, Q: 0 });
  });
});

describe('factors', () => {
  it('consistency in closed form for k = 2: share / (1 − (1 − share)(1 + q/2)), q = −2 log(1 − share)', () => {
    for (const share of [0.5, 0.75, 0.975]) {
      const q = -2 * Math.log1p(-share);
      expect(consistencyFactor(2, share)).toBeCloseTo(share / (1 - (1 - share) * (1 + q / 2)), 10);
    }
    expect(consistencyFactor(3, 1)).toBe(1);
  });

  it('small samples: above 1, shrinking to it, and through the points of Pison, Van Aelst & Willems 2002 for k > 2', () => {
    for (const stage of ['raw', 'reweighted'] as const)
      for (const k of [1, 2, 3, 5, 8]) {
        expect(smallSampleFactor(stage, 10 * k, k, 0.75)).toBeGreaterThan(1);
        expect(smallSampleFactor(stage, 100 * k, k, 0.75)).toBeLessThan(
          smallSampleFactor(stage, 10 * k, k, 0.75),
        );
        expect(smallSampleFactor(stage, 1e7, k, 0.75)).toBeCloseTo(1, 2);
      }
    expect(1 / smallSampleFactor('raw', 2 * 16, 4, 0.5)).toBeCloseTo(
      1 - 1.42764571687802 / 4 ** 1.26263336932151,
      12,
    );
    expect(1 / smallSampleFactor('raw', 3 * 16, 4, 0.5)).toBeCloseTo(
      1 - 1.06141115981725 / 4 ** 1.28907991440387,
      12,
    );
  });
});

describe('published data', () => {
  it('Hawkins, Bradu & Kass 1984: cases 1–14 and no others (Rousseeuw & van Zomeren 1990)', () => {
    const columns = columnsOf(HAWKINS_BRADU_KASS);
    for (const seed of [1, 2, 3]) {
      const { p, q, centre, kept, distance } = multiDeparture(columns, { seed });
      const outliers = Array.from({ length: 14 }, (_, i) => i + 1);
      expect(flagged(p, 0.001)).toEqual(outliers);
      expect(flagged(q, 0.01)).toEqual(outliers);
      // The reweighted estimate is that of the clean cases 15–75.
      expect(kept).toBe(61);
      columns.forEach((column, a) =>
        expect(centre[a]).toBeCloseTo(column.slice(14).reduce((sum, one) => sum + one, 0) / 61, 12),
      );
      expect(Math.min(...distance.slice(0, 14)) / Math.max(...distance.slice(14))).toBeGreaterThan(5);
    }
  });

  it('stack loss: no other h days have a smaller determinant, and the farthest are days 1, 2, 3 and 21 without the loss (Rousseeuw & van Zomeren 1990), 1, 3, 4 and 21 with it (Rousseeuw & Leroy 1987, chapter 3)', () => {
    for (const [k, farthest] of [
      [3, [1, 2, 3, 21]],
      [4, [1, 3, 4, 21]],
    ] as const) {
      const rows = Float64Array.from(STACK_LOSS.flatMap((row) => row.slice(0, k)));
      const found = minimumCovariance(rows, k, 1);
      let least = Infinity;
      for (const chosen of choices(21, coveredCount(21, k))) {
        const scatter = scatterOf(rows, k, Int32Array.from(chosen));
        if (!isSingular(scatter)) least = Math.min(least, scatter.logDeterminant);
      }
      expect(found.logDeterminant).toBeCloseTo(least, 10);
      const distances = squaredDistances(rows, found);
      const four = [...distances.keys()].sort((a, b) => distances[b]! - distances[a]!).slice(0, 4);
      expect(four.map((i) => i + 1).sort((a, b) => a - b)).toEqual(farthest);
    }
  });

  it('stack loss: days 1, 3, 4 and 21 stand apart with the loss (Rousseeuw & Leroy 1987, chapter 3)', () => {
    const { p } = multiDeparture(columnsOf(STACK_LOSS), { seed: 1 });
    for (const day of [1, 3, 4, 21]) expect(p[day - 1]).toBeLessThan(0.025);
  });
});

describe('calibration on Gaussian members', () => {
  it.each([
    [60, 2, 20],
    [200, 4, 10],
    [2_000, 5, 2],
  ])('%i members, %i attributes: p is about uniform and nobody, as a rule, has q ≤ 5 %%', (n, k, rounds) => {
    let below = 0;
    let half = 0;
    let discoveries = 0;
    for (let seed = 1; seed <= rounds; seed++) {
      const { p, q } = multiDeparture(noise(n, k, seed), { seed });
      below += flagged(p, 0.05).length;
      half += flagged(p, 0.5).length;
      discoveries += flagged(q, 0.05).length > 0 ? 1 : 0;
    }
    expect(below / (n * rounds)).toBeGreaterThan(0.03);
    expect(below / (n * rounds)).toBeLessThan(0.08);
    expect(half / (n * rounds)).toBeGreaterThan(0.45);
    expect(half / (n * rounds)).toBeLessThan(0.55);
    expect(discoveries).toBeLessThanOrEqual(0.4 * rounds);
  });

  it('correlated attributes: who breaks the pattern is found, though no single departure is large', () => {
    const [a, b] = noise(400, 2, 5);
    const second = a!.map((one, i) => 0.95 * one + Math.sqrt(1 - 0.95 ** 2) * b![i]!);
    a![7] = 1.8;
    second[7] = -1.8;
    const { q, distance } = multiDeparture([a!, second], { seed: 1 });
    expect(q[7]).toBeLessThan(1e-6);
    expect(distance.indexOf(Math.max(...distance))).toBe(7);
  });

  it('a fifth of the members far away in one direction do not hide each other', () => {
    const columns = noise(500, 3, 9).map((column) => column.map((one, i) => (i < 100 ? 0.3 * one + 8 : one)));
    const { q } = multiDeparture(columns, { seed: 1 });
    expect(flagged(q, 0.01).filter((i) => i <= 100).length).toBe(100);
    expect(flagged(q, 0.01).filter((i) => i > 100).length).toBeLessThan(5);
  });
});

it('affine equivariance: new units and combinations of the attributes leave every distance as it is', () => {
  const entry = fc.double({ min: -2, max: 2, noNaN: true });
  fc.assert(
    fc.property(
      fc.integer({ min: 1, max: 1_000 }),
      fc.array(entry, { minLength: 9, maxLength: 9 }),
      fc.integer({ min: -6, max: 6 }),
      (seed, m, exponent) => {
        const columns = noise(80, 3, seed).map((column) => column.map((one, i) => (i < 8 ? one + 6 : one)));
        // Diagonally dominant, so that it can be undone.
        const matrix = m.map((one, at) => (at % 4 === 0 ? 5 + one : one / 2));
        const mixed = [0, 1, 2].map((a) =>
          columns[0]!.map(
            (_, i) =>
              10 ** exponent *
              [0, 1, 2].reduce((sum, b) => sum + matrix[3 * a + b]! * columns[b]![i]!, a * 7),
          ),
        );
        const [before, after] = [multiDeparture(columns, { seed }), multiDeparture(mixed, { seed })];
        before.distance.forEach((one, i) => expect(after.distance[i]! / one).toBeCloseTo(1, 7));
        expect(after.kept).toBe(before.kept);
      },
    ),
    { numRuns: 12 },
  );
});

it('a member without some attributes is measured in those there are; one without any is not tested', () => {
  const columns = noise(300, 3, 4);
  columns[0]![10] = NaN;
  columns[2]![10] = NaN;
  columns[1]![10] = 6;
  columns.forEach((column) => (column[11] = NaN));
  const { distance, degrees, p, q, centre, covariance, complete, tested } = multiDeparture(columns, {
    seed: 1,
  });
  expect(complete).toBe(298);
  expect(tested).toBe(299);
  expect([degrees[9], degrees[10], degrees[11]]).toEqual([3, 1, 0]);
  // One attribute alone: distance² = (z − centre)² / variance, with the two-sided normal p.
  expect(distance[10]).toBeCloseTo(Math.abs(6 - centre[1]!) / Math.sqrt(covariance[4]!), 10);
  expect(p[10]).toBeCloseTo(erfc(distance[10]! / Math.SQRT2), 15);
  for (const line of [distance, p, q]) {
    expect(line[11]).toBeNaN();
    expect(line.filter(Number.isNaN).length).toBe(1);
  }
});

it('the same seed gives the same bytes, and large samples go through their parts', () => {
  const columns = noise(20_000, 4, 2).map((column) => column.map((one, i) => (i < 1_000 ? one + 5 : one)));
  const begun = performance.now();
  const first = multiDeparture(columns, { seed: 3 });
  expect(performance.now() - begun).toBeLessThan(30_000);
  expect(multiDeparture(columns, { seed: 3 })).toEqual(first);
  expect(flagged(first.q, 0.05).filter((i) => i <= 1_000).length).toBeGreaterThan(990);
});

describe('refuses in words', () => {
  const code = (columns: Float64Array[], names?: string[]): [string, string] => {
    try {
      multiDeparture(columns, { seed: 1, ...(names ? { names } : {}) });
    } catch (error) {
      if (error instanceof UnanswerableError) return [error.code, error.message];
      throw error;
    }
    return ['none', ''];
  };
  it('when there are too few members, or no attributes, or values that are not finite', () => {
    expect(code(noise(15, 3, 1))[0]).toBe('too-few-observed');
    expect(code(noise(16, 3, 1))[0]).toBe('none');
    expect(multiDeparture(noise(149, 3, 1), { seed: 1 }).notes.length).toBe(1);
    expect(multiDeparture(noise(150, 3, 1), { seed: 1 }).notes).toEqual([]);
    expect(code([])[0]).toBe('no-attributes');
    expect(code([Float64Array.of(1, 2, 3, 4, 5, 6, Infinity)])[0]).toBe('bad-values');
    expect(code([new Float64Array(20).fill(NaN)])[0]).toBe('too-few-observed');
  });
  it('when an attribute is constant, or follows from the others, with its name', () => {
    const [a, b] = noise(100, 2, 1);
    expect(code([a!, b!.map(() => 3)], ['calls', 'visits'])).toEqual([
      'constant-attribute',
      expect.stringContaining('“visits”') as string,
    ]);
    expect(code([a!, b!.map((one, i) => (i < 90 ? 3 : one))], ['calls', 'visits'])).toEqual([
      'constant-attribute',
      expect.stringContaining('“visits”') as string,
    ]);
    const sum = a!.map((one, i) => one + b![i]!);
    expect(code([a!, b!, sum], ['calls', 'visits', 'both'])).toEqual([
      'collinear-attribute',
      expect.stringContaining('“both”') as string,
    ]);
    const mostly = sum.map((one, i) => (i < 90 ? one : one + i));
    expect(code([a!, b!, mostly])[0]).toBe('collinear-attribute');
  });
});
