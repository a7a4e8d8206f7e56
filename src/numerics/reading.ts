import { applyFilter, checkFilter, type ChosenFilter } from './filters';
import { components, subnetwork } from './network';
import { laplacianOperator, meanStrength } from './operators';
import { EXACT_UP_TO, smooth, type Problem, type Smoothing, type Strength } from './smoothers';
import {
  benjaminiHochberg,
  checkValues,
  globalStatistics,
  localMoran,
  localPermutations,
  median,
  observedTies,
  twoSidedP,
  type GlobalStatistic,
  type LocalMoran,
} from './statistics';
import { UnanswerableError, type LaplacianKind, type Network, type Watch } from './types';

/** A stream of its own for the shuffles of local Moran. */
const LOCAL_STREAM = 0x165667b1;

export type ReadingFilter =
  | { readonly kind: 'two-level' }
  | { readonly kind: 'tikhonov'; readonly alpha: number | 'gcv' | 'hold-out' }
  | ChosenFilter;

export interface ReadingInput {
  /** One a member, NaN where missing. */
  readonly values: Float64Array;
  /** Precision weights, NaN or 0 counted as 1; null for equal weights. */
  readonly precision: Float64Array | null;
  /** Groups for the levels of the two-level smoother; null for none. */
  readonly groups: Int32Array | null;
  readonly filter: ReadingFilter;
  readonly laplacian: LaplacianKind;
  /** Members with fewer ties are not tested. */
  readonly neighbourFloor: number;
  readonly permutations: number;
  readonly seed: number;
}

/** Of each member. NaN stands for "none", as said with each. */
export interface ReadingColumns {
  /** NaN where missing. */
  readonly value: Float64Array;
  /** NaN in components without a value. */
  readonly smoothed: Float64Array;
  /** NaN where smoothed is, and for filters that leave no estimate of the level (high-pass, band-pass, Chebyshev). */
  readonly standardError: Float64Array;
  /** NaN where missing, and where the own score is the only evidence. */
  readonly departure: Float64Array;
  /** NaN where missing, and above 2,000 members for filters. */
  readonly leverage: Float64Array;
  readonly leverageExact: Uint8Array;
  /** NaN where departure is, and for everybody where sigma is 0. */
  readonly z: Float64Array;
  /** NaN where not tested. */
  readonly p: Float64Array;
  readonly q: Float64Array;
  readonly observed: Uint8Array;
  readonly tested: Uint8Array;
  readonly neighbours: Int32Array;
  readonly local: LocalMoran;
  /** Two-sided p of local Moran by conditional permutation; NaN without an observed neighbour or without shuffles. */
  readonly localPermutationP: Float64Array;
}

export interface ReadingResult {
  readonly columns: ReadingColumns;
  /** NaN for filters that have none. */
  readonly alpha: number;
  /** 0 where everybody's smoothed score is the recorded one. */
  readonly sigma: number;
  readonly sigmaLikelihood: number;
  readonly observed: number;
  readonly missing: number;
  readonly tested: number;
  readonly effectiveDegrees: number;
  readonly moran: { row: GlobalStatistic; raw: GlobalStatistic };
  readonly geary: { row: GlobalStatistic; raw: GlobalStatistic };
  /** xᵀLx and xᵀLx/xᵀx of the centred observed signal (missing ones filled in), chosen Laplacian. */
  readonly smoothness: { quadratic: number; rayleigh: number };
  /**
   * Share of the variation that neighbours predict without the member's own score:
   * 1 − Σ departure² / Σ (y − mean of the others)², never below 0.
   */
  readonly explained: number;
  /** Median |departure|; NaN when nobody has one. */
  readonly typical: number;
  readonly residual: number;
  readonly notes: readonly string[];
}

/** Members of components with an observed member, in member order. */
function estimable(
  net: Network,
  observed: Uint8Array,
  laplacian: LaplacianKind,
): { members: Int32Array; nullity: number } {
  const parts = components(net);
  if (laplacian === 'regularised')
    return { members: Int32Array.from({ length: net.n }, (_, i) => i), nullity: 1 };
  const seen = new Uint8Array(parts.count);
  observed.forEach((one, i) => {
    if (one === 1) seen[parts.labels[i]!] = 1;
  });
  const members = Int32Array.from(
    Array.from(parts.labels.keys()).filter((i) => seen[parts.labels[i]!] === 1),
  );
  return { members, nullity: seen.reduce((sum, one) => sum + one, 0) };
}

const isSmoother = (filter: ReadingFilter): filter is Exclude<ReadingFilter, ChosenFilter> =>
  filter.kind === 'two-level' || filter.kind === 'tikhonov';

/** Runs the default or the Tikhonov smoother on the estimable members and spreads the result over all. */
function smoothMembers(
  net: Network,
  input: ReadingInput,
  filter: Exclude<ReadingFilter, ChosenFilter>,
  observed: Uint8Array,
  watch?: Watch,
): Smoothing {
  const twoLevel = filter.kind === 'two-level';
  const laplacian = twoLevel ? 'combinatorial' : input.laplacian;
  const { members, nullity } = estimable(net, observed, laplacian);
  const part = members.length === net.n ? net : subnetwork(net, members);
  const pick = (of: (i: number) => number): Float64Array => Float64Array.from(members, of);
  const mean = twoLevel ? meanStrength(net) : 1;
  const scaled =
    twoLevel && mean > 0
      ? { ...part, weights: part.weights.map((w) => w / mean), strength: part.strength.map((d) => d / mean) }
      : part;
  const weight = (i: number): number => {
    const given = input.precision?.[i];
    return given !== undefined && given > 0 ? given : 1;
  };
  const problem: Problem = {
    l: laplacianOperator(scaled, laplacian),
    observed: Uint8Array.from(members, (i) => observed[i]!),
    y: pick((i) => (observed[i] === 1 ? input.values[i]! : 0)),
    s: pick((i) => (observed[i] === 1 ? weight(i) : 0)),
    groups: twoLevel && input.groups ? Int32Array.from(members, (i) => input.groups![i]!) : null,
    nullity,
  };
  const strength: Strength = twoLevel
    ? { kind: 'restricted-likelihood' }
    : typeof filter.alpha === 'string'
      ? { kind: filter.alpha }
      : { kind: 'given', alpha: filter.alpha };
  const fit = smooth(problem, strength, twoLevel, input.seed, watch);
  const spread = (of: Float64Array): Float64Array => {
    const out = new Float64Array(net.n).fill(NaN);
    members.forEach((i, at) => (out[i] = of[at]!));
    return out;
  };
  const flags = (of: Uint8Array): Uint8Array => {
    const out = new Uint8Array(net.n);
    members.forEach((i, at) => (out[i] = of[at]!));
    return out;
  };
  return {
    ...fit,
    smoothed: spread(fit.smoothed),
    variance: spread(fit.variance),
    leverage: spread(fit.leverage),
    departure: spread(fit.departure),
    z: spread(fit.z),
    exact: flags(fit.exact),
    zeroed: flags(fit.zeroed),
  };
}

/** A chosen filter: missing scores are filled by the default smoother first. */
function filterMembers(
  net: Network,
  input: ReadingInput,
  filter: ChosenFilter,
  observed: Uint8Array,
  watch?: Watch,
): Smoothing {
  const notes: string[] = [];
  let signal = Float64Array.from(input.values);
  if (observed.some((one) => one === 0)) {
    const filled = smoothMembers(
      net,
      { ...input, laplacian: 'combinatorial' },
      { kind: 'two-level' },
      observed,
      watch,
    );
    const mean =
      signal.reduce((sum, one) => sum + (Number.isNaN(one) ? 0 : one), 0) /
      observed.reduce((sum, one) => sum + one, 0);
    signal = signal.map((one, i) =>
      Number.isNaN(one) ? (Number.isNaN(filled.smoothed[i]!) ? mean : filled.smoothed[i]!) : one,
    );
    notes.push('Missing scores were filled in by the default smoother before filtering.');
  }
  const filtered = applyFilter(net, input.laplacian, filter, signal, watch);
  const n = net.n;
  const smoothing = filter.kind === 'heat' || filter.kind === 'low-pass';
  const departure = new Float64Array(n).fill(NaN);
  const raw = new Float64Array(n).fill(NaN);
  let rss = 0;
  for (let i = 0; i < n; i++) {
    if (observed[i] === 0) continue;
    const rest = signal[i]! - filtered.values[i]!;
    rss += rest * rest;
    const free = smoothing && !Number.isNaN(filtered.diagonal[i]!) ? 1 - filtered.diagonal[i]! : 1;
    // A filter that keeps everything of a member leaves nothing to compare.
    if (free < 1e-9) continue;
    departure[i] = rest / free;
    raw[i] = rest / Math.sqrt(free);
  }
  const sigma = 1.4826 * median(raw.map(Math.abs));
  const count = observed.reduce((sum, one) => sum + one, 0);
  const trace = filtered.diagonal.reduce((sum, one) => sum + one, 0);
  const sigmaLikelihood = Math.sqrt(rss / Math.max(1, count - (Number.isNaN(trace) ? 0 : trace)));
  const used = sigma > 0 ? sigma : sigmaLikelihood;
  return {
    alpha: NaN,
    smoothed: filtered.values,
    variance: filtered.diagonal.map((one) => (smoothing ? one : NaN)),
    leverage: filtered.diagonal,
    exact: new Uint8Array(n).fill(n <= EXACT_UP_TO ? 1 : 0),
    quadratic: rss,
    degrees: count,
    residual: filtered.residual,
    sigma: used,
    sigmaLikelihood,
    departure,
    z: raw.map((one) => (used > 0 ? one / used : NaN)),
    zeroed: new Uint8Array(n),
    notes: [...notes, ...filtered.notes],
  };
}

function checkInput(net: Network, input: ReadingInput, observed: Uint8Array): void {
  const { values, precision, groups, filter, permutations } = input;
  if (
    values.length !== net.n ||
    (precision?.length ?? net.n) !== net.n ||
    (groups?.length ?? net.n) !== net.n
  )
    throw new UnanswerableError('bad-values', 'The attribute is not of the members of this network.');
  checkValues(values);
  if (precision?.some((one) => one > 1e100 || (one > 0 && one < 1e-100)))
    throw new UnanswerableError('bad-values', 'Precision weights must lie between 1e-100 and 1e100.');
  if (!Number.isInteger(permutations) || permutations < 0)
    throw new UnanswerableError(
      'bad-permutations',
      'The number of shuffles must be a whole number of 0 or more.',
    );
  if (!isSmoother(filter)) checkFilter(filter);
  const seen = Array.from(values).filter((_, i) => observed[i] === 1);
  if (net.targets.length === 0)
    throw new UnanswerableError(
      'no-ties',
      'This snapshot has no ties, so no neighbourhood can say anything.',
    );
  if (seen.length === 0) throw new UnanswerableError('all-missing', 'Nobody has a value of this attribute.');
  if (seen.length < 3)
    throw new UnanswerableError(
      'too-few-observed',
      `Only ${seen.length} members have a value; at least 3 are needed.`,
    );
  if (seen.every((one) => one === seen[0]))
    throw new UnanswerableError(
      'constant-attribute',
      'All observed values are equal, so nothing can be shared or stand apart.',
    );
}

function smoothnessOf(
  net: Network,
  laplacian: LaplacianKind,
  values: Float64Array,
  filled: Float64Array,
): ReadingResult['smoothness'] {
  const x = values.map((one, i) => (Number.isNaN(one) ? filled[i]! : one));
  const known = x.filter(Number.isFinite);
  const mean = known.reduce((sum, one) => sum + one, 0) / known.length;
  const centred = x.map((one) => (Number.isFinite(one) ? one - mean : 0));
  const out = new Float64Array(net.n);
  laplacianOperator(net, laplacian).multiply(centred, out);
  const quadratic = out.reduce((sum, one, i) => sum + one * centred[i]!, 0);
  return { quadratic, rayleigh: quadratic / centred.reduce((sum, one) => sum + one * one, 0) };
}

/**
 * One reading: smoothed scores with standard errors, left-out departures with z, p and q, how shared the attribute
 * is, and local Moran as a second opinion.
 * @throws UnanswerableError in plain words where the method cannot answer
 */
export function takeReading(net: Network, input: ReadingInput, watch?: Watch): ReadingResult {
  const { values } = input;
  const observed = Uint8Array.from(values, (one) => (Number.isNaN(one) ? 0 : 1));
  checkInput(net, input, observed);
  const inner: Watch | undefined = watch && {
    ...watch,
    progress: (done, step) => watch.progress?.(0.75 * done, step),
  };
  const fit = isSmoother(input.filter)
    ? smoothMembers(net, input, input.filter, observed, inner)
    : filterMembers(net, input, input.filter, observed, inner);
  watch?.progress?.(0.78, 'Shuffling scores for comparison');
  const ties = observedTies(net, values);
  const row = globalStatistics(ties, 'row', input.permutations, input.seed, watch);
  const raw = globalStatistics(ties, 'raw', input.permutations, input.seed, watch);
  watch?.progress?.(0.97, 'Comparing each member with the neighbours');
  const local = localMoran(ties, net.n);
  // q is from the p of the moments: the smallest p of 999 shuffles, 0.001, is too large for it on a large network.
  const localPermutationP =
    input.permutations > 0
      ? localPermutations(
          ties,
          net.n,
          input.permutations,
          input.seed ^ LOCAL_STREAM,
          'row',
          watch && {
            ...watch,
            progress: (done, step) => watch.progress?.(0.97 + 0.03 * done, step),
          },
        ).twoSided
      : new Float64Array(net.n).fill(NaN);
  const neighbours = Int32Array.from({ length: net.n }, (_, i) => net.offsets[i + 1]! - net.offsets[i]!);
  const tested = Uint8Array.from(observed, (one, i) =>
    one === 1 && neighbours[i]! >= input.neighbourFloor && Number.isFinite(fit.z[i]!) ? 1 : 0,
  );
  const p = fit.z.map((z, i) => (tested[i] === 1 ? twoSidedP(z) : NaN));
  const q = benjaminiHochberg(p);
  const count = observed.reduce((sum, one) => sum + one, 0);
  return {
    columns: {
      value: Float64Array.from(values),
      smoothed: fit.smoothed,
      standardError: fit.variance.map((v) => fit.sigma * Math.sqrt(Math.max(0, v))),
      departure: fit.departure,
      leverage: fit.leverage.map((one, i) => (observed[i] === 1 ? one : NaN)),
      leverageExact: fit.exact,
      z: fit.z.map((z, i) => (observed[i] === 1 ? z : NaN)),
      p,
      q,
      observed,
      tested,
      neighbours,
      local,
      localPermutationP,
    },
    alpha: fit.alpha,
    sigma: fit.sigma,
    sigmaLikelihood: fit.sigmaLikelihood,
    observed: count,
    missing: net.n - count,
    tested: tested.reduce((sum, one) => sum + one, 0),
    effectiveDegrees: fit.leverage.reduce(
      (sum, one, i) => sum + (observed[i] === 1 && Number.isFinite(one) ? one : 0),
      0,
    ),
    moran: { row: row.moran, raw: raw.moran },
    geary: { row: row.geary, raw: raw.geary },
    smoothness: smoothnessOf(net, input.laplacian, values, fit.smoothed),
    explained: explainedShare(values, fit.departure, count),
    typical: median(fit.departure.map(Math.abs)),
    residual: fit.residual,
    notes: fit.notes,
  };
}

function explainedShare(values: Float64Array, departure: Float64Array, count: number): number {
  let sum = 0;
  values.forEach((one) => (sum += Number.isNaN(one) ? 0 : one));
  let left = 0;
  let all = 0;
  values.forEach((one, i) => {
    if (Number.isNaN(one) || Number.isNaN(departure[i]!)) return;
    left += departure[i]! ** 2;
    all += (one - (sum - one) / (count - 1)) ** 2;
  });
  return all > 0 ? Math.max(0, 1 - left / all) : 0;
}
