import { UnanswerableError, type Network } from '../types';

/** One group as a set S of members of the whole network. */
export interface GroupQuality {
  readonly index: number;
  readonly size: number;
  /** cut(S): total weight of the ties that leave the group. */
  readonly cut: number;
  /** vol(S): sum of its members' strengths. */
  readonly volume: number;
  /** cut / min(vol S, vol rest); null when one side has no ties at all. */
  readonly conductance: number | null;
  /** Number of ties inside over size · (size − 1) / 2; null for a single member. */
  readonly density: number | null;
}

/** Ties between two groups (a < b), or inside one (a = b). */
export interface Between {
  readonly a: number;
  readonly b: number;
  readonly ties: number;
  readonly weight: number;
}

export interface GroupingQuality {
  readonly groups: readonly GroupQuality[];
  /** Newman & Girvan 2004, resolution 1, over the members that are in a group; null without ties among them. */
  readonly modularity: number | null;
  /** Σ_c cut_c / vol_c over groups with ties (Shi & Malik 2000). */
  readonly normalisedCut: number;
  /** Total weight of ties between different groups. */
  readonly cut: number;
  /** Only pairs that have ties; ordered by a, then b. */
  readonly between: readonly Between[];
}

/**
 * Measures a grouping. Members with the label −1 are outside it: cuts and volumes are those of the network of the
 * members inside, as if the others were not there.
 *
 * @param labels group of each member, −1 or 0…; length n
 */
export function describeGroups(net: Network, labels: Int32Array): GroupingQuality {
  const { n, offsets, targets, weights } = net;
  checkLabels(net, labels);
  const count = groupCount(labels);
  const size = new Int32Array(count);
  const volume = new Float64Array(count);
  const inside = new Float64Array(count);
  const insideTies = new Float64Array(count);
  const pairs = new Map<number, { ties: number; weight: number }>();
  let total = 0;
  for (let i = 0; i < n; i++) {
    const a = labels[i]!;
    if (a < 0) continue;
    size[a]!++;
    for (let p = offsets[i]!; p < offsets[i + 1]!; p++) {
      const j = targets[p]!;
      const b = labels[j]!;
      if (b < 0) continue;
      const w = weights[p]!;
      volume[a]! += w;
      total += w;
      if (a === b) {
        inside[a]! += w;
        if (i < j) insideTies[a]!++;
      } else if (a < b) {
        const key = a * count + b;
        const entry = pairs.get(key);
        if (entry) {
          entry.ties++;
          entry.weight += w;
        } else pairs.set(key, { ties: 1, weight: w });
      }
    }
  }
  const cuts = new Float64Array(count);
  const between: Between[] = [];
  let cut = 0;
  for (const [key, { ties, weight }] of pairs) {
    const a = Math.floor(key / count);
    const b = key % count;
    cuts[a]! += weight;
    cuts[b]! += weight;
    cut += weight;
    between.push({ a, b, ties, weight });
  }
  for (let a = 0; a < count; a++) {
    if (insideTies[a]! > 0) between.push({ a, b: a, ties: insideTies[a]!, weight: inside[a]! / 2 });
  }
  between.sort((x, y) => x.a - y.a || x.b - y.b);
  let normalisedCut = 0;
  let modularity = 0;
  const groups: GroupQuality[] = [];
  for (let a = 0; a < count; a++) {
    const smaller = Math.min(volume[a]!, total - volume[a]!);
    if (volume[a]! > 0) normalisedCut += cuts[a]! / volume[a]!;
    if (total > 0) modularity += inside[a]! / total - (volume[a]! / total) ** 2;
    groups.push({
      index: a,
      size: size[a]!,
      cut: cuts[a]!,
      volume: volume[a]!,
      conductance: smaller > 0 ? cuts[a]! / smaller : null,
      density: size[a]! > 1 ? insideTies[a]! / ((size[a]! * (size[a]! - 1)) / 2) : null,
    });
  }
  return { groups, modularity: total > 0 ? modularity : null, normalisedCut, cut, between };
}

/** Modularity Q = Σ_c [W_c/(2M) − (vol_c/2M)²], 2M = Σ d (Newman & Girvan 2004); null without ties. */
export const modularity = (net: Network, labels: Int32Array): number | null =>
  describeGroups(net, labels).modularity;

export interface BoundaryMembers {
  /** 1 where a member has a tie to another group. */
  readonly boundary: Uint8Array;
  /** Share of a member's strength that goes to other groups, 0…1; 0 without ties. */
  readonly outside: Float64Array;
}

/** Which members stand on the seam between groups; members with the label −1 are neither counted nor counted against. */
export function boundaryMembers(net: Network, labels: Int32Array): BoundaryMembers {
  checkLabels(net, labels);
  const boundary = new Uint8Array(net.n);
  const outside = new Float64Array(net.n);
  for (let i = 0; i < net.n; i++) {
    if (labels[i]! < 0) continue;
    let own = 0;
    let other = 0;
    for (let p = net.offsets[i]!; p < net.offsets[i + 1]!; p++) {
      const b = labels[net.targets[p]!]!;
      if (b < 0) continue;
      if (b === labels[i]) own += net.weights[p]!;
      else other += net.weights[p]!;
    }
    boundary[i] = other > 0 ? 1 : 0;
    outside[i] = other > 0 ? other / (own + other) : 0;
  }
  return { boundary, outside };
}

/** One more than the largest label. */
export function groupCount(labels: Int32Array): number {
  let largest = -1;
  for (const label of labels) if (label > largest) largest = label;
  return largest + 1;
}

function checkLabels(net: Network, labels: Int32Array): void {
  if (labels.length !== net.n) {
    throw new UnanswerableError(
      'bad-labels',
      `A grouping of ${labels.length} members does not fit a network of ${net.n}.`,
    );
  }
}
