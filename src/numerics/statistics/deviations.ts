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
