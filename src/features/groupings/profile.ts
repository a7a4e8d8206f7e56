import type { Group } from './groupings';

/**
 * How each group scores against all members with a score, in standard deviations of all, with the standard error
 * of the group's mean. Groups with fewer than two scores, and attributes that do not vary, are left out.
 * @param values by member, NaN where missing
 */
export function profiles(
  labels: Int32Array,
  count: number,
  attributes: readonly { name: string; values: Float64Array }[],
): Group['profile'][] {
  const result: Group['profile'][] = Array.from({ length: count }, () => []);
  for (const { name, values } of attributes) {
    let n = 0;
    let mean = 0;
    let spread = 0;
    for (const value of values) {
      if (Number.isNaN(value)) continue;
      n += 1;
      const step = value - mean;
      mean += step / n;
      spread += step * (value - mean);
    }
    const deviation = n > 1 ? Math.sqrt(spread / (n - 1)) : 0;
    if (!(deviation > 0)) continue;
    const sums = new Float64Array(count);
    const squares = new Float64Array(count);
    const scored = new Int32Array(count);
    values.forEach((value, member) => {
      const group = labels[member]!;
      if (group < 0 || Number.isNaN(value)) return;
      // Centred and scaled first, so that squares lose nothing.
      const standard = (value - mean) / deviation;
      sums[group]! += standard;
      squares[group]! += standard * standard;
      scored[group]! += 1;
    });
    for (let group = 0; group < count; group++) {
      const m = scored[group]!;
      if (m < 2) continue;
      const difference = sums[group]! / m;
      const variance = Math.max(0, (squares[group]! - m * difference * difference) / (m - 1));
      result[group]!.push({ attribute: name, difference, error: Math.sqrt(variance / m), count: m });
    }
  }
  return result;
}
