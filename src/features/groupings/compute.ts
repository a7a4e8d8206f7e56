import {
  describeGroups,
  fiedlerGrouping,
  refineByNeighbours,
  spectralGrouping,
  UnanswerableError,
  type LaplacianKind,
  type Network,
  type Watch,
} from '@/numerics';
import { boundaryMembers, matrixOf } from './between';
import type { Boundary, Group, GroupingResult } from './groupings';
import { orderGroups } from './labels';
import { louvainLabels } from './louvain';

/** What the thread task `grouping` is given: typed arrays and options, nothing else. */
export interface GroupingInput {
  readonly net: Network;
  readonly method: 'fiedler' | 'spectral' | 'louvain';
  readonly laplacian: LaplacianKind;
  readonly cut: 'sign' | 'median' | 'sweep';
  readonly k: number | 'auto';
  readonly tau: number | null;
  readonly minimumSize: number | null;
  readonly seed: number;
  /** Split one group of an earlier grouping: its labels (−1 for none), its islets, and the group. */
  readonly parent: {
    readonly labels: Int32Array;
    readonly islets: readonly number[];
    readonly group: number;
  } | null;
}

export type MeasuredGroup = Pick<
  Group,
  'size' | 'cut' | 'volume' | 'conductance' | 'density' | 'islet' | 'leaving'
>;

export interface GroupingOutput extends Omit<GroupingResult, 'groups' | 'seconds'> {
  /** Group of each member, largest first, islets last; −1 for none. */
  readonly labels: Int32Array;
  /** Ordering vector, NaN where it does not reach; null for methods without one. */
  readonly vector: Float64Array | null;
  readonly groups: readonly MeasuredGroup[];
  readonly boundary: readonly Boundary[];
}

/** A division before it is numbered and measured. */
type Division = Omit<GroupingOutput, 'groups' | 'boundary' | 'between' | 'modularity' | 'normalisedCut'> & {
  readonly islets: ReadonlySet<number>;
};

/** Divides a network by the asked method, then numbers and measures the groups. */
export function computeGrouping(input: GroupingInput, watch?: Watch): GroupingOutput {
  const { islets, ...division } =
    input.method === 'fiedler'
      ? splitInTwo(input, watch)
      : input.method === 'spectral'
        ? manyGroups(input, watch)
        : secondOpinion(input, watch);
  const { labels, islet } = orderGroups(division.labels, islets);
  watch?.progress?.(0.97, 'Measuring the groups');
  const quality = describeGroups(input.net, labels);
  return {
    ...division,
    labels,
    modularity: quality.modularity,
    normalisedCut: quality.normalisedCut,
    groups: quality.groups.map(({ size, cut, volume, conductance, density }, index) => ({
      size,
      cut,
      volume,
      conductance,
      density,
      islet: islet[index]!,
      leaving: volume > 0 ? cut / volume : null,
    })),
    between: matrixOf(
      quality.between,
      quality.groups.map((group) => group.size),
    ),
    boundary: boundaryMembers(input.net, labels),
  };
}

function splitInTwo(input: GroupingInput, watch?: Watch): Division {
  const { net, parent, laplacian, cut, seed } = input;
  const within =
    parent && Int32Array.from(parent.labels.keys()).filter((i) => parent.labels[i] === parent.group);
  const found = fiedlerGrouping(
    net,
    {
      laplacian,
      cut,
      seed,
      ...(input.tau === null ? {} : { tau: input.tau }),
      ...(input.minimumSize === null ? {} : { minimumSize: input.minimumSize }),
      ...(within ? { within } : {}),
    },
    watch,
  );
  const notes: string[] = [];
  if (found.islets.length > 0)
    notes.push(
      `${parent ? 'The group' : 'The network'} is in ${found.islets.length + 1} separate parts. The largest, ${found.scope.members} members, was split; the others are kept as islets.`,
    );
  if (found.repeated)
    notes.push('The second graph frequency is repeated: another split would be just as good as this one.');
  let { labels } = found;
  let islets = new Set(found.islets);
  if (parent) {
    // The split group's parts are numbered after all groups of the grouping that they come from.
    const base = parent.labels.reduce((most, label) => Math.max(most, label), 0) + 1;
    labels = parent.labels.map((label, i) => (labels[i]! < 0 ? label : base + labels[i]!));
    islets = new Set([
      ...parent.islets.filter((one) => one !== parent.group),
      ...found.islets.map((one) => base + one),
    ]);
  }
  return {
    labels,
    vector: found.vector,
    islets,
    eigenvalues: [...found.eigenvalues],
    residuals: [...found.residuals],
    gaps: null,
    cheeger: found.cheeger,
    tau: laplacian === 'regularised' ? found.tau : null,
    scope: { members: found.scope.members, component: found.scope.component },
    source:
      laplacian === 'regularised'
        ? 'Fiedler 1973; Shi & Malik 2000; Zhang & Rohe 2018'
        : laplacian === 'normalised'
          ? 'Fiedler 1973; Shi & Malik 2000'
          : 'Fiedler 1973',
    notes,
  };
}

function manyGroups(input: GroupingInput, watch?: Watch): Division {
  const { net, laplacian, seed, k } = input;
  const found = spectralGrouping(
    net,
    {
      k,
      laplacian,
      seed,
      ...(input.tau === null ? {} : { tau: input.tau }),
      ...(input.minimumSize === null ? {} : { minimumSize: input.minimumSize }),
    },
    watch,
  );
  const notes: string[] = [];
  if (found.islets.length > 0)
    notes.push(
      `${found.islets.length} ${found.islets.length === 1 ? 'part is' : 'parts are'} too small and not tied to the rest; kept as ${found.islets.length === 1 ? 'an islet' : 'islets'}.`,
    );
  const wanted = k === 'auto' ? found.suggestions[0]?.k : k;
  if (wanted !== undefined && found.k < wanted)
    notes.push(
      `${found.k} groups were made, not ${wanted}: smaller ones were joined to the group they are tied to most.`,
    );
  return {
    labels: found.labels,
    vector: null,
    islets: new Set(found.islets),
    eigenvalues: [...found.eigenvalues],
    residuals: [...found.residuals],
    gaps: [...found.suggestions].sort((a, b) => a.k - b.k),
    cheeger: null,
    tau: laplacian === 'regularised' ? found.tau : null,
    scope: { members: found.scope.members, component: found.scope.components === 1 ? 0 : null },
    source: 'Ng, Jordan & Weiss 2001; Amini, Chen, Bickel & Levina 2013',
    notes,
  };
}

function secondOpinion({ net, seed }: GroupingInput, watch?: Watch): Division {
  if (net.targets.length === 0)
    throw new UnanswerableError('no-ties', 'There are no ties, so there is nothing to group by.');
  watch?.progress?.(0.1, 'Louvain');
  const labels = louvainLabels(net, seed);
  const alone = new Set<number>();
  for (let i = 0; i < net.n; i++) if (net.offsets[i] === net.offsets[i + 1]) alone.add(labels[i]!);
  return {
    labels,
    vector: null,
    islets: alone,
    eigenvalues: [],
    residuals: [],
    gaps: null,
    cheeger: null,
    tau: null,
    scope: { members: net.n, component: null },
    source: 'Blondel, Guillaume, Lambiotte & Lefebvre 2008, resolution 1',
    notes: [],
  };
}

/**
 * Groups for the levels of the default smoother. All zeros where the network has no groups to speak of
 * (no ties, or too few members).
 */
export function computeSmootherGroups(
  { net, k, seed }: { net: Network; k: number | null; seed: number },
  watch?: Watch,
): Int32Array {
  if (k === 1) return new Int32Array(net.n);
  try {
    const { labels, islets } = spectralGrouping(
      net,
      { k: k ?? 'auto', laplacian: 'regularised', seed },
      watch,
    );
    // A small component has its own constant already; a level beside it would say the same twice.
    const alone = new Set(islets);
    const levels = labels.map((label) => (alone.has(label) ? -1 : label));
    return refineByNeighbours(net, levels);
  } catch (error) {
    if (k === null && error instanceof UnanswerableError) return new Int32Array(net.n);
    throw error;
  }
}
