import { describe, expect, it } from 'vitest';
import {
  createRandom,
  localPermutations,
  observedTies,
  rowStandardised,
  takeReading,
  UnanswerableError,
  type Network,
  type ObservedTies,
} from '@/numerics';
import { complete, fromTies, planted, star } from './networks';

/** The same shuffles, gone through member by member and tie by tie. */
function bruteForce(ties: ObservedTies, w: Float64Array, permutations: number, seed: number) {
  const { n, z, offsets, targets } = ties;
  const random = createRandom(seed);
  const order = Int32Array.from({ length: n }, (_, i) => i);
  const most = Math.max(...Array.from({ length: n }, (_, i) => offsets[i + 1]! - offsets[i]!));
  const large = new Int32Array(n);
  const small = new Int32Array(n);
  for (let round = 0; round < permutations; round++) {
    for (let a = 0; a < Math.min(n, most + 1); a++) {
      const b = a + random.int(n - a);
      [order[a], order[b]] = [order[b]!, order[a]!];
    }
    for (let i = 0; i < n; i++) {
      const from = offsets[i]!;
      const d = offsets[i + 1]! - from;
      const others = Array.from(order.subarray(0, d));
      if (others.includes(i)) others[others.indexOf(i)] = order[d]!;
      let [drawn, observed] = [0, 0];
      others.forEach((j, k) => {
        drawn += w[from + k]! * z[j]!;
        observed += w[from + k]! * z[targets[from + k]!]!;
      });
      const step = z[i]! * (drawn - observed);
      if (step >= -1e-12) large[i]!++;
      if (step <= 1e-12) small[i]!++;
    }
  }
  return { large, small };
}

const weighted = (net: Network, seed: number): Network => {
  const random = createRandom(seed);
  const ties: [number, number, number][] = [];
  for (let i = 0; i < net.n; i++)
    for (let k = net.offsets[i]!; k < net.offsets[i + 1]!; k++)
      if (net.targets[k]! > i) ties.push([i, net.targets[k]!, 1 + random.int(4)]);
  return fromTies(net.n, ties);
};

describe('against the same shuffles gone through one by one', () => {
  it.each([9, 8, 29])(
    'equal weights, unequal weights and both in one network, %i shuffles',
    (permutations) => {
      const { network } = planted(50, 2, 5, 0.3, 3);
      const random = createRandom(2);
      for (const net of [network, weighted(network, 1), star(20), complete(8)]) {
        // Every fifth member is missing, one is at the mean, and some are equal.
        const values = Float64Array.from({ length: net.n }, (_, i) =>
          i % 5 === 4 ? NaN : Math.round(4 * random.normal()),
        );
        const ties = observedTies(net, values);
        for (const style of ['row', 'raw'] as const) {
          const w = style === 'row' ? rowStandardised(ties) : ties.weights;
          const { large, small } = bruteForce(ties, w, permutations, 7);
          const { greater, less, folded, twoSided } = localPermutations(ties, net.n, permutations, 7, style);
          ties.members.forEach((member, i) => {
            if (ties.offsets[i] === ties.offsets[i + 1]) return expect(greater[member]).toBeNaN();
            expect(greater[member]).toBe((1 + large[i]!) / (1 + permutations));
            expect(less[member]).toBe((1 + small[i]!) / (1 + permutations));
            expect(folded[member]).toBe(Math.min(greater[member]!, less[member]!));
            expect(twoSided[member]).toBe(Math.min(1, 2 * folded[member]!));
          });
          values.forEach((one, i) => Number.isNaN(one) && expect(greater[i]).toBeNaN());
        }
      }
    },
  );
});

it('the draw is uniform: p comes to the share of all draws that reach the observed sum', () => {
  // Member 0 has three neighbours of six others: C(6, 3) = 20 draws, each as likely.
  const net = fromTies(7, [
    [0, 1],
    [0, 2],
    [0, 3],
    [4, 5],
    [5, 6],
  ]);
  const values = Float64Array.of(5, 4, 3, -2, 1, -6, -5);
  const others = values.slice(1);
  let reached = 0;
  for (let a = 0; a < 6; a++)
    for (let b = 0; b < a; b++)
      for (let c = 0; c < b; c++) if (others[a]! + others[b]! + others[c]! >= 5) reached++;
  const exact = reached / 20;
  const p = localPermutations(observedTies(net, values), 7, 19_999, 1).greater[0]!;
  // Five standard deviations of a binomial share.
  expect(Math.abs(p - exact)).toBeLessThan(5 * Math.sqrt((exact * (1 - exact)) / 20_000));
});

it('in a reading: beside the p of the moments, whose q is as it was', () => {
  const { network } = planted(200, 2, 8, 0.1, 5);
  const random = createRandom(4);
  const values = Float64Array.from({ length: 200 }, (_, i) => 2 * (i % 2) + random.normal());
  const input = {
    values,
    precision: null,
    groups: null,
    filter: { kind: 'tikhonov', alpha: 1 },
    laplacian: 'combinatorial',
    neighbourFloor: 1,
    seed: 3,
  } as const;
  const shuffled = takeReading(network, { ...input, permutations: 999 }).columns;
  const without = takeReading(network, { ...input, permutations: 0 }).columns;
  expect(shuffled.local).toEqual(without.local);
  expect(without.localPermutationP.every(Number.isNaN)).toBe(true);
  let apart = 0;
  shuffled.localPermutationP.forEach((p, i) => {
    expect(p).toBeGreaterThanOrEqual(1 / 1_000);
    apart += Math.abs(p - shuffled.local.p[i]!) / 200;
  });
  // Normal and permutation p differ by about 0.01 in the mean at most.
  expect(apart).toBeLessThan(0.03);
});

it('refuses no shuffles in words', () => {
  const ties = observedTies(complete(5), Float64Array.of(1, 2, 3, 4, 6));
  expect(() => localPermutations(ties, 5, 0, 1)).toThrow(UnanswerableError);
});
