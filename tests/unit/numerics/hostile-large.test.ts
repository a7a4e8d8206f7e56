import { describe, expect, it } from 'vitest';
import {
  agreement,
  applyFilter,
  components,
  describeGroups,
  energyCurve,
  fiedlerGrouping,
  globalStatistics,
  localMoran,
  localPermutations,
  mergeSmall,
  observedTies,
  renumber,
  spectralGrouping,
  spectralLayout,
  spectrum,
  type Network,
} from '@/numerics';
import {
  FILTERS,
  NO_GLOBAL,
  NO_LOCAL,
  NO_READING,
  reading,
  answers,
  pairs,
  values,
  wideStar,
} from './hostile';
import { fromTies } from './networks';

describe('ten thousand components of two members, and a star of a hundred thousand', () => {
  const cases: [string, Network][] = [
    ['pairs', pairs(10_000)],
    ['star', wideStar(100_000)],
  ];
  it.each(cases)('%s: groupings and statistics', (name, net) => {
    const signal = values(net.n, (i) => Math.sin(i * i));
    const { labels } = components(net);
    answers(() => fiedlerGrouping(net, { laplacian: 'regularised', cut: 'sweep', seed: 1 }), /^vector$/);
    const grouped = answers(() => spectralGrouping(net, { laplacian: 'regularised', k: 2, seed: 1 }));
    expect(grouped).toBe(name === 'pairs' ? 'too-small' : 'answered');
    answers(() => spectralLayout(net));
    answers(() => describeGroups(net, labels));
    answers(() => renumber(mergeSmall(net, labels, 4)));
    const agreed = agreement(labels, labels);
    expect([agreed.adjustedRand, agreed.normalisedMutualInformation]).toEqual([1, 1]);
    const ties = observedTies(net, signal);
    answers(() => globalStatistics(ties, 'row', 9, 1), NO_GLOBAL);
    answers(() => localMoran(ties, net.n), NO_LOCAL);
    answers(() => localPermutations(ties, net.n, 19, 1));
    const basis = spectrum(net, { laplacian: 'combinatorial', count: 3 });
    expect(answers(() => energyCurve(net, basis, signal, { permutations: 9, seed: 1 }))).toBe('answered');
  });

  it.each(cases)('%s: readings', (_name, net) => {
    const signal = values(net.n, (i) => Math.sin(i * i));
    for (const filter of FILTERS.filter((one) => one.kind !== 'two-level'))
      expect(answers(() => reading(net, signal, filter, 'normalised'), NO_READING)).toBe('answered');
  });

  it('a network above 2,000 members without ties is filtered by its one frequency, 0', () => {
    const alone = fromTies(2_001, []);
    const signal = values(2_001, (i) => i);
    const kept = applyFilter(alone, 'combinatorial', { kind: 'low-pass', cutoff: 0.1 }, signal);
    expect(kept.values).toEqual(signal);
    const none = applyFilter(alone, 'normalised', { kind: 'band-pass', from: 0.1, to: 1 }, signal);
    expect(none.values.every((one) => one === 0)).toBe(true);
  });
});
