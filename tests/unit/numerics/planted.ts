import { buildNetwork, createRandom, type Network, type Random } from '@/numerics';

export interface Planted {
  readonly network: Network;
  readonly groups: Int32Array;
  /** Scores with noise 1, planted shifts of ±5 and missing ones as NaN. */
  readonly values: Float64Array;
  /** Group level and within-group signal, without noise. */
  readonly truth: Float64Array;
  readonly planted: Uint8Array;
}

export interface PlantOptions {
  readonly n: number;
  readonly seed: number;
  readonly k?: number;
  readonly degree?: number;
  readonly mixing?: number;
  readonly between?: number;
  readonly within?: number;
  readonly shifted?: number;
  readonly missing?: number;
  /** Share of the members that hang on thin branches of the core. */
  readonly branches?: number;
  /** Components of three members apart from the rest, each with a level of its own. */
  readonly islets?: number;
}

/** Places drawn in proportion to weights, by their running sums. */
function drawer(weights: Float64Array, places: readonly number[], random: Random): () => number {
  let total = 0;
  const sums = places.map((i) => (total += weights[i]!));
  return () => {
    const at = random.next() * total;
    let low = 0;
    let high = sums.length - 1;
    while (low < high) {
      const middle = (low + high) >> 1;
      if (sums[middle]! >= at) high = middle;
      else low = middle + 1;
    }
    return places[low]!;
  };
}

/**
 * A degree-corrected block-model community (Karrer & Newman 2011) with a level per group and a diffused signal
 * within: the planted benchmark of the smoother, invented data with a known truth.
 */
export function plant(options: PlantOptions): Planted {
  const {
    n,
    seed,
    k = 5,
    degree = 12,
    mixing = 0.12,
    between = 1.5,
    within = 0.5,
    shifted = 0.03,
    missing = 0.2,
    branches = 0,
    islets = 0,
  } = options;
  const random = createRandom(seed + 7_000);
  const groups = Int32Array.from({ length: n }, () => random.int(k));
  const weights = Float64Array.from({ length: n }, () => (1 - random.next()) ** -0.35);
  const connected = n - 3 * islets;
  const core = connected - Math.round(branches * n);
  const members = [...groups.keys()].slice(0, core);
  const all = drawer(weights, members, random);
  const inside = Array.from({ length: k }, (_, group) =>
    drawer(
      weights,
      members.filter((i) => groups[i] === group),
      random,
    ),
  );
  const pairs = new Set<number>();
  while (pairs.size < (core * degree) / 2) {
    const a = all();
    const b = random.next() < mixing ? all() : inside[groups[a]!]!();
    if (a !== b) pairs.add(Math.min(a, b) * n + Math.max(a, b));
  }
  // A branch grows from any member that is there already and belongs where it hangs.
  for (let i = core; i < connected; i++) {
    const at = random.int(i);
    groups[i] = groups[at]!;
    pairs.add(at * n + i);
  }
  for (let i = connected; i < n; i++) {
    const first = i - ((i - connected) % 3);
    groups[i] = k + (first - connected) / 3;
    if (i > first) pairs.add((i - 1) * n + i);
  }
  const keys = [...pairs];
  const network = buildNetwork(
    n,
    Int32Array.from(keys, (key) => Math.floor(key / n)),
    Int32Array.from(keys, (key) => key % n),
    new Float64Array(keys.length).fill(1),
  );
  const level = Float64Array.from({ length: k + islets }, () => between * random.normal());
  const signal = diffused(network, random, within);
  const truth = signal.map((one, i) => one + level[groups[i]!]!);
  const planted = new Uint8Array(n);
  const values = truth.map((one, i) => {
    const tied = network.offsets[i + 1]! - network.offsets[i]! >= 5;
    if (tied && random.next() < shifted) planted[i] = 1;
    const shift = planted[i] === 1 ? (random.next() < 0.5 ? -5 : 5) : 0;
    const value = one + random.normal() + shift;
    return random.next() < missing ? NaN : value;
  });
  return { network, groups, values, truth, planted };
}

function diffused(network: Network, random: Random, sd: number): Float64Array {
  let f = Float64Array.from({ length: network.n }, () => random.normal());
  for (let step = 0; step < 6; step++)
    f = f.map((own, i) => {
      const from = network.offsets[i]!;
      const to = network.offsets[i + 1]!;
      if (from === to) return own;
      let sum = 0;
      for (let e = from; e < to; e++) sum += f[network.targets[e]!]!;
      return 0.5 * own + (0.5 * sum) / (to - from);
    });
  const mean = f.reduce((sum, one) => sum + one, 0) / f.length;
  const spread = Math.sqrt(f.reduce((sum, one) => sum + (one - mean) ** 2, 0) / f.length);
  return f.map((one) => (sd * (one - mean)) / spread);
}
