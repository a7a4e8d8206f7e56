import { spectrum, type Spectrum } from '../eigen';
import { componentMembers, components, subnetwork } from '../network';
import { createRandom } from '../random';
import { UnanswerableError, type LaplacianKind, type Network, type Watch } from '../types';
import { followBranches } from './branches';
import { kMeans } from './kmeans';
import { mergeSmall, renumber } from './merge';

export interface SpectralOptions {
  /** Number of groups, or the largest eigengap. */
  readonly k: number | 'auto';
  readonly laplacian: LaplacianKind;
  readonly tau?: number;
  /** Smaller groups are joined to the group they are most strongly tied to; default max(5, 1 % of the members in scope). */
  readonly minimumSize?: number;
  readonly seed: number;
  readonly tolerance?: number;
}

export interface SpectralGrouping {
  /** Group of each member, largest first; islets after the groups. */
  readonly labels: Int32Array;
  /** Number of groups that were found, islets not counted; below the wanted k where small groups were joined. */
  readonly k: number;
  /** The k eigenvalues whose vectors were used, and their residuals. */
  readonly eigenvalues: Float64Array;
  readonly residuals: Float64Array;
  /** The first eigenvalues (up to 21, or k + 1) for the picture of gaps, each at most 3e-3 of the norm too high. */
  readonly overview: Float64Array;
  /** λ_{k+1} − λ_k for k = 2…20, largest gap first. */
  readonly suggestions: readonly { readonly k: number; readonly gap: number }[];
  /** Members that were grouped: those of all components with at least the smallest size. */
  readonly scope: { readonly members: number; readonly components: number };
  readonly islets: readonly number[];
  /** Sum of squared distances of the k-means step. */
  readonly inertia: number;
  readonly tau: number;
}

const mostGroups = 64;

/**
 * k-way spectral grouping (Ng, Jordan & Weiss 2001): rows of the first k eigenvectors scaled to unit length,
 * then k-means; small branches follow the member they hang on. Components below the smallest size are not grouped but kept as islets; the others are grouped together.
 *
 * @throws UnanswerableError `no-ties`; `too-small` when there are fewer members in scope than groups asked for
 */
export function spectralGrouping(net: Network, options: SpectralOptions, watch?: Watch): SpectralGrouping {
  const parts = components(net);
  if (parts.count === 0 || parts.sizes[parts.largest]! < 2) {
    throw new UnanswerableError('no-ties', 'There are no ties, so there is nothing to group by.');
  }
  const smallest = options.minimumSize ?? Math.max(5, Math.ceil(0.01 * net.n));
  const members = componentMembers(parts);
  const large = [...members.keys()].filter(
    (c) => c === parts.largest || members[c]!.length >= Math.max(2, smallest),
  );
  const keep = new Uint8Array(parts.count);
  for (const c of large) keep[c] = 1;
  const scope = Int32Array.from({ length: net.n }, (_, i) => i).filter((i) => keep[parts.labels[i]!] === 1);
  const part = scope.length === net.n ? net : subnetwork(net, scope);
  const wanted = options.k === 'auto' ? 0 : options.k;
  if (wanted !== 0 && (!Number.isInteger(wanted) || wanted < 2 || wanted > mostGroups)) {
    throw new UnanswerableError(
      'bad-k',
      `The number of groups must be a whole number from 2 to ${mostGroups}.`,
    );
  }
  if (part.n <= Math.max(2, wanted)) {
    throw new UnanswerableError(
      'too-small',
      `${part.n} tied members are too few for ${Math.max(2, wanted)} groups.`,
    );
  }
  const { laplacian, tau, tolerance, seed } = options;
  // A gap needs few digits: an eigenvalue is off by the square of its residual, so a coarse solve is enough for the
  // suggestions, and only the k vectors that are used are computed to the promised accuracy.
  const count = Math.min(part.n, Math.max(21, wanted + 1));
  const coarse = Math.max(tolerance ?? 1e-8, 3e-3);
  const overview = spectrum(part, { laplacian, tau, count, tolerance: coarse, seed }, watch);
  const suggestions = eigengaps(overview.values);
  const k = wanted || suggestions[0]!.k;
  const solution = spectrum(part, { laplacian, tau, count: k, tolerance, seed }, watch);
  watch?.progress?.(0.95, 'k-means');
  const found = kMeans(embedding(solution, part.n, k), k, k, createRandom(seed));
  const least = Math.min(smallest, Math.floor(part.n / 2));
  const merged = mergeSmall(part, followBranches(part, found.labels, least), least);
  const ordered = renumber(merged);
  const groups = ordered.reduce((most, label) => Math.max(most, label + 1), 0);
  const labels = new Int32Array(net.n).fill(-1);
  scope.forEach((i, a) => (labels[i] = ordered[a]!));
  const small = [...members.keys()].filter((c) => keep[c] === 0);
  small.sort((x, y) => members[y]!.length - members[x]!.length || x - y);
  small.forEach((c, at) => members[c]!.forEach((i) => (labels[i] = groups + at)));
  return {
    labels,
    k: groups,
    eigenvalues: solution.values,
    residuals: solution.residuals,
    overview: overview.values,
    suggestions,
    scope: { members: part.n, components: large.length },
    islets: small.map((_, at) => groups + at),
    inertia: found.inertia,
    tau: solution.tau,
  };
}

/** Gaps λ_{k+1} − λ_k for k = 2…20, largest first (lowest k on ties). */
export function eigengaps(values: Float64Array): { k: number; gap: number }[] {
  const gaps: { k: number; gap: number }[] = [];
  for (let k = 2; k <= 20 && k < values.length; k++) gaps.push({ k, gap: values[k]! - values[k - 1]! });
  return gaps.sort((a, b) => b.gap - a.gap || a.k - b.k);
}

/** First k eigenvectors as rows of unit length; a zero row stays zero. */
function embedding(solution: Spectrum, n: number, k: number): Float64Array {
  const points = new Float64Array(n * k);
  for (let i = 0; i < n; i++) {
    let size = 0;
    for (let l = 0; l < k; l++) size += solution.vectors[l]![i]! ** 2;
    const inverse = size > 0 ? 1 / Math.sqrt(size) : 0;
    for (let l = 0; l < k; l++) points[i * k + l] = solution.vectors[l]![i]! * inverse;
  }
  return points;
}
