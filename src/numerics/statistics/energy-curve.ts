import { dot, type Spectrum } from '../eigen';
import { laplacianOperator } from '../operators';
import { createRandom } from '../random';
import { CancelledError, UnanswerableError, type Network, type Watch } from '../types';
import { scaledDeviations } from './deviations';

/** Shares below and above which 2.5 % of the shuffles lie at each step, and the middle one; each of length steps. */
export interface EnergyBand {
  readonly low: Float64Array;
  readonly middle: Float64Array;
  readonly high: Float64Array;
}

export interface EnergyCurve {
  /** Distinct graph frequencies, ascending: the largest eigenvalue of each step. */
  readonly frequency: Float64Array;
  /** Eigenvalues in each step: more than 1 where a frequency is repeated, as only its whole eigenspace is defined. */
  readonly multiplicity: Int32Array;
  /** Share of ‖y − ȳ‖² held by frequencies up to that of the step, 0…1. */
  readonly share: Float64Array;
  /** The same expected under shuffling, in closed form. */
  readonly expectation: Float64Array;
  /** Pointwise quantiles 2.5, 50 and 97.5 % over the shuffles; null without any. */
  readonly band: EnergyBand | null;
  /** Whether the steps hold all n frequencies, so that the curve ends at 1. */
  readonly complete: boolean;
  /** Mean frequency Σ λ_l · share of λ_l = xᵀLx / xᵀx, x = y − ȳ: over all frequencies, whether computed or not. */
  readonly smoothness: {
    readonly value: number;
    /** Under shuffling: (tr L − 1ᵀL1/n) / (n − 1). */
    readonly expectation: number;
    /** (1 + #{|s* − E| ≥ |s − E|}) / (1 + P), two-sided; NaN without shuffles. */
    readonly permutationP: number;
  };
}

/** Shuffles that are compared with a frequency in one pass over its eigenvector. */
const TOGETHER = 8;

/**
 * Cumulative energy of a signal by graph frequency (Shuman, Narang, Frossard, Ortega & Vandergheynst 2013), as shares
 * of ‖y − ȳ‖², with a pointwise band from seeded shuffles of the attribute among the members, and the mean frequency
 * as the one summary that is tested. A curve above the band early on means neighbours are more alike than by chance.
 *
 * A shuffled x has the covariance ‖x‖²/(n − 1) · (I − 11ᵀ/n), so a frequency with unit eigenvector u is expected to
 * hold the share (1 − (uᵀ1)²/n) / (n − 1): 1/(n − 1) for every u orthogonal to the constant. Quantiles interpolate
 * between order statistics (type 7 of Hyndman & Fan 1996); the p counts the signal itself (Davison & Hinkley 1997, 4.2).
 *
 * @param basis all eigenpairs of `net` or the first k, as `spectrum` returns them; a repeated frequency that the first
 *   k cut through is defined only in part, and so is the last step then
 * @param signal length n, finite, any unit
 * @param options.permutations P shuffles, 0 or more; O(P (k n + m)) time, P × steps numbers of memory
 * @throws UnanswerableError `missing-values`; `constant-attribute`; `bad-basis` when the eigenvectors are of another network
 */
export function energyCurve(
  net: Network,
  basis: Spectrum,
  signal: Float64Array,
  options: { readonly permutations: number; readonly seed: number },
  watch?: Watch,
): EnergyCurve {
  const { n } = net;
  if (signal.length !== n || basis.vectors.some((u) => u.length !== n))
    throw new UnanswerableError('bad-basis', 'The frequencies and the signal are not of the same network.');
  const x = scaledDeviations(signal);
  const steps = stepsOf(basis);
  const l = laplacianOperator(net, basis.laplacian, basis.tau > 0 ? basis.tau : undefined);
  const total = dot(x, x);
  const product = new Float64Array(n);
  const smoothnessOf = (signal: Float64Array): number => {
    l.multiply(signal, product);
    return dot(signal, product) / total;
  };
  const value = Math.max(0, smoothnessOf(x));
  const expected = (traceOf(net, basis) - formOfOnes(l.multiply, n)) / (n - 1);

  const perFrequency = basis.vectors.map((u) => {
    const along = u.reduce((sum, one) => sum + one, 0);
    return Math.max(0, 1 - (along * along) / n) / (n - 1);
  });
  const own = basis.vectors.map((u) => dot(u, x) ** 2 / total);
  const shuffles = shuffled(x, basis.vectors, steps, total, smoothnessOf, options, watch);
  // Where shuffling changes nothing, as on a complete network, all differences are rounding.
  const apart = Math.abs(value - expected) - 1e-12 * Math.max(1e-300, basis.norm, l.norm);
  const beyond = shuffles.smoothness.reduce(
    (count, s) => count + (Math.abs(s - expected) >= apart ? 1 : 0),
    0,
  );
  const { permutations } = options;
  return {
    frequency: Float64Array.from(steps, ({ to }) => basis.values[to - 1]!),
    multiplicity: Int32Array.from(steps, ({ from, to }) => to - from),
    share: cumulative(own, steps),
    expectation: cumulative(perFrequency, steps),
    band: permutations > 0 ? bandOf(shuffles.shares, steps.length, permutations) : null,
    complete: basis.complete,
    smoothness: {
      value,
      expectation: expected,
      permutationP: permutations > 0 ? (1 + beyond) / (1 + permutations) : NaN,
    },
  };
}

interface Step {
  readonly from: number;
  readonly to: number;
}

/** Runs of eigenvalues that agree to 1e-8 relative (numerics.md), as half-open ranges. */
function stepsOf({ values, norm }: Spectrum): Step[] {
  const steps: { from: number; to: number }[] = [];
  values.forEach((value, l) => {
    const last = steps.at(-1);
    if (last && value - values[l - 1]! <= Math.max(1e-8 * value, 1e-13 * norm)) last.to = l + 1;
    else steps.push({ from: l, to: l + 1 });
  });
  return steps;
}

function cumulative(energy: ArrayLike<number>, steps: readonly Step[]): Float64Array {
  let sum = 0;
  return Float64Array.from(steps, ({ from, to }) => {
    for (let l = from; l < to; l++) sum += energy[l]!;
    return Math.min(1, sum);
  });
}

function traceOf({ n, strength }: Network, { laplacian, tau }: Spectrum): number {
  let trace = 0;
  for (let i = 0; i < n; i++) {
    const d = strength[i]!;
    if (laplacian === 'combinatorial') trace += d;
    else if (laplacian === 'normalised') trace += d > 0 ? 1 : 0;
    else trace += 1 - tau / n / (d + tau);
  }
  return trace;
}

/** 1ᵀL1 / n. */
function formOfOnes(multiply: (x: Float64Array, out: Float64Array) => void, n: number): number {
  const out = new Float64Array(n);
  multiply(new Float64Array(n).fill(1), out);
  return out.reduce((sum, one) => sum + one, 0) / n;
}

/** Cumulative shares of each shuffle, by step (shares[step · P + shuffle]), and mean frequencies. */
function shuffled(
  x: Float64Array,
  vectors: readonly Float64Array[],
  steps: readonly Step[],
  total: number,
  smoothnessOf: (x: Float64Array) => number,
  { permutations, seed }: { readonly permutations: number; readonly seed: number },
  watch?: Watch,
): { shares: Float64Array; smoothness: Float64Array } {
  const random = createRandom(seed);
  const current = Float64Array.from(x);
  const shares = new Float64Array(steps.length * permutations);
  const smoothness = new Float64Array(permutations);
  const energy = Array.from({ length: TOGETHER }, () => new Float64Array(vectors.length));
  for (let first = 0; first < permutations; first += TOGETHER) {
    if (watch?.cancelled?.()) throw new CancelledError();
    watch?.progress?.(first / permutations, 'Shuffling scores for comparison');
    const width = Math.min(TOGETHER, permutations - first);
    const signals = Array.from({ length: width }, (_, v) => {
      const signal = Float64Array.from(random.shuffle(current));
      smoothness[first + v] = smoothnessOf(signal);
      return signal;
    });
    vectors.forEach((u, l) => signals.forEach((signal, v) => (energy[v]![l] = dot(u, signal) ** 2 / total)));
    for (let v = 0; v < width; v++)
      cumulative(energy[v]!, steps).forEach((share, s) => (shares[s * permutations + first + v] = share));
  }
  return { shares, smoothness };
}

function bandOf(shares: Float64Array, steps: number, permutations: number): EnergyBand {
  const low = new Float64Array(steps);
  const middle = new Float64Array(steps);
  const high = new Float64Array(steps);
  for (let s = 0; s < steps; s++) {
    const sorted = shares.slice(s * permutations, (s + 1) * permutations).sort();
    low[s] = quantile(sorted, 0.025);
    middle[s] = quantile(sorted, 0.5);
    high[s] = quantile(sorted, 0.975);
  }
  return { low, middle, high };
}

/** Type 7 of Hyndman & Fan 1996, of values in ascending order. */
function quantile(sorted: Float64Array, share: number): number {
  const place = share * (sorted.length - 1);
  const below = Math.floor(place);
  const above = Math.min(sorted.length - 1, below + 1);
  return sorted[below]! + (place - below) * (sorted[above]! - sorted[below]!);
}
