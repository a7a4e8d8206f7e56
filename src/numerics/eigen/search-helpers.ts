import type { Pairs } from './rayleigh-ritz';

/** The `count` smallest of two sets of pairs. */
export function best(pairs: Pairs, more: Pairs, count: number): Pairs {
  const all = [...pairs.values.keys()].map((i) => ({
    value: pairs.values[i]!,
    vector: pairs.vectors[i]!,
    residual: pairs.residuals[i]!,
  }));
  more.values.forEach((value, i) =>
    all.push({ value, vector: more.vectors[i]!, residual: more.residuals[i]! }),
  );
  all.sort((x, y) => x.value - y.value);
  all.length = Math.min(count, all.length);
  return {
    values: all.map((p) => p.value),
    vectors: all.map((p) => p.vector),
    residuals: all.map((p) => p.residual),
  };
}

/** Share of the way from a residual of ‖A‖ down to the bar, on a logarithmic scale. */
export function share(estimates: readonly number[], bar: number, size: number): number {
  const worst = Math.min(size, Math.max(...estimates));
  return worst <= bar ? 1 : Math.max(0, Math.log(size / worst) / Math.log(size / bar));
}
