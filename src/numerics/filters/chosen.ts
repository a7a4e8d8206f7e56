import { spectrum } from '../eigen';
import { laplacianOperator } from '../operators';
import { UnanswerableError, type LaplacianKind, type Network, type Watch } from '../types';

export type ChosenFilter =
  | { readonly kind: 'heat'; readonly tau: number }
  | { readonly kind: 'low-pass' | 'high-pass'; readonly cutoff: number }
  | { readonly kind: 'low-pass' | 'high-pass'; readonly keep: number }
  | { readonly kind: 'band-pass'; readonly from: number; readonly to: number };

export interface Filtered {
  readonly values: Float64Array;
  /** Diagonal of the filter; NaN where only an approximation of the whole was computed. */
  readonly diagonal: Float64Array;
  readonly residual: number;
  readonly notes: readonly string[];
}

const EXACT_UP_TO = 2_000;

/** Response of a filter at a graph frequency; `rank` is its place in the ascending order. */
function response(filter: ChosenFilter, value: number, rank: number): number {
  if (filter.kind === 'heat') return Math.exp(-filter.tau * value);
  if (filter.kind === 'band-pass') return value >= filter.from && value <= filter.to ? 1 : 0;
  const low = 'keep' in filter ? rank < filter.keep : value <= filter.cutoff;
  return (filter.kind === 'low-pass') === low ? 1 : 0;
}

/**
 * Filters a full signal in the graph Fourier domain (Shuman, Narang, Frossard, Ortega & Vandergheynst 2013):
 * exactly from the eigenbasis up to 2,000 members, by Chebyshev polynomials above (Hammond, Vandergheynst &
 * Gribonval 2011; Jackson damping for the ideal filters).
 * @param signal length n, finite, any unit
 * @throws UnanswerableError `missing-values`; `bad-filter` on settings out of range; `too-many-frequencies` and
 *   `filter-too-long` where a large network cannot be filtered so
 */
export function applyFilter(
  net: Network,
  laplacian: LaplacianKind,
  filter: ChosenFilter,
  signal: Float64Array,
  watch?: Watch,
): Filtered {
  checkFilter(filter);
  if (signal.length !== net.n || !signal.every(Number.isFinite))
    throw new UnanswerableError('missing-values', 'A filter needs a finite value of every member.');
  if (net.n <= EXACT_UP_TO) return exactly(net, laplacian, filter, signal, watch);
  if ('keep' in filter) return byLeading(net, laplacian, filter, signal, watch);
  return chebyshev(net, laplacian, filter, signal, watch);
}

/** @throws UnanswerableError `bad-filter` in words */
export function checkFilter(filter: ChosenFilter): void {
  const refuse = (message: string): never => {
    throw new UnanswerableError('bad-filter', message);
  };
  const isAmount = (one: number): boolean => one >= 0 && Number.isFinite(one);
  if (filter.kind === 'heat') {
    if (!isAmount(filter.tau)) refuse('The heat time must be 0 or a positive number.');
  } else if (filter.kind === 'band-pass') {
    if (!isAmount(filter.from) || !isAmount(filter.to) || filter.to < filter.from)
      refuse('A band of frequencies runs from one number of 0 or more to one that is not below it.');
  } else if ('keep' in filter) {
    if (!Number.isInteger(filter.keep) || filter.keep < 1)
      refuse('The number of frequencies to keep must be a whole number of 1 or more.');
  } else if (!isAmount(filter.cutoff)) refuse('The cut-off must be 0 or a positive number.');
}

/** By the whole eigenbasis; `applyFilter` up to 2,000 members. */
export function exactly(
  net: Network,
  laplacian: LaplacianKind,
  filter: ChosenFilter,
  signal: Float64Array,
  watch?: Watch,
): Filtered {
  const { values, vectors, residuals } = spectrum(net, { laplacian, count: 'all' }, watch);
  const out = new Float64Array(net.n);
  const diagonal = new Float64Array(net.n);
  values.forEach((value, l) => {
    const g = response(filter, value, l);
    if (g === 0) return;
    const u = vectors[l]!;
    let coordinate = 0;
    for (let i = 0; i < net.n; i++) coordinate += u[i]! * signal[i]!;
    for (let i = 0; i < net.n; i++) {
      out[i]! += g * coordinate * u[i]!;
      diagonal[i]! += g * u[i]! * u[i]!;
    }
  });
  return {
    values: out,
    diagonal,
    residual: residuals.reduce((most, one) => Math.max(most, one), 0),
    notes: [],
  };
}

const MOST_LEADING = 64;

function byLeading(
  net: Network,
  laplacian: LaplacianKind,
  filter: Extract<ChosenFilter, { keep: number }>,
  signal: Float64Array,
  watch?: Watch,
): Filtered {
  if (filter.keep > MOST_LEADING)
    throw new UnanswerableError(
      'too-many-frequencies',
      `On a network of more than ${EXACT_UP_TO.toLocaleString('en-GB')} members at most ${MOST_LEADING} frequencies can be kept by number; give a cut-off instead.`,
    );
  const { vectors, residuals } = spectrum(
    net,
    { laplacian, count: filter.keep, tolerance: 1e-6, seed: 1 },
    watch,
  );
  const low = new Float64Array(net.n);
  const diagonal = new Float64Array(net.n);
  for (const u of vectors) {
    let coordinate = 0;
    for (let i = 0; i < net.n; i++) coordinate += u[i]! * signal[i]!;
    for (let i = 0; i < net.n; i++) {
      low[i]! += coordinate * u[i]!;
      diagonal[i]! += u[i]! * u[i]!;
    }
  }
  const high = filter.kind === 'high-pass';
  return {
    values: high ? signal.map((one, i) => one - low[i]!) : low,
    diagonal: high ? diagonal.map((one) => 1 - one) : diagonal,
    residual: residuals.reduce((most, one) => Math.max(most, one), 0),
    notes: [],
  };
}

const MOST_ORDER = 4_000;

/** By Chebyshev polynomials; `applyFilter` above 2,000 members. */
export function chebyshev(
  net: Network,
  laplacian: LaplacianKind,
  filter: ChosenFilter,
  signal: Float64Array,
  watch?: Watch,
): Filtered {
  const l = laplacianOperator(net, laplacian);
  if (l.norm === 0) {
    // Without ties every frequency is 0.
    const g = response(filter, 0, 0);
    return {
      values: signal.map((one) => g * one),
      diagonal: new Float64Array(net.n).fill(g),
      residual: 0,
      notes: [],
    };
  }
  const half = l.norm / 2;
  const ideal = filter.kind !== 'heat';
  const order = ideal
    ? 300
    : Math.ceil(12 + 6 * Math.sqrt(filter.tau * l.norm) + 0.5 * Math.min(filter.tau * l.norm, 60));
  if (order > MOST_ORDER)
    throw new UnanswerableError(
      'filter-too-long',
      'This heat time is too long for this Laplacian on so uneven a network; choose the normalised Laplacian or a shorter time.',
    );
  const coefficients = chebyshevCoefficients((x) => response(filter, half * (x + 1), Infinity), order, ideal);
  const n = net.n;
  // T₀ x, T₁ x, … of (L − half)/half, the three-term recurrence.
  const before = Float64Array.from(signal);
  const now = new Float64Array(n);
  const next = new Float64Array(n);
  const shifted = (from: Float64Array, to: Float64Array): void => {
    l.multiply(from, to);
    for (let i = 0; i < n; i++) to[i] = to[i]! / half - from[i]!;
  };
  shifted(before, now);
  const out = before.map((one, i) => 0.5 * coefficients[0]! * one + coefficients[1]! * now[i]!);
  for (let k = 2; k <= order; k++) {
    if (k % 16 === 0) watch?.progress?.(k / order, 'Filtering');
    shifted(now, next);
    for (let i = 0; i < n; i++) {
      const value = 2 * next[i]! - before[i]!;
      before[i] = now[i]!;
      now[i] = value;
      out[i]! += coefficients[k]! * value;
    }
  }
  const notes = ideal
    ? [
        'On a network of this size the sharp edge of the filter is approximated; frequencies close to it are kept in part.',
      ]
    : [];
  return { values: out, diagonal: new Float64Array(n).fill(NaN), residual: 0, notes };
}

/** Coefficients of a function on [−1, 1] by the cosine rule, damped by Jackson's kernel where it jumps. */
function chebyshevCoefficients(of: (x: number) => number, order: number, damped: boolean): Float64Array {
  const points = 2 * (order + 1);
  const values = Float64Array.from({ length: points }, (_, j) =>
    of(Math.cos((Math.PI * (j + 0.5)) / points)),
  );
  return Float64Array.from({ length: order + 1 }, (_, k) => {
    let sum = 0;
    for (let j = 0; j < points; j++) sum += values[j]! * Math.cos((Math.PI * k * (j + 0.5)) / points);
    const c = (2 * sum) / points;
    if (!damped) return c;
    const a = Math.PI / (order + 2);
    return (
      c *
      (((order + 2 - k) * Math.sin(a) * Math.cos(k * a) + Math.cos(a) * Math.sin(k * a)) /
        ((order + 2) * Math.sin(a)))
    );
  });
}
