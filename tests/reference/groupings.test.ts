/**
 * Splits and their measures against tests/reference/data/<name>/reference.json, keys `partition.`, `given_partitions.`,
 * `kway.` and `best_modularity_found.` (numpy/SciPy/networkx/igraph and R; see `computed_with` beside each value).
 */
import { describe, expect, it } from 'vitest';
import {
  agreement,
  componentMembers,
  components,
  describeGroups,
  fiedlerGrouping,
  spectralGrouping,
  spectrum,
  subnetwork,
  type CutRule,
  type FiedlerGrouping,
  type LaplacianKind,
  type Network,
} from '@/numerics';
import { compare } from './compare';
import { loadReference, referenceNames, type Expected, type Reference } from './load';

interface Scope {
  readonly reference: Reference;
  readonly network: Network;
  readonly nodes: Int32Array;
  split(which: string, cut: CutRule): FiedlerGrouping;
  spectrum(kind: LaplacianKind): ReturnType<typeof spectrum>;
}

const kinds: Record<string, LaplacianKind> = { L: 'combinatorial', rw: 'normalised', Lsym: 'normalised' };

function scopeOf(reference: Reference): Scope {
  const parts = components(reference.network);
  const nodes = componentMembers(parts)[parts.largest]!;
  const network = subnetwork(reference.network, nodes);
  return {
    reference,
    nodes,
    network,
    // On the whole network: the largest component is the one that is split.
    split: (which, cut) =>
      fiedlerGrouping(reference.network, { laplacian: kinds[which]!, cut, minimumSize: 1, seed: 1 }),
    spectrum: (laplacian) => spectrum(network, { laplacian, count: 'all' }),
  };
}

const inScope = (scope: Scope, values: ArrayLike<number>): number[] =>
  Array.from(scope.nodes, (i) => values[i]!);
const labelsOf = (scope: Scope, grouping: FiedlerGrouping): Int32Array =>
  Int32Array.from(inScope(scope, grouping.labels));

/** All measures of one side against the other, as the reference files name them. */
function measures(network: Network, labels: Int32Array, side: number) {
  const two = labels.map((label) => (label === side ? 0 : 1));
  const { groups } = describeGroups(network, two);
  const own = groups[0]!;
  const other = groups[1] ?? { size: 0, volume: 0 };
  const ncut = own.volume > 0 && other.volume > 0 ? own.cut / own.volume + own.cut / other.volume : null;
  return {
    size: own.size,
    size_other: other.size,
    cut: own.cut,
    vol: own.volume,
    vol_other: other.volume,
    conductance: own.conductance,
    ncut,
    ratio_cut: other.size > 0 ? own.cut / own.size + own.cut / other.size : null,
  };
}

function isRepeated(scope: Scope, which: string): boolean {
  return scope.spectrum(kinds[which]!).repeated[1] === 1;
}

function partitionAnswer(scope: Scope, key: string): unknown {
  const name = key.slice('partition.'.length);
  const fixed: Record<string, () => unknown> = {
    scope: () => (scope.nodes.length === scope.reference.n ? 'whole graph' : 'largest component'),
    nodes: () => Array.from(scope.nodes),
    lambda2_L: () => scope.spectrum('combinatorial').values[1],
    lambda2_Lsym: () => scope.spectrum('normalised').values[1],
    simple_L: () => !isRepeated(scope, 'L'),
    simple_Lsym: () => !isRepeated(scope, 'Lsym'),
    gap_L: () => gap(scope.spectrum('combinatorial').values),
    gap_Lsym: () => gap(scope.spectrum('normalised').values),
    fiedler_L: () => inScope(scope, scope.split('L', 'sign').vector),
    fiedler_rw: () => inScope(scope, scope.split('rw', 'sign').vector),
    fiedler_Lsym: () => scope.spectrum('normalised').vectors[1],
    'cheeger.lower': () => scope.spectrum('normalised').values[1]! / 2,
    'cheeger.upper': () => Math.sqrt(2 * scope.spectrum('normalised').values[1]!),
    'cheeger.exact_conductance': () => bruteForce(scope.network),
  };
  if (fixed[name]) return fixed[name]();
  const match = /^(sign_cut|sweep)_(L|rw)\.(\w+)$/.exec(name);
  if (!match) throw new Error(`no check for the key ${key}`);
  const [, rule, which, what] = match;
  const grouping = scope.split(which!, rule === 'sign_cut' ? 'sign' : 'sweep');
  const labels = labelsOf(scope, grouping);
  // The files describe the side they call 1.
  const theirs = scope.reference.expected[`partition.${rule}_${which}.partition`]!.value as number[];
  const measured = measures(scope.network, labels, labels[theirs.indexOf(1)]!);
  const answers: Record<string, () => unknown> = {
    partition: () => labels,
    zero_entries: () => inScope(scope, grouping.vector).filter((x) => Math.abs(x) < 1e-9).length,
    modularity: () => describeGroups(scope.network, labels).modularity,
    min_conductance: () => measured.conductance,
    ties: () => grouping.sweep.distinct.some((flag) => flag === 0),
    min_conductance_if_ties_broken_by_row_order: () => Math.min(...grouping.sweep.conductance),
    ...Object.fromEntries(Object.entries(measured).map(([field, value]) => [field, () => value])),
  };
  if (!answers[what!]) throw new Error(`no check for the key ${key}`);
  return answers[what!]!();
}

const gap = (values: Float64Array): number => values[2]! - values[1]!;

/** Lowest conductance over all splits of a small network. */
function bruteForce(network: Network): number {
  let best = Infinity;
  for (let bits = 1; bits < 2 ** (network.n - 1); bits++) {
    const labels = Int32Array.from({ length: network.n }, (_, i) => (bits >> i) & 1);
    best = Math.min(best, describeGroups(network, labels).groups[0]!.conductance ?? Infinity);
  }
  return best;
}

function givenAnswer(scope: Scope, key: string): unknown {
  const { reference } = scope;
  const [, which, ...rest] = key.split('.');
  const theirs = Int32Array.from(reference.expected[`given_partitions.${which}.labels`]!.value as number[]);
  const quality = describeGroups(reference.network, theirs);
  const name = rest.join('.');
  if (name === 'labels') return theirs;
  if (name === 'modularity') return quality.modularity;
  if (name === 'cut_total') return quality.cut;
  if (name === 'ncut_k') return quality.normalisedCut;
  const match = /^agreement\.(sign_cut|sweep)_(L|rw)\.(agree|disagree_members)$/.exec(name);
  if (!match) throw new Error(`no check for the key ${key}`);
  const { labels } = scope.split(match[2]!, match[1] === 'sign_cut' ? 'sign' : 'sweep');
  const same = [...labels.keys()].filter((i) => labels[i] === theirs[i]);
  const swapped = [...labels.keys()].filter((i) => labels[i] === 1 - theirs[i]!);
  const agreeing = new Set(same.length >= swapped.length ? same : swapped);
  return match[3] === 'agree' ? agreeing.size : reference.ids.filter((_, i) => !agreeing.has(i));
}

/** Each part's measures; the file's numbers carry 12 digits. */
function comparePerPart(scope: Scope, expected: Expected, key: string): void {
  const labels = scope.reference.expected[key.replace(/per_part$/, 'labels')]!.value as number[];
  for (const row of expected.value as Record<string, number | null>[]) {
    const measured: Record<string, number | null> = measures(
      scope.reference.network,
      Int32Array.from(labels),
      row.label!,
    );
    for (const [field, value] of Object.entries(row)) {
      if (field === 'label') continue;
      const actual = measured[field];
      if (value === null) expect(actual, `${key}.${field}`).toBeNull();
      else
        expect(Math.abs(actual! - value), `${key}.${row.label}.${field}`).toBeLessThanOrEqual(
          1e-10 * Math.max(1, Math.abs(value)),
        );
    }
  }
}

describe.each([...referenceNames])('%s', (name) => {
  const reference = loadReference(name);
  const scope = scopeOf(reference);
  const { expected } = reference;
  const keys = Object.keys(expected).filter((key) => /^(partition|given_partitions)\./.test(key));
  it.each(keys)('%s', (key) => {
    if (key.endsWith('.per_part')) comparePerPart(scope, expected[key]!, key);
    else
      compare(
        key.startsWith('partition.') ? partitionAnswer(scope, key) : givenAnswer(scope, key),
        expected[key]!,
        key,
      );
  });

  if (expected['kway.k']) {
    it('k-way grouping meets the quality bars', () => {
      const k = expected['kway.k']!.value as number;
      const grouping = spectralGrouping(reference.network, {
        k,
        laplacian: 'normalised',
        minimumSize: 1,
        seed: 1,
      });
      const nodes = expected['kway.nodes']!.value as number[];
      const labels = new Int32Array(reference.n).fill(-1);
      for (const i of nodes) labels[i] = grouping.labels[i]!;
      const bar = expected['kway.ncut_k']!.value as number;
      expect(describeGroups(reference.network, labels).normalisedCut).toBeLessThanOrEqual(1.05 * bar + 0.02);
      const values = spectrum(scope.network, { laplacian: 'normalised', count: k + 1 }).values;
      compare(values[k]! - values[k - 1]!, expected['kway.eigengap']!, 'kway.eigengap');
      if (expected['kway.ari_with_truth']) {
        const truth = Object.entries(expected).find(([key]) => /^given_partitions\..*\.labels$/.test(key))![1]
          .value as number[];
        const { adjustedRand } = agreement(grouping.labels, Int32Array.from(truth));
        expect(adjustedRand).toBeGreaterThanOrEqual((expected['kway.ari_with_truth'].value as number) - 0.05);
      }
    });
  }
});

it('karate: sizes and conductance of the published splits (Zachary 1977)', () => {
  const { network } = loadReference('karate');
  for (const laplacian of ['combinatorial', 'normalised'] as const) {
    const swept = fiedlerGrouping(network, { laplacian, cut: 'sweep', minimumSize: 1, seed: 1 });
    const { groups } = describeGroups(network, swept.labels);
    expect(groups.map((group) => group.size)).toEqual([18, 16]);
    expect(groups[0]!.conductance).toBeCloseTo(0.1316, 4);
    const signed = fiedlerGrouping(network, { laplacian, cut: 'sign', seed: 1 });
    expect(describeGroups(network, signed.labels).groups.map((group) => group.size)).toEqual([19, 15]);
  }
});
