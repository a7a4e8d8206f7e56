import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  agreement,
  cholesky,
  choleskySolve,
  components,
  createRandom,
  dot,
  fiedlerGrouping,
  laplacianOperator,
  localMoran,
  observedTies,
  spectralGrouping,
  spectrum,
  subnetwork,
  takeReading,
  type LaplacianKind,
  type Network,
  type ReadingFilter,
} from '@/numerics';
import { chebyshev, exactly } from '@/numerics/filters/chosen';
import { exactBasis } from '@/numerics/smoothers/exact-basis';
import { ExactSystem } from '@/numerics/smoothers/exact-system';
import { LargeSystem } from '@/numerics/smoothers/large-system';
import { ShiftedSystems } from '@/numerics/solvers';
import type { Problem } from '@/numerics/smoothers';
import { planted } from './networks';
import { plant } from './planted';

const seeds = fc.integer({ min: 1, max: 100_000 });
const kinds = fc.constantFrom<LaplacianKind>('combinatorial', 'normalised', 'regularised');
const strengths = fc.double({ min: -2, max: 3, noNaN: true }).map((place) => 10 ** place);

const read = (
  network: Network,
  values: Float64Array,
  filter: ReadingFilter,
  more: { laplacian?: LaplacianKind; groups?: Int32Array; precision?: Float64Array } = {},
) =>
  takeReading(network, {
    values,
    precision: null,
    groups: null,
    laplacian: 'combinatorial',
    neighbourFloor: 2,
    permutations: 0,
    seed: 1,
    filter,
    ...more,
  });
const close = (a: Float64Array, b: Float64Array, bar: number): void => {
  expect(Array.from(a, Number.isNaN)).toEqual(Array.from(b, Number.isNaN));
  a.forEach((one, i) => {
    if (!Number.isNaN(one))
      expect(Math.abs(one - b[i]!)).toBeLessThanOrEqual(bar * Math.max(1, Math.abs(one)));
  });
};

describe('permuting members', () => {
  const shuffled = (n: number, seed: number): Int32Array =>
    createRandom(seed).shuffle(Int32Array.from({ length: n }, (_, i) => i));

  it('permutes readings', () => {
    fc.assert(
      fc.property(
        seeds,
        fc.constantFrom<ReadingFilter>(
          { kind: 'two-level' },
          { kind: 'tikhonov', alpha: 2 },
          { kind: 'tikhonov', alpha: 'gcv' },
          { kind: 'heat', tau: 1 },
          { kind: 'low-pass', cutoff: 0.4 },
        ),
        kinds,
        (seed, filter, laplacian) => {
          const { network, groups, values } = plant({ n: 80, k: 3, seed, missing: 0.1 });
          const order = shuffled(80, seed);
          const first = read(network, values, filter, { groups, laplacian });
          const second = read(
            subnetwork(network, order),
            Float64Array.from(order, (i) => values[i]!),
            filter,
            { groups: Int32Array.from(order, (i) => groups[i]!), laplacian },
          );
          for (const name of ['smoothed', 'standardError', 'departure', 'leverage', 'z', 'p', 'q'] as const)
            close(
              Float64Array.from(order, (i) => first.columns[name][i]!),
              second.columns[name],
              1e-5,
            );
          close(
            Float64Array.from(order, (i) => first.columns.local.I[i]!),
            second.columns.local.I,
            1e-9,
          );
          expect(second.moran.row.z).toBeCloseTo(first.moran.row.z, 8);
          expect(second.smoothness.quadratic / first.smoothness.quadratic).toBeCloseTo(1, 5);
        },
      ),
      { numRuns: 25 },
    );
  });

  it('permutes groupings', () => {
    fc.assert(
      fc.property(seeds, (seed) => {
        const { network } = planted(120, 2, 12, 0.05, seed);
        const order = shuffled(120, seed);
        const other = subnetwork(network, order);
        for (const group of [
          (net: Network) => fiedlerGrouping(net, { laplacian: 'regularised', cut: 'sweep', seed: 1 }).labels,
          (net: Network) => spectralGrouping(net, { laplacian: 'regularised', k: 2, seed: 1 }).labels,
        ]) {
          const labels = group(network);
          const here = Int32Array.from(order, (i) => labels[i]!);
          expect(agreement(here, group(other)).adjustedRand).toBe(1);
        }
      }),
      { numRuns: 20 },
    );
  });
});

it('the smooth filters agree in the spectral and in the vertex domain to 1e-6 of the signal', () => {
  fc.assert(
    fc.property(seeds, kinds, fc.double({ min: 0.01, max: 20, noNaN: true }), (seed, laplacian, tau) => {
      const { network } = planted(60, 3, 6, 0.3, seed);
      const random = createRandom(seed);
      const signal = Float64Array.from({ length: 60 }, () => random.normal());
      const filter = { kind: 'heat', tau } as const;
      const [spectral, vertex] = [exactly, chebyshev].map(
        (of) => of(network, laplacian, filter, signal).values,
      );
      const size = Math.sqrt(dot(signal, signal));
      spectral!.forEach((one, i) => expect(Math.abs(one - vertex![i]!)).toBeLessThanOrEqual(1e-6 * size));
    }),
    { numRuns: 40 },
  );
});

it('Parseval: the energy of a signal is that of its transform, for every Laplacian', () => {
  fc.assert(
    fc.property(seeds, kinds, fc.integer({ min: 2, max: 60 }), (seed, laplacian, n) => {
      const { network } = planted(60, 3, 4, 0.3, seed);
      const part = subnetwork(
        network,
        Int32Array.from({ length: n }, (_, i) => i),
      );
      if (part.targets.length === 0) return;
      const random = createRandom(seed);
      const signal = Float64Array.from({ length: n }, () => random.normal());
      const { vectors } = spectrum(part, { laplacian, count: 'all' });
      const energy = vectors.reduce((sum, u) => sum + dot(u, signal) ** 2, 0);
      expect(energy / dot(signal, signal)).toBeCloseTo(1, 10);
    }),
    { numRuns: 40 },
  );
});

/** A community with scores, precision weights and missing members, as a problem of the smoothers. */
function problemOf(seed: number, laplacian: LaplacianKind, levels: boolean): Problem {
  const { network, values, groups } = plant({ n: 70, k: 3, seed, missing: 0.15 });
  const random = createRandom(seed);
  const observed = Uint8Array.from(values, (one) => (Number.isNaN(one) ? 0 : 1));
  return {
    l: laplacianOperator(network, laplacian),
    observed,
    y: values.map((one) => (Number.isNaN(one) ? 0 : one)),
    s: Float64Array.from(observed, (one) => one * (0.5 + random.next())),
    groups: levels ? groups : null,
    nullity: laplacian === 'regularised' ? 1 : components(network).count,
  };
}
const without = (problem: Problem, i: number): Problem => ({
  ...problem,
  observed: problem.observed.with(i, 0),
  s: problem.s.with(i, 0),
  y: problem.y.with(i, 0),
});
/** Whether every component keeps an observed member. */
const estimable = ({ l, observed }: Problem): boolean => {
  const { count, labels } = components(l.network);
  return new Set(labels.filter((_, i) => observed[i] === 1)).size === count;
};

it('leverages sum to the effective degrees of freedom tr (S + αL)⁻¹S, inverted densely', () => {
  fc.assert(
    fc.property(seeds, kinds, strengths, (seed, laplacian, alpha) => {
      const problem = problemOf(seed, laplacian, false);
      if (!estimable(problem)) return;
      const n = problem.l.n;
      const a = problem.l.dense().map((one) => alpha * one);
      problem.s.forEach((s, i) => (a[i * n + i]! += s));
      cholesky(a, n);
      let trace = 0;
      for (let i = 0; i < n; i++) {
        const column = new Float64Array(n);
        column[i] = problem.s[i]!;
        choleskySolve(a, n, column);
        trace += column[i]!;
      }
      const none = new Uint8Array(n);
      const exact = new ExactSystem(problem, exactBasis(problem), none).fit(alpha);
      const large = new LargeSystem(problem, none, 1, new ShiftedSystems(problem.l)).fit(alpha);
      large.refine([...none.keys()]);
      for (const { leverage } of [exact, large])
        expect(leverage.reduce((sum, one) => sum + one, 0) / trace).toBeCloseTo(1, 6);
      const values = problem.y.map((one, i) => (problem.observed[i] === 1 ? one : NaN));
      const { effectiveDegrees } = read(
        problem.l.network,
        values,
        { kind: 'tikhonov', alpha },
        {
          laplacian,
          precision: problem.s,
        },
      );
      expect(effectiveDegrees / trace).toBeCloseTo(1, 6);
    }),
    { numRuns: 30 },
  );
});

describe('left-out departures are those of really leaving each member out', () => {
  it('exactly and on the path for large networks, levels and weights included', () => {
    fc.assert(
      fc.property(seeds, kinds, fc.boolean(), strengths, (seed, laplacian, levels, alpha) => {
        const problem = problemOf(seed, laplacian, levels);
        const none = new Uint8Array(problem.l.n);
        const exact = new ExactSystem(problem, exactBasis(problem), none).fit(alpha);
        const large = new LargeSystem(problem, none, 1, new ShiftedSystems(problem.l)).fit(alpha);
        large.refine([...none.keys()]);
        const random = createRandom(seed);
        for (let round = 0; round < 4; round++) {
          const i = random.int(problem.l.n);
          const rest = without(problem, i);
          if (problem.observed[i] === 0 || !estimable(rest)) continue;
          const refit = new ExactSystem(rest, exactBasis(rest), none).fit(alpha);
          const departure = problem.y[i]! - refit.smoothed[i]!;
          for (const { smoothed, leverage } of [exact, large])
            expect((problem.y[i]! - smoothed[i]!) / (1 - leverage[i]!)).toBeCloseTo(departure, 5);
        }
      }),
      { numRuns: 30 },
    );
  });

  it('in a reading of 2,100 members, for those whose leverage is exact', () => {
    const { network, values } = plant({ n: 2_100, seed: 6 });
    const filter = { kind: 'tikhonov', alpha: 1 } as const;
    const { columns } = read(network, values, filter);
    const exact = [...columns.leverageExact.keys()].filter((i) => columns.leverageExact[i] === 1);
    expect(exact.length).toBeGreaterThan(10);
    for (const i of exact.slice(0, 4)) {
      const again = read(network, values.with(i, NaN), filter).columns;
      expect(columns.departure[i]).toBeCloseTo(values[i]! - again.smoothed[i]!, 6);
    }
  });
});

it('local Moran adds up to the global one: Σ I_i = S₀ I with raw weights (Anselin 1995)', () => {
  fc.assert(
    fc.property(seeds, (seed) => {
      const { network } = planted(60, 3, 6, 0.3, seed);
      const random = createRandom(seed);
      const signal = Float64Array.from({ length: 60 }, () => random.normal());
      const ties = observedTies(network, signal, 'counted');
      const total = localMoran(ties, 60, 'raw').I.reduce((sum, one) => sum + one, 0);
      const s0 = ties.weights.reduce((sum, one) => sum + one, 0);
      let cross = 0;
      for (let i = 0; i < ties.n; i++)
        for (let k = ties.offsets[i]!; k < ties.offsets[i + 1]!; k++)
          cross += ties.weights[k]! * ties.z[i]! * ties.z[ties.targets[k]!]!;
      expect(total).toBeCloseTo(s0 * ((60 / s0) * (cross / ties.squares)), 9);
    }),
    { numRuns: 20 },
  );
});
