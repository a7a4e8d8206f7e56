import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  agreement,
  boundaryMembers,
  components,
  createRandom,
  describeGroups,
  fiedlerGrouping,
  mergeSmall,
  refineByNeighbours,
  renumber,
  spectralGrouping,
  spectralLayout,
  UnanswerableError,
} from '@/numerics';
import { followBranches } from '@/numerics/groupings/branches';
import { barbell, fromTies, path, planted, star } from './networks';
import { plant } from './planted';

describe('fiedlerGrouping', () => {
  it.each(['sign', 'median', 'sweep'] as const)('splits a barbell at its bridge (%s)', (cut) => {
    for (const laplacian of ['combinatorial', 'normalised', 'regularised'] as const) {
      const { labels } = fiedlerGrouping(barbell(8), { laplacian, cut, seed: 1 });
      expect(Array.from(labels)).toEqual([...Array<number>(8).fill(0), ...Array<number>(8).fill(1)]);
    }
  });

  it('keeps other components as islets, largest first, and says what was split', () => {
    const ties: [number, number][] = [
      [0, 1],
      [2, 3],
      [3, 4],
      [4, 5],
      [5, 6],
      [6, 7],
      [8, 9],
      [9, 10],
    ];
    const grouping = fiedlerGrouping(fromTies(12, ties), {
      laplacian: 'combinatorial',
      cut: 'sweep',
      minimumSize: 2,
      seed: 1,
    });
    expect(Array.from(grouping.labels)).toEqual([3, 3, 0, 0, 0, 1, 1, 1, 2, 2, 2, 4]);
    expect(grouping.islets).toEqual([2, 3, 4]);
    expect(grouping.scope).toEqual({ members: 6, component: 1 });
    expect(Number.isNaN(grouping.vector[0])).toBe(true);
    expect(grouping.vector.slice(2, 8).every(Number.isFinite)).toBe(true);
  });

  it('splits within chosen members only', () => {
    const within = Int32Array.of(0, 1, 2, 3, 4, 5);
    const { labels } = fiedlerGrouping(path(10), {
      laplacian: 'normalised',
      cut: 'median',
      minimumSize: 1,
      within,
      seed: 1,
    });
    expect(Array.from(labels)).toEqual([0, 0, 0, 1, 1, 1, -1, -1, -1, -1]);
  });

  it('says in words what is missing', () => {
    expect(() => fiedlerGrouping(fromTies(3, []), { laplacian: 'normalised', cut: 'sign', seed: 1 })).toThrow(
      /no ties/,
    );
    expect(() =>
      fiedlerGrouping(path(6), { laplacian: 'normalised', cut: 'sweep', minimumSize: 4, seed: 1 }),
    ).toThrow(UnanswerableError);
  });

  it('the best sweep lies within Cheeger’s bounds (Chung 1997), and no part is below the smallest size', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 10_000 }), (seed) => {
        const { network } = planted(60, 3, 6, 0.3, seed);
        const grouping = fiedlerGrouping(network, {
          laplacian: 'normalised',
          cut: 'sweep',
          minimumSize: 1,
          seed,
        });
        const allowed = grouping.sweep.conductance.filter((_, p) => grouping.sweep.distinct[p] === 1);
        const best = Math.min(...allowed);
        expect(best).toBeGreaterThanOrEqual(grouping.cheeger.lower - 1e-12);
        expect(best).toBeLessThanOrEqual(grouping.cheeger.upper + 1e-12);
        const sized = fiedlerGrouping(network, {
          laplacian: 'normalised',
          cut: 'sweep',
          minimumSize: 10,
          seed,
        });
        const sizes = describeGroups(network, sized.labels).groups.map((group) => group.size);
        expect(Math.min(sizes[0]!, sizes[1]!)).toBeGreaterThanOrEqual(10);
      }),
      { numRuns: 25 },
    );
  });

  it('the regularised split does not fall for a thin branch', () => {
    const { network, labels } = planted(400, 2, 10, 0.1, 4);
    const ties: [number, number, number][] = [];
    for (let i = 0; i < 400; i++) {
      for (let p = network.offsets[i]!; p < network.offsets[i + 1]!; p++) {
        if (network.targets[p]! > i) ties.push([i, network.targets[p]!, network.weights[p]!]);
      }
    }
    for (let b = 0; b < 12; b++) ties.push([b === 0 ? 0 : 399 + b, 400 + b, 1]);
    const grown = fromTies(412, ties);
    const truth = Int32Array.from({ length: 412 }, (_, i) =>
      i < 400 && components(grown).labels[i] === 0 ? labels[i]! : -1,
    );
    const grouping = fiedlerGrouping(grown, { laplacian: 'regularised', cut: 'sweep', seed: 1 });
    expect(
      agreement(
        grouping.labels.map((label) => (label > 1 ? -1 : label)),
        truth,
      ).adjustedRand,
    ).toBeGreaterThan(0.9);
  });
});

describe('spectralGrouping', () => {
  it('finds planted groups and suggests their number', () => {
    const { network, labels } = planted(600, 5, 14, 0.15, 2);
    const grouping = spectralGrouping(network, { k: 'auto', laplacian: 'regularised', seed: 1 });
    expect(grouping.k).toBe(5);
    expect(grouping.suggestions[0]!.k).toBe(5);
    expect(agreement(grouping.labels, labels).adjustedRand).toBeGreaterThan(0.95);
    expect(spectralGrouping(network, { k: 'auto', laplacian: 'regularised', seed: 1 })).toEqual(grouping);
  });

  it('keeps small components as islets', () => {
    const { network } = planted(100, 2, 10, 0.1, 1);
    const ties: [number, number][] = [[100, 101]];
    for (let i = 0; i < 100; i++)
      for (let p = network.offsets[i]!; p < network.offsets[i + 1]!; p++)
        if (network.targets[p]! > i) ties.push([i, network.targets[p]!]);
    const grouping = spectralGrouping(fromTies(103, ties), { k: 2, laplacian: 'regularised', seed: 1 });
    expect(Array.from(grouping.labels.slice(100))).toEqual([2, 2, 3]);
    expect(grouping.islets).toEqual([2, 3]);
  });

  it('refuses what it cannot answer', () => {
    expect(() => spectralGrouping(fromTies(4, []), { k: 2, laplacian: 'regularised', seed: 1 })).toThrow(
      /no ties/,
    );
    expect(() => spectralGrouping(path(3), { k: 5, laplacian: 'regularised', seed: 1 })).toThrow(/too few/);
    expect(() => spectralGrouping(path(9), { k: 1.5, laplacian: 'regularised', seed: 1 })).toThrow(
      /whole number/,
    );
  });

  it('merges groups below the smallest size into the one they are tied to most', () => {
    const net = fromTies(6, [
      [0, 1],
      [1, 2],
      [2, 3],
      [3, 4],
      [4, 5],
      [2, 5, 3],
    ]);
    expect(Array.from(mergeSmall(net, Int32Array.of(0, 0, 1, 2, 2, 2), 2))).toEqual([0, 0, 2, 2, 2, 2]);
    expect(Array.from(renumber(Int32Array.of(4, 4, -1, 2, 2, 2)))).toEqual([1, 1, -1, 0, 0, 0]);
  });
});

describe('measures', () => {
  it('by hand: two triangles joined by one tie, one member outside', () => {
    const net = fromTies(7, [
      [0, 1],
      [1, 2],
      [0, 2],
      [3, 4],
      [4, 5],
      [3, 5],
      [2, 3, 2],
      [5, 6],
    ]);
    const found = describeGroups(net, Int32Array.of(0, 0, 0, 1, 1, 1, -1));
    expect(found.groups[0]).toEqual({ index: 0, size: 3, cut: 2, volume: 8, conductance: 0.25, density: 1 });
    expect(found.modularity).toBeCloseTo(2 * (6 / 16 - 0.25), 14);
    expect(found.normalisedCut).toBeCloseTo(0.5, 14);
    expect(found.between).toEqual([
      { a: 0, b: 0, ties: 3, weight: 3 },
      { a: 0, b: 1, ties: 1, weight: 2 },
      { a: 1, b: 1, ties: 3, weight: 3 },
    ]);
    const { boundary, outside } = boundaryMembers(net, Int32Array.of(0, 0, 0, 1, 1, 1, -1));
    expect(Array.from(boundary)).toEqual([0, 0, 1, 1, 0, 0, 0]);
    expect(outside[2]).toBe(0.5);
  });

  it('agreement: the worked example of scikit-learn’s documentation, and bounds', () => {
    // sklearn.metrics.adjusted_rand_score([0, 0, 1, 2], [0, 0, 1, 1]) = 0.5714…, given in its documentation.
    expect(agreement(Int32Array.of(0, 0, 1, 2), Int32Array.of(0, 0, 1, 1)).adjustedRand).toBeCloseTo(
      4 / 7,
      12,
    );
    const same = agreement(Int32Array.of(1, 1, 0, 5, -1), Int32Array.of(0, 0, 3, 2, 2));
    expect(same).toMatchObject({ adjustedRand: 1, members: 4 });
    expect(same.normalisedMutualInformation).toBeCloseTo(1, 12);
    expect(same.table).toEqual({
      rows: [0, 1, 5],
      columns: [0, 2, 3],
      counts: [
        [0, 0, 1],
        [2, 0, 0],
        [0, 1, 0],
      ],
    });
    // I = ln 2, H = ln 2 and (3/2) ln 2, arithmetic mean (5/4) ln 2.
    expect(
      agreement(Int32Array.of(0, 0, 1, 1), Int32Array.of(0, 0, 1, 2)).normalisedMutualInformation,
    ).toBeCloseTo(0.8, 12);
    expect(() => agreement(Int32Array.of(-1), Int32Array.of(0))).toThrow(UnanswerableError);
  });
});

describe('spectralLayout', () => {
  it('is finite, within ±1000, deterministic, with the lonely in the outer band', () => {
    const { network } = planted(300, 3, 8, 0.1, 1);
    const ties: [number, number][] = [
      [300, 301],
      [301, 302],
    ];
    for (let i = 0; i < 300; i++)
      for (let p = network.offsets[i]!; p < network.offsets[i + 1]!; p++)
        if (network.targets[p]! > i) ties.push([i, network.targets[p]!]);
    const net = fromTies(320, ties);
    const { x, y } = spectralLayout(net);
    for (let i = 0; i < 320; i++) {
      const radius = Math.hypot(x[i]!, y[i]!);
      expect(radius).toBeLessThanOrEqual(1001);
      if (i >= 303) expect(radius).toBeGreaterThan(890);
      if (i < 300 && components(net).labels[i] === 0) expect(radius).toBeLessThan(860);
    }
    expect(spectralLayout(net)).toEqual({ x, y });
  });

  it('answers for tiny and tieless networks', () => {
    for (const net of [fromTies(0, []), fromTies(1, []), fromTies(5, []), path(2), path(3), star(9)]) {
      const { x, y } = spectralLayout(net);
      expect([...x, ...y].every(Number.isFinite)).toBe(true);
    }
  });
});

describe('followBranches', () => {
  /** A ring of six (0–5), a chain 0–6–7, a leaf 8 on 3, and a longer chain 9–10–11 on 5. */
  const net = fromTies(12, [
    [0, 1],
    [1, 2],
    [2, 3],
    [3, 4],
    [4, 5],
    [5, 0],
    [0, 6],
    [6, 7],
    [3, 8],
    [5, 9],
    [9, 10],
    [10, 11],
  ]);
  const labels = Int32Array.of(0, 0, 0, 1, 1, 1, 1, 2, 0, 0, 0, 0);

  it('puts small trees where they hang, and leaves large ones and the core alone', () => {
    expect([...followBranches(net, labels, 3)]).toEqual([0, 0, 0, 1, 1, 1, 0, 0, 1, 0, 0, 0]);
    expect([...followBranches(net, labels, 4)]).toEqual([0, 0, 0, 1, 1, 1, 0, 0, 1, 1, 1, 1]);
    expect([...followBranches(net, labels, 1)]).toEqual([...labels]);
  });

  it('leaves a component that is a tree alone', () => {
    const line = Int32Array.from({ length: 9 }, (_, i) => (i < 4 ? 0 : 1));
    expect([...followBranches(path(9), line, 5)]).toEqual([...line]);
    expect([...followBranches(star(9), line, 5)]).toEqual([...line]);
    expect([...followBranches(fromTies(3, []), Int32Array.of(0, 1, 2), 5)]).toEqual([0, 1, 2]);
  });

  it('never raises the weight of the ties that are cut', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 10_000 }), (seed) => {
        const random = createRandom(seed);
        const ties = Array.from({ length: 70 }, (): [number, number] => [
          random.int(40),
          random.int(40),
        ]).filter(([a, b]) => a !== b);
        const grown = fromTies(60, [
          ...ties,
          ...Array.from({ length: 20 }, (_, i): [number, number] => [40 + i, random.int(40 + i)]),
        ]);
        const given = Int32Array.from({ length: 60 }, () => random.int(3));
        const cut = (of: Int32Array): number => {
          let sum = 0;
          for (let i = 0; i < 60; i++)
            for (let p = grown.offsets[i]!; p < grown.offsets[i + 1]!; p++)
              if (of[i] !== of[grown.targets[p]!]) sum += grown.weights[p]!;
          return sum;
        };
        expect(cut(followBranches(grown, given, 8))).toBeLessThanOrEqual(cut(given));
      }),
      { numRuns: 200 },
    );
  });
});

describe('refineByNeighbours', () => {
  it('brings misplaced members of a planted block model home (Gao, Ma, Zhang & Zhou 2017)', () => {
    const { network, groups } = plant({ n: 400, seed: 4, k: 4, degree: 12, mixing: 0.1 });
    const random = createRandom(9);
    // One member in five starts in a group drawn at random.
    const start = groups.map((group) => (random.next() < 0.2 ? random.int(4) : group));
    const wrong = (labels: Int32Array): number =>
      labels.reduce((sum, label, i) => sum + (label === groups[i] ? 0 : 1), 0);
    expect(wrong(start)).toBeGreaterThan(40);
    expect(wrong(refineByNeighbours(network, start))).toBeLessThan(8);
  });

  it('keeps who has as many ties to the own group, members without a group, and every group', () => {
    const net = fromTies(6, [
      [0, 1],
      [1, 2],
      [2, 3],
      [3, 4],
      [4, 5],
    ]);
    expect([...refineByNeighbours(net, Int32Array.of(0, 0, 0, 1, 1, 1))]).toEqual([0, 0, 0, 1, 1, 1]);
    expect([...refineByNeighbours(net, Int32Array.of(0, 0, 0, -1, 1, 1))]).toEqual([0, 0, 0, -1, 1, 1]);
    expect([...refineByNeighbours(star(4), Int32Array.of(0, 1, 1, 1))]).toEqual([0, 0, 0, 1]);
    expect([...refineByNeighbours(fromTies(3, []), Int32Array.of(0, 1, 2))]).toEqual([0, 1, 2]);
  });
});
