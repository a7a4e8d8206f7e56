import { UnanswerableError } from '../types';

/**
 * Deviations from the mean, over their largest magnitude, so that squares of very large or small values neither
 * overflow nor vanish. For statistics that do not change with the unit of the attribute.
 * @param values length n, all finite
 * @returns z of length n with max |z| = 1 and Σz = 0 to rounding, without unit
 * @throws UnanswerableError `missing-values` when a value is not finite; `constant-attribute` when all are equal
 */
export function scaledDeviations(values: Float64Array): Float64Array {
  let scale = 0;
  for (const value of values) {
    if (!Number.isFinite(value))
      throw new UnanswerableError(
        'missing-values',
        'Some members have no value of this attribute; fill them in or leave those members out first.',
      );
    scale = Math.max(scale, Math.abs(value));
  }
  // Divided before adding up: the sum of values near the largest double would overflow.
  const z = values.map((value) => (scale > 0 ? value / scale : 0));
  const mean = z.reduce((sum, value) => sum + value, 0) / z.length;
  let most = 0;
  for (let i = 0; i < z.length; i++) {
    z[i]! -= mean;
    most = Math.max(most, Math.abs(z[i]!));
  }
  // Beyond this nothing is left of the differences but rounding.
  if (!(most > 1e-12))
    throw new UnanswerableError(
      'constant-attribute',
      'All observed values are equal, so nothing can be shared or stand apart.',
    );
  return z.map((value) => value / most);
}

/** Beyond these magnitudes squares leave the range of doubles. */
const LARGEST = 1e100;
const SMALLEST = 1e-100;

/**
 * Refuses values that no statistic of squares can be made of, in words.
 * @param values any length, NaN where missing
 * @throws UnanswerableError `bad-values` on an infinite value, one beyond ±1e100, or a range below 1e-100 that is not 0
 */
export function checkValues(values: Float64Array): void {
  let least = Infinity;
  let most = -Infinity;
  for (const value of values) {
    if (Number.isNaN(value)) continue;
    if (Math.abs(value) === Infinity)
      throw new UnanswerableError('bad-values', 'A value of this attribute is infinite.');
    if (Math.abs(value) > LARGEST)
      throw new UnanswerableError(
        'bad-values',
        'The values of this attribute go beyond 1e100, too far to compute with; use a larger unit.',
      );
    least = Math.min(least, value);
    most = Math.max(most, value);
  }
  if (most > least && most - least < SMALLEST)
    throw new UnanswerableError(
      'bad-values',
      'The values of this attribute differ by less than 1e-100, too little to compute with; use a smaller unit.',
    );
}
