import { computeSmootherGroups } from '@/features/groupings/compute';
import {
  createRandom,
  laplacianOperator,
  localityOrder,
  localPermutations,
  observedTies,
  ShiftedSystems,
  subnetwork,
  takeReading,
} from '@/numerics';
import { inSeconds, peakMemory, seconds, table } from './measure';
import { socialNetwork } from './networks';

/** Solves, leverages, a whole reading and 999 local permutations on 100,000 members and 1,000,000 ties. */
export function benchSmoothing(): void {
  const raw = socialNetwork(100_000, 1_000_000);
  const net = subnetwork(raw, localityOrder(raw));
  const random = createRandom(3);
  const vector = (): Float64Array => Float64Array.from({ length: net.n }, () => random.next() - 0.5);
  const weights = Float64Array.from({ length: net.n }, () => (random.next() < 0.2 ? 0 : 1));
  const rows: string[][] = [];
  const systems = new ShiftedSystems(laplacianOperator(net, 'combinatorial'));
  for (const alpha of [1, 10, 100, 1000]) {
    const one = seconds(3, () => systems.solve(weights, alpha, [vector()], { tolerance: 1e-8 }));
    const eight = seconds(3, () =>
      systems.solve(weights, alpha, Array.from({ length: 8 }, vector), { tolerance: 1e-8 }),
    );
    rows.push([`(S + αL) x = b to 1e-8, α = ${alpha}`, inSeconds(one), inSeconds(eight / 8)]);
  }
  systems.close();
  table(['solve', 's, alone', 's a side, eight at once'], rows);

  const values = Float64Array.from({ length: net.n }, (_, i) =>
    random.next() < 0.2 ? NaN : Math.sin(i / 4000) + random.next() + random.next(),
  );
  const begin = performance.now();
  const groups = computeSmootherGroups({ net, k: null, seed: 1 });
  const grouped = performance.now();
  takeReading(net, {
    values,
    precision: null,
    groups,
    filter: { kind: 'two-level' },
    laplacian: 'combinatorial',
    neighbourFloor: 5,
    permutations: 199,
    seed: 1,
  });
  const read = performance.now();
  const ties = observedTies(net, values);
  const permuted = seconds(1, () => localPermutations(ties, net.n, 999, 1));
  table(
    ['100,000 / 1,000,000', 's'],
    [
      ['groups of the levels', inSeconds((grouped - begin) / 1000)],
      ['two-level reading, leverages and 199 shuffles included', inSeconds((read - grouped) / 1000)],
      ['local Moran, 999 conditional permutations', inSeconds(permuted)],
    ],
  );
  process.stdout.write(`Peak memory ${peakMemory()}.\n`);
}
