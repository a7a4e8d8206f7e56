import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  buildNetwork,
  components,
  fromCsr,
  subnetwork,
  tieCount,
  totalWeight,
  UnanswerableError,
} from '@/numerics';
import { fromTies, path, ring, star } from './networks';

const ties = fc.array(
  fc.tuple(fc.nat(19), fc.nat(19), fc.double({ min: 0, max: 1e6, noNaN: true })).filter(([a, b]) => a !== b),
  { maxLength: 120 },
);

const rowOf = (offsets: Int32Array, p: number): number => offsets.findIndex((start) => start > p) - 1;

describe('buildNetwork', () => {
  it('sums repeats of both directions, drops weight 0 and keeps members without ties', () => {
    const net = fromTies(4, [
      [0, 1, 2],
      [1, 0, 0.5],
      [2, 0, 1],
      [1, 2, 0],
    ]);
    expect(Array.from(net.offsets)).toEqual([0, 2, 3, 4, 4]);
    expect(Array.from(net.targets)).toEqual([1, 2, 0, 0]);
    expect(Array.from(net.weights)).toEqual([2.5, 1, 2.5, 1]);
    expect(Array.from(net.strength)).toEqual([3.5, 2.5, 1, 0]);
    expect(tieCount(net)).toBe(2);
    expect(totalWeight(net)).toBe(3.5);
  });

  it('equals a dense sum for any ties, with sorted rows and both directions alike to the byte', () => {
    fc.assert(
      fc.property(ties, (list) => {
        const net = fromTies(20, list);
        const dense = new Float64Array(400);
        for (const [a, b, w] of list) {
          dense[a * 20 + b]! += w;
          dense[b * 20 + a]! += w;
        }
        const seen = new Float64Array(400);
        for (let i = 0; i < 20; i++) {
          for (let p = net.offsets[i]!; p < net.offsets[i + 1]!; p++) {
            if (p > net.offsets[i]!) expect(net.targets[p]!).toBeGreaterThan(net.targets[p - 1]!);
            seen[i * 20 + net.targets[p]!] = net.weights[p]!;
          }
        }
        expect(seen).toEqual(dense);
        expect(fromCsr(net.offsets, net.targets, net.weights)).toEqual(net);
      }),
    );
  });

  it.each([
    ['a self-tie', 2, [1], [1], [1]],
    ['a member that does not exist', 2, [0], [2], [1]],
    ['a negative member', 2, [-1], [1], [1]],
    ['a negative weight', 2, [0], [1], [-1]],
    ['a weight that is not a number', 2, [0], [1], [NaN]],
    ['an infinite weight', 2, [0], [1], [Infinity]],
    ['weights that overflow', 2, [0, 0], [1, 1], [1.7e308, 1.7e308]],
    ['lengths that differ', 2, [0, 1], [1], [1]],
  ])('refuses %s', (_, n, s, t, w) => {
    expect(() => buildNetwork(n, Int32Array.from(s), Int32Array.from(t), Float64Array.from(w))).toThrow(
      UnanswerableError,
    );
  });
});

describe('fromCsr', () => {
  const good = () => {
    const { offsets, targets, weights } = ring(5);
    return { offsets: offsets.slice(), targets: targets.slice(), weights: weights.slice() };
  };
  it.each<[string, (net: ReturnType<typeof good>) => void]>([
    ['one direction changed', ({ weights }) => (weights[0] = 2)],
    ['a weight that is not a number', ({ weights }) => weights.fill(NaN)],
    ['a target out of range', ({ targets }) => (targets[1] = 9)],
    ['an unsorted row', ({ targets }) => targets.set([4, 1], 0)],
    ['rows that overlap', ({ offsets }) => (offsets[1] = 5)],
  ])('refuses %s', (_, damage) => {
    const net = good();
    damage(net);
    expect(() => fromCsr(net.offsets, net.targets, net.weights)).toThrow(UnanswerableError);
  });
});

describe('components and subnetworks', () => {
  it('numbers components by their first member', () => {
    const found = components(
      fromTies(7, [
        [1, 3],
        [3, 5],
        [0, 6],
      ]),
    );
    expect(Array.from(found.labels)).toEqual([0, 1, 2, 1, 3, 1, 0]);
    expect(found).toMatchObject({ count: 4, largest: 1, isolated: 2 });
    expect(Array.from(found.sizes)).toEqual([2, 3, 1, 1]);
  });

  it('answers for no members, one member and a star of 100,000', () => {
    expect(components(fromTies(0, []))).toMatchObject({ count: 0, largest: -1 });
    expect(components(fromTies(1, []))).toMatchObject({ count: 1, isolated: 1 });
    expect(components(star(100_000))).toMatchObject({ count: 1, isolated: 0 });
  });

  it('a permutation relabels: entry (a, b) of the result is entry (nodes[a], nodes[b])', () => {
    fc.assert(
      fc.property(ties, fc.shuffledSubarray([...Array(20).keys()], { minLength: 1 }), (list, chosen) => {
        const net = fromTies(20, list);
        const sub = subnetwork(net, Int32Array.from(chosen));
        const inside = (i: number): boolean => chosen.includes(i);
        const kept = [...net.targets.keys()].filter(
          (p) => inside(net.targets[p]!) && inside(rowOf(net.offsets, p)),
        );
        expect(sub.targets.length).toBe(kept.length);
        fromCsr(sub.offsets, sub.targets, sub.weights);
        for (let a = 0; a < chosen.length; a++) {
          for (let p = sub.offsets[a]!; p < sub.offsets[a + 1]!; p++) {
            const i = chosen[a]!;
            const row = net.targets.subarray(net.offsets[i], net.offsets[i + 1]);
            expect(net.weights[net.offsets[i]! + row.indexOf(chosen[sub.targets[p]!]!)]).toBe(sub.weights[p]);
          }
        }
      }),
    );
  });

  it('refuses members named twice', () => {
    expect(() => subnetwork(path(4), Int32Array.of(1, 1))).toThrow(UnanswerableError);
  });
});
