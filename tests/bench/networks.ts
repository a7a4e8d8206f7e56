import {
  buildNetwork,
  componentMembers,
  components,
  createRandom,
  subnetwork,
  type Network,
} from '@/numerics';

/**
 * A social network for timing: a degree-corrected block model (Karrer & Newman 2011) with groups of unequal size,
 * heavy-tailed degrees and thin branches; its largest component, so that n and m come out a little smaller.
 */
export function socialNetwork(n: number, ties: number, seed = 1): Network {
  const random = createRandom(seed);
  const branch = Math.floor(0.06 * n);
  const core = n - branch;
  const groups = Math.max(8, Math.round(Math.sqrt(n) / 10));
  // Sizes fall as 1/√rank, so that neither one group nor crumbs make up the whole.
  const shares = Float64Array.from({ length: groups }, (_, g) => 1 / Math.sqrt(g + 1));
  const all = shares.reduce((sum, one) => sum + one, 0);
  const starts = new Int32Array(groups + 1);
  for (let g = 0, sum = 0; g < groups; g++) starts[g + 1] = Math.round(((sum += shares[g]!) / all) * core);
  const reach = new Float64Array(core + 1);
  // Pareto degrees with exponent 2.6, cut at √n.
  for (let i = 0; i < core; i++)
    reach[i + 1] = reach[i]! + Math.min(Math.sqrt(n), (1 - random.next()) ** (-1 / 1.6));
  const draw = (from: number, to: number): number => {
    const aim = reach[from]! + random.next() * (reach[to]! - reach[from]!);
    let low = from;
    let high = to - 1;
    while (low < high) {
      const middle = (low + high) >> 1;
      if (reach[middle + 1]! > aim) high = middle;
      else low = middle + 1;
    }
    return low;
  };
  const sources: number[] = [];
  const targets: number[] = [];
  const groupOf = (i: number): number => {
    let g = 0;
    while (starts[g + 1]! <= i) g++;
    return g;
  };
  while (sources.length < ties - branch) {
    const a = draw(0, core);
    const g = groupOf(a);
    const b = random.next() < 0.15 ? draw(0, core) : draw(starts[g]!, starts[g + 1]!);
    if (a === b) continue;
    sources.push(a);
    targets.push(b);
  }
  for (let i = core; i < n; i++) {
    sources.push(i);
    targets.push(i > core && random.next() < 0.4 ? i - 1 : Math.floor(random.next() * core));
  }
  // Members are met in no order in a real file.
  const place = Int32Array.from({ length: n }, (_, i) => i);
  for (let i = n - 1; i > 0; i--) {
    const j = Math.floor(random.next() * (i + 1));
    [place[i], place[j]] = [place[j]!, place[i]!];
  }
  const net = buildNetwork(
    n,
    Int32Array.from(sources, (i) => place[i]!),
    Int32Array.from(targets, (i) => place[i]!),
    Float64Array.from(sources, () => 1 + Math.floor(4 * random.next() ** 3)),
  );
  const [largest] = componentMembers(components(net)).sort((a, b) => b.length - a.length);
  return subnetwork(net, largest!);
}

/** A ring in which everybody is tied to the two on either side: a tiny gap, and every value twice. */
export function ringLattice(n: number): Network {
  const sources = Int32Array.from({ length: 2 * n }, (_, e) => e >> 1);
  const targets = Int32Array.from({ length: 2 * n }, (_, e) => ((e >> 1) + 1 + (e & 1)) % n);
  return buildNetwork(n, sources, targets, new Float64Array(2 * n).fill(1));
}
