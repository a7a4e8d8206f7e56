import { components } from '../network';
import { ShiftedSystems } from '../solvers';
import { median } from '../statistics';
import type { LaplacianKind, Watch } from '../types';
import { UnanswerableError } from '../types';
import { exactBasis } from './exact-basis';
import { ExactSystem } from './exact-system';
import { HoldOut } from './hold-out';
import { LargeSystem } from './large-system';
import type { Fit, Problem } from './model';
import { searchStrength } from './search';

/** Up to this many members everything is exact. */
export const EXACT_UP_TO = 2_000;
/** Members whose standardised departure is beyond this get weight 0 in the robust rounds. */
const WILD = 2.5;
const ROUNDS = 3;
/** Members whose leverage is made exact on the large path, at most. */
const REFINED = 120;

export type Strength =
  | { readonly kind: 'given'; readonly alpha: number }
  | { readonly kind: 'gcv' }
  /** Ten seeded folds of left-out scores; only for a smoother without levels. */
  | { readonly kind: 'hold-out' }
  | { readonly kind: 'restricted-likelihood' };

export interface Smoothing extends Fit {
  /** 0 where the fit is exact for everybody. */
  readonly sigma: number;
  readonly sigmaLikelihood: number;
  /** Left-out departure; NaN for missing members and for those whose own score is their only evidence. */
  readonly departure: Float64Array;
  /** Standardised departure; NaN where departure is, and for everybody where sigma is 0. */
  readonly z: Float64Array;
  /** 1 for members whose score had no part in the fit. */
  readonly zeroed: Uint8Array;
  readonly notes: readonly string[];
}

/** A spread below this share of the scores' own spread is what rounding leaves of an exact fit. */
const EXACT_FIT = 1e-9;

/**
 * Departures of a fit: left-out for members with weight, plain for those without, who were left out by the fit.
 * Where the fit is exact for everybody there is no spread to measure by: sigma is 0 and z NaN.
 */
function standardise(
  problem: Problem,
  fit: Fit,
  zeroed: Uint8Array,
): Pick<Smoothing, 'departure' | 'z' | 'sigma' | 'sigmaLikelihood'> {
  const { y, s, observed } = problem;
  const n = y.length;
  const departure = new Float64Array(n).fill(NaN);
  const z = new Float64Array(n).fill(NaN);
  for (let i = 0; i < n; i++) {
    if (observed[i] === 0) continue;
    const rest = y[i]! - fit.smoothed[i]!;
    const free = 1 - fit.leverage[i]!;
    const out = zeroed[i] === 1;
    // A score that is its own only evidence, as without ties, cannot be left out.
    if (!out && free < 1e-9) continue;
    departure[i] = out ? rest : rest / free;
    z[i] = (Math.sqrt(s[i]!) * rest) / Math.sqrt(out ? 1 + s[i]! * fit.variance[i]! : free);
  }
  const floor = EXACT_FIT * spreadOf(problem);
  const robust = 1.4826 * median(z.map(Math.abs));
  const likelihood = Math.sqrt(fit.quadratic / Math.max(1, fit.degrees));
  const sigmaLikelihood = likelihood > floor ? likelihood : 0;
  const sigma = robust > floor ? robust : sigmaLikelihood;
  for (let i = 0; i < n; i++) z[i] = sigma > 0 ? z[i]! / sigma : NaN;
  return { departure, z, sigma, sigmaLikelihood };
}

/** Root mean square of the observed scores about their mean, in the unit of √s · score. */
function spreadOf({ y, s }: Problem): number {
  let weight = 0;
  let sum = 0;
  let count = 0;
  y.forEach((one, i) => {
    weight += s[i]!;
    sum += s[i]! * one;
    if (s[i]! > 0) count++;
  });
  const mean = sum / weight;
  return Math.sqrt(y.reduce((total, one, i) => total + s[i]! * (one - mean) ** 2, 0) / count);
}

/** Members that the next round leaves out; never most of a small problem, nor all that a component has. */
function wild({ l, observed }: Problem, z: Float64Array): Uint8Array {
  const out = Uint8Array.from(z, (one) => (Math.abs(one) > WILD ? 1 : 0));
  const count = out.reduce((sum, one) => sum + one, 0);
  const all = observed.reduce((sum, one) => sum + one, 0);
  if (count === 0 || count > 0.2 * all) return new Uint8Array(z.length);
  // The regularised Laplacian ties everybody to everybody.
  if (l.kind === 'regularised') return out;
  const { labels, count: parts } = components(l.network);
  const left = new Uint8Array(parts);
  observed.forEach((one, i) => {
    if (one === 1 && out[i] === 0) left[labels[i]!] = 1;
  });
  return out.map((one, i) => (left[labels[i]!] === 1 ? one : 0));
}

const rangeFor = (kind: LaplacianKind, strength: Strength['kind']): [number, number] =>
  (strength === 'gcv' || strength === 'hold-out') && kind === 'combinatorial' ? [-4, 4] : [-3, 5];

/**
 * Boundary-avoiding penalty on −2 log restricted likelihood, after Chung, Rabe-Hesketh, Dorie, Gelman & Liu 2013, here
 * on the share 1/√(1 + α) of f. Without it a weak variation along ties is often estimated as exactly none, and every
 * interval is then too narrow. It is flat where f is strong, and fades beside the likelihood as members are added.
 */
const boundary = (alpha: number): number => Math.log1p(alpha);
/** Its derivative by log α. */
const boundarySlope = (alpha: number): number => alpha / (1 + alpha);
/** Likelihood ratio below which variation along ties is not told from none: 5 % of ½χ²₀ + ½χ²₁ (Self & Liang 1987). */
const NO_VARIATION = 2.706;

const NOTES = {
  low: 'The fit found no stretch over which neighbours’ scores agree; the smoothed score stays close to the recorded one.',
  high: 'Beyond the levels of the groups, no resemblance of neighbours can be told from chance in this attribute.',
  exact: 'Everybody’s smoothed score is the recorded one, so there is no spread to measure departures by.',
} as const;

/** What is said of how the strength was found, and of a fit without any departures. */
const notesOf = (end: 'low' | 'high' | null, strength: Strength, sigma: number): string[] => [
  ...(end && strength.kind !== 'given' ? [NOTES[end]] : []),
  ...(sigma > 0 ? [] : [NOTES.exact]),
];

/**
 * Smooths one attribute: strength given, by generalised cross-validation, by ten-fold hold-out (the strength to a few
 * per cent), or by restricted maximum likelihood with robust rounds (numerics.md, "Readings").
 * @throws UnanswerableError `too-few-observed` with fewer than three observed members; `bad-strength` unless a given α
 *   is positive and finite; `bad-values` when a value is not finite
 */
export function smooth(
  problem: Problem,
  strength: Strength,
  robust: boolean,
  seed: number,
  watch?: Watch,
): Smoothing {
  const observed = problem.observed.reduce((sum, one) => sum + one, 0);
  if (observed < 3)
    throw new UnanswerableError(
      'too-few-observed',
      `Only ${observed} members have a value; at least 3 are needed.`,
    );
  if (strength.kind === 'given' && !(strength.alpha > 0 && Number.isFinite(strength.alpha)))
    throw new UnanswerableError('bad-strength', 'The strength α must be a positive number.');
  if (!problem.y.every(Number.isFinite) || !problem.s.every(Number.isFinite))
    throw new UnanswerableError('bad-values', 'Values and precision weights must be finite.');
  return problem.l.n <= EXACT_UP_TO
    ? smoothExactly(problem, strength, robust, seed, watch)
    : smoothLarge(problem, strength, robust, seed, watch);
}

function smoothExactly(
  problem: Problem,
  strength: Strength,
  robust: boolean,
  seed: number,
  watch?: Watch,
): Smoothing {
  const basis = exactBasis(
    problem,
    watch && { ...watch, progress: (done, step) => watch.progress?.(0.7 * done, step) },
  );
  const [low, high] = rangeFor(problem.l.kind, strength.kind);
  let zeroed: Uint8Array = new Uint8Array(problem.l.n);
  let end: 'low' | 'high' | null = null;
  const choose = (system: ExactSystem): number => {
    if (strength.kind === 'given') return strength.alpha;
    if (strength.kind === 'hold-out') {
      const folds = new HoldOut(problem, seed, basis, watch);
      const found = searchStrength((alpha) => folds.error(alpha), low, high, 1e-2);
      if (folds.error(found.alpha) === Infinity)
        throw new UnanswerableError(
          'ties-too-weak',
          'The ties are too weak or too uneven to predict left-out scores at any strength; choose one yourself.',
        );
      end = found.end;
      return found.alpha;
    }
    const found = searchStrength(
      (alpha) =>
        strength.kind === 'gcv' ? system.crossValidation(alpha) : system.criterion(alpha) + boundary(alpha),
      low,
      high,
    );
    end = found.end;
    if (
      strength.kind === 'restricted-likelihood' &&
      system.criterion(10 ** high) - system.criterion(found.alpha) < NO_VARIATION
    )
      end = 'high';
    return found.alpha;
  };
  const rounds = robust ? ROUNDS : 0;
  for (let round = 0; round < rounds; round++) {
    watch?.progress?.(0.7 + 0.05 * round, 'Setting wild scores aside');
    const system = new ExactSystem(problem, basis, zeroed);
    const fit = system.fit(choose(system));
    const next = wild(problem, standardise(problem, fit, zeroed).z);
    const same = next.every((one, i) => one === zeroed[i]);
    zeroed = next;
    if (same) break;
  }
  watch?.progress?.(0.9, 'Fitting');
  const finish = (): Smoothing => {
    const system = new ExactSystem(problem, basis, zeroed);
    const fit = system.fit(choose(system));
    const measured = standardise(problem, fit, zeroed);
    return { ...fit, ...measured, zeroed, notes: notesOf(end, strength, measured.sigma) };
  };
  const found = finish();
  if (found.sigma > 0 || !zeroed.includes(1)) return found;
  // The wild scores were all that varied: they are the spread, and stay in.
  zeroed = new Uint8Array(problem.l.n);
  return finish();
}

function smoothLarge(
  problem: Problem,
  strength: Strength,
  robust: boolean,
  seed: number,
  watch?: Watch,
): Smoothing {
  const systems = new ShiftedSystems(problem.l);
  try {
    return smoothBySolving(problem, strength, robust, seed, systems, watch);
  } finally {
    systems.close();
  }
}

function smoothBySolving(
  problem: Problem,
  strength: Strength,
  robust: boolean,
  seed: number,
  systems: ShiftedSystems,
  watch?: Watch,
): Smoothing {
  const [low, high] =
    strength.kind === 'restricted-likelihood' ? [-1.5, 4] : rangeFor(problem.l.kind, strength.kind);
  let zeroed: Uint8Array = new Uint8Array(problem.l.n);
  let end: 'low' | 'high' | null = null;
  const choose = (system: LargeSystem, within?: readonly [number, number]): number => {
    if (strength.kind === 'given') return strength.alpha;
    const folds = strength.kind === 'hold-out' ? new HoldOut(problem, seed, systems, watch) : null;
    const found: Found = folds
      ? searchStrength((alpha) => folds.error(alpha), low, high, 0.05)
      : strength.kind === 'gcv'
        ? coarseMinimum((alpha) => system.crossValidation(alpha), low, high, watch)
        : rootOf(
            (alpha) => system.score(alpha),
            within ? Math.max(low, within[0]) : low,
            within ? Math.min(high, within[1]) : high,
            watch,
          );
    // Only the first search reaches far enough to compare with no variation at all.
    if (!within) end = found.flat === true ? 'high' : found.end;
    else end = found.end ?? end;
    return found.alpha;
  };
  let alpha = choose(new LargeSystem(problem, zeroed, seed, systems, watch));
  for (let round = 0; robust && round < ROUNDS; round++) {
    watch?.progress?.(0.5 + 0.05 * round, 'Setting wild scores aside');
    const fit = new LargeSystem(problem, zeroed, seed, systems, watch).fit(alpha, true);
    const next = wild(problem, standardise(problem, fit, zeroed).z);
    const same = next.every((one, i) => one === zeroed[i]);
    zeroed = next;
    if (same) break;
    // The strength moves most when the wild scores first go, and mostly up, as they had looked like variation.
    const near = Math.log10(alpha);
    alpha = choose(
      new LargeSystem(problem, zeroed, seed, systems, watch),
      round === 0 ? [near - 1, near + 2.5] : [near - 0.5, near + 0.5],
    );
  }
  let fit = new LargeSystem(problem, zeroed, seed, systems, watch).fit(alpha);
  let first = standardise(problem, fit, zeroed);
  if (first.sigma === 0 && zeroed.includes(1)) {
    // The wild scores were all that varied: they are the spread, and stay in.
    zeroed = new Uint8Array(problem.l.n);
    const system = new LargeSystem(problem, zeroed, seed, systems, watch);
    fit = system.fit(choose(system));
    first = standardise(problem, fit, zeroed);
  }
  const near = Array.from(first.z.keys())
    .filter((i) => Math.abs(first.z[i]!) > 2.2)
    .sort((a, b) => Math.abs(first.z[b]!) - Math.abs(first.z[a]!))
    .slice(0, REFINED);
  fit.refine(near);
  const measured = standardise(problem, fit, zeroed);
  const notes = [
    ...notesOf(end, strength, measured.sigma),
    `Leverages were estimated with seeded probes, and solved exactly for the ${near.length} members that stand out most.`,
  ];
  return { ...fit, ...measured, zeroed, notes };
}

interface Found {
  alpha: number;
  end: 'low' | 'high' | null;
  /** Whether the likelihood at the upper end is as good, but for chance. */
  flat?: boolean;
}

/**
 * Minimum of a criterion of which only the derivative by log α is known, with some noise: the derivative is summed
 * up over half decades, the penalty included, and the lowest point is refined by bisection to 7 %.
 */
function rootOf(score: (alpha: number) => number, low: number, high: number, watch?: Watch): Found {
  const places: number[] = [];
  const slopes: number[] = [];
  const penalised = (alpha: number): number => score(alpha) + boundarySlope(alpha);
  const step = (high - low) / Math.max(2, Math.round(2 * (high - low)));
  for (let place = low; place <= high + 1e-9; place += step) {
    watch?.progress?.(
      (0.4 * (place - low)) / (high - low),
      'Estimating how far neighbours resemble each other',
    );
    places.push(place);
    slopes.push(penalised(10 ** place));
  }
  let criterion = 0;
  let best = 0;
  let lowest = 0;
  for (let k = 1; k < places.length; k++) {
    criterion += (step * (slopes[k - 1]! + slopes[k]!)) / 2;
    if (criterion < lowest) {
      lowest = criterion;
      best = k;
    }
  }
  const last = places.length - 1;
  const unpenalised = (k: number, sum: number): number => sum * Math.LN10 - boundary(10 ** places[k]!);
  const flat = unpenalised(last, criterion) - unpenalised(best, lowest) < NO_VARIATION;
  if (best === 0) return { alpha: 10 ** low, end: 'low' };
  if (best === last) return { alpha: 10 ** high, end: 'high' };
  let [a, b] = slopes[best]! > 0 ? [places[best - 1]!, places[best]!] : [places[best]!, places[best + 1]!];
  while (b - a > 0.03) {
    const middle = (a + b) / 2;
    if (penalised(10 ** middle) > 0) b = middle;
    else a = middle;
  }
  return { alpha: 10 ** ((a + b) / 2), end: null, flat };
}

/** Minimum on half decades, refined by a parabola. */
function coarseMinimum(of: (alpha: number) => number, low: number, high: number, watch?: Watch): Found {
  const values: number[] = [];
  for (let k = 0; low + k / 2 <= high; k++) {
    watch?.progress?.((0.5 * k) / (2 * (high - low)), 'Choosing the strength');
    values.push(of(10 ** (low + k / 2)));
  }
  const best = values.indexOf(Math.min(...values));
  if (best === 0) return { alpha: 10 ** low, end: 'low' };
  if (best === values.length - 1) return { alpha: 10 ** high, end: 'high' };
  const [before, here, after] = [values[best - 1]!, values[best]!, values[best + 1]!];
  const shift = (before - after) / (2 * (before - 2 * here + after));
  return { alpha: 10 ** (low + (best + (Number.isFinite(shift) ? shift : 0)) / 2), end: null };
}
