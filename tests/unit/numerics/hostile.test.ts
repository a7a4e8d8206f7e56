import { describe, expect, it } from 'vitest';
import {
  agreement,
  applyFilter,
  benjaminiHochberg,
  boundaryMembers,
  buildNetwork,
  chiSquaredP,
  components,
  createRandom,
  describeGroups,
  energyCurve,
  erfc,
  fiedlerGrouping,
  fromCsr,
  globalStatistics,
  incompleteGamma,
  kMeans,
  laplacianOperator,
  localMoran,
  localPermutations,
  median,
  mergeSmall,
  modularity,
  multiDeparture,
  observedTies,
  renumber,
  rowStandardised,
  ShiftedSystems,
  spectralGrouping,
  spectralLayout,
  spectrum,
  symmetricEigen,
  twoSidedP,
  type ChosenFilter,
} from '@/numerics';
import {
  FILTERS,
  LAPLACIANS,
  NO_GLOBAL,
  NO_LOCAL,
  NO_READING,
  reading,
  answers,
  chain,
  NETWORKS,
  SIGNALS,
  values,
  wideStar,
} from './hostile';
import { complete, path, ring } from './networks';

describe.each(NETWORKS)('%s: everything is answered in finite numbers or refused in words', (_name, net) => {
  const labels = Int32Array.from({ length: net.n }, (_, i) => i % 3);

  it('spectra, groupings, layout', () => {
    answers(() => components(net));
    for (const laplacian of LAPLACIANS) {
      answers(() => laplacianOperator(net, laplacian).dense());
      answers(() => spectrum(net, { laplacian, count: 'all' }));
      answers(() => spectrum(net, { laplacian, count: 3 }));
      for (const cut of ['sign', 'median', 'sweep'] as const)
        // The ordering vector is NaN outside the component that was split.
        answers(() => fiedlerGrouping(net, { laplacian, cut, seed: 1 }), /^vector$/);
      for (const k of ['auto', 2, 5] as const)
        answers(() => spectralGrouping(net, { laplacian, k, seed: 1 }));
    }
    answers(() => spectralLayout(net));
    answers(() => describeGroups(net, labels));
    answers(() => boundaryMembers(net, labels));
    answers(() => renumber(mergeSmall(net, labels, 4)));
    answers(() => modularity(net, labels) ?? 0);
    answers(() => agreement(labels, labels));
    answers(() => fromCsr(net.offsets, net.targets, net.weights));
  });

  it.each(SIGNALS)('statistics of an attribute: %s', (_signal, make) => {
    const signal = make(net.n);
    for (const style of ['row', 'raw'] as const) {
      answers(() => globalStatistics(observedTies(net, signal), style, 9, 1), NO_GLOBAL);
      answers(() => localMoran(observedTies(net, signal), net.n, style), NO_LOCAL);
      answers(() => localPermutations(observedTies(net, signal), net.n, 9, 1, style), /^/);
    }
    answers(() => rowStandardised(observedTies(net, signal)));
    for (const laplacian of LAPLACIANS)
      answers(() =>
        energyCurve(net, spectrum(net, { laplacian, count: 'all' }), signal, { permutations: 9, seed: 1 }),
      );
  });

  it.each(SIGNALS)('readings of an attribute: %s', (_signal, make) => {
    const signal = make(net.n);
    for (const filter of FILTERS)
      for (const laplacian of filter.kind === 'two-level' ? LAPLACIANS.slice(0, 1) : LAPLACIANS)
        if (answers(() => reading(net, signal, filter, laplacian), NO_READING) === 'answered') {
          const { columns } = reading(net, signal, filter, laplacian);
          // Whoever is tested has numbers, and nobody has an infinite one.
          columns.tested.forEach((one, i) => {
            expect(Number.isFinite(columns.p[i])).toBe(one === 1);
            if (one === 1)
              expect(Number.isFinite(columns.z[i]! + columns.q[i]! + columns.departure[i]!)).toBe(true);
          });
          for (const column of [columns.z, columns.departure, columns.local.z])
            expect(column.some((one) => Math.abs(one) === Infinity)).toBe(false);
        }
  });
});

describe('words that fit', () => {
  const code = (signal: number[], more = {}, net = ring(12)): string =>
    answers(
      () => reading(net, Float64Array.from(signal), { kind: 'two-level' }, 'combinatorial', more),
      NO_READING,
    );
  const twelve = Array.from({ length: 12 }, (_, i) => Math.sin(i * i));
  it.each([
    ['an infinite value', [Infinity, ...twelve.slice(1)], 'bad-values'],
    ['a value beyond 1e100', [1e101, ...twelve.slice(1)], 'bad-values'],
    ['values 1e-110 apart', twelve.map((one) => 1e-110 * one), 'bad-values'],
    ['an attribute of another network', twelve.slice(1), 'bad-values'],
    ['all equal', twelve.map(() => 3), 'constant-attribute'],
    ['all missing', twelve.map(() => NaN), 'all-missing'],
  ])('%s', (_name, signal, expected) => expect(code(signal)).toBe(expected));

  it('settings out of range', () => {
    expect(code(twelve, { filter: { kind: 'tikhonov', alpha: 0 } })).toBe('bad-strength');
    expect(code(twelve, { filter: { kind: 'tikhonov', alpha: NaN } })).toBe('bad-strength');
    const filters: ChosenFilter[] = [
      { kind: 'heat', tau: -1 },
      { kind: 'heat', tau: Infinity },
      { kind: 'low-pass', keep: 0 },
      { kind: 'low-pass', keep: 1.5 },
      { kind: 'high-pass', cutoff: NaN },
      { kind: 'band-pass', from: 2, to: 1 },
    ];
    for (const filter of filters) {
      expect(code(twelve, { filter })).toBe('bad-filter');
      expect(answers(() => applyFilter(ring(12), 'normalised', filter, Float64Array.from(twelve)))).toBe(
        'bad-filter',
      );
    }
    expect(code(twelve, { permutations: -1 })).toBe('bad-permutations');
    expect(code(twelve, { precision: new Float64Array(12).fill(Infinity) })).toBe('bad-values');
    expect(code(twelve, { groups: new Int32Array(3) })).toBe('bad-values');
    // A precision that is missing or 0 counts as 1.
    expect(code(twelve, { precision: values(12, (i) => (i % 2 === 0 ? NaN : 0)) })).toBe('answered');
  });

  it('an attribute in which one member differs flags that member, not nobody', () => {
    const { columns, sigma } = reading(
      ring(30),
      values(30, (i) => (i === 7 ? 1 : 0)),
      { kind: 'two-level' },
      'combinatorial',
    );
    expect(sigma).toBeGreaterThan(0);
    expect(columns.tested.every((one) => one === 1)).toBe(true);
    expect(columns.p.indexOf(Math.min(...columns.p))).toBe(7);
    const large = reading(
      wideStar(2_500),
      values(2_500, (i) => (i === 7 ? 1 : 0)),
      { kind: 'two-level' },
      'combinatorial',
    );
    expect(large.columns.p.indexOf(Math.min(...large.columns.p))).toBe(7);
  });

  it('where no order of the values changes a statistic it has no z, no p, and the permutation p 1', () => {
    const { moran, geary } = globalStatistics(
      observedTies(
        complete(9),
        values(9, (i) => i * i),
      ),
      'row',
      19,
      1,
    );
    for (const one of [moran, geary]) {
      expect(one.variance).toBe(0);
      expect(one.z).toBeNaN();
      expect(one.permutationP).toBe(1);
    }
  });

  it('global statistics do not change with the unit of the weights', () => {
    const signal = values(30, (i) => Math.sin(i * i));
    const usual = globalStatistics(
      observedTies(
        chain(30, (i) => 1 + (i % 3)),
        signal,
      ),
      'raw',
      19,
      1,
    );
    for (const unit of [2 ** -900, 2 ** 900])
      expect(
        globalStatistics(
          observedTies(
            chain(30, (i) => unit * (1 + (i % 3))),
            signal,
          ),
          'raw',
          19,
          1,
        ),
      ).toEqual(usual);
  });
});

describe('numbers without a network', () => {
  it('tails of distributions', () => {
    expect([erfc(Infinity), erfc(-Infinity), twoSidedP(Infinity), erfc(1e9)]).toEqual([0, 2, 0, 0]);
    expect([chiSquaredP(0, 3), chiSquaredP(Infinity, 3), chiSquaredP(1e9, 3)]).toEqual([1, 0, 0]);
    for (const a of [0.5, 1e-3, 1e5])
      for (const x of [1e-300, 1, 1e5, 1e300]) {
        const { P, Q } = incompleteGamma(a, x);
        expect(P >= 0 && P <= 1 && Q >= 0 && Q <= 1).toBe(true);
      }
  });

  it('medians and q of nothing', () => {
    expect(median([])).toBeNaN();
    expect(median([NaN, 2, Infinity])).toBe(2);
    expect([...benjaminiHochberg(Float64Array.of(NaN, NaN))]).toEqual([NaN, NaN]);
    expect(benjaminiHochberg(new Float64Array()).length).toBe(0);
  });

  it('k-means of coordinates that are not finite, of nobody, and of fewer than k', () => {
    const random = createRandom(1);
    expect(
      answers(() =>
        kMeans(
          values(8, () => NaN),
          2,
          2,
          random,
        ),
      ),
    ).toBe('bad-values');
    expect(
      answers(() =>
        kMeans(
          values(8, (i) => i),
          2,
          0,
          random,
        ),
      ),
    ).toBe('bad-k');
    expect(answers(() => kMeans(new Float64Array(), 2, 2, random))).toBe('answered');
    expect(
      answers(() =>
        kMeans(
          values(4, (i) => i),
          2,
          5,
          random,
        ),
      ),
    ).toBe('answered');
    expect(
      answers(() =>
        kMeans(
          values(40, () => 1),
          2,
          5,
          random,
        ),
      ),
    ).toBe('answered');
  });

  it('solvers of what is not finite', () => {
    const l = laplacianOperator(path(4), 'combinatorial');
    const ones = new Float64Array(4).fill(1);
    const systems = new ShiftedSystems(l);
    const missing = values(4, () => NaN);
    expect(answers(() => systems.solve(ones, 1, [missing]))).toBe('bad-values');
    expect(answers(() => systems.solve(ones, NaN, [ones]))).toBe('bad-values');
    systems.close();
    expect(answers(() => symmetricEigen(new Float64Array(9).fill(NaN), 3))).toBe('not-converged');
  });

  it('ties that are not finite, or of nobody', () => {
    const tie = (from: number, to: number, weight: number) =>
      answers(() => buildNetwork(3, Int32Array.of(from), Int32Array.of(to), Float64Array.of(weight)));
    expect([tie(0, 1, NaN), tie(0, 1, Infinity), tie(0, 1, -1), tie(0, 3, 1), tie(1, 1, 1)]).toEqual(
      Array<string>(5).fill('bad-tie'),
    );
  });

  it('departures: constant, missing, duplicated, of one member', () => {
    const usual = values(60, (i) => Math.sin(i * i));
    const run = (...columns: Float64Array[]) =>
      answers(() => multiDeparture(columns, { seed: 1 }), /^(distance|p|q)$/);
    expect(run(usual, usual)).toBe('collinear-attribute');
    expect(
      run(
        usual,
        usual.map(() => 0),
      ),
    ).toBe('constant-attribute');
    expect(
      run(
        usual,
        usual.map(() => NaN),
      ),
    ).toBe('too-few-observed');
    expect(run(Float64Array.of(1))).toBe('too-few-observed');
    expect(run(usual.map((one) => 1e200 * one))).toBe('bad-values');
    expect(
      run(
        usual,
        usual.map((_, i) => i % 2),
      ),
    ).toBe('answered');
    expect(
      run(
        usual.map((one) => 1e90 * one),
        usual.map((_, i) => 1e-90 * Math.cos(3 * i)),
      ),
    ).toBe('answered');
  });
});
