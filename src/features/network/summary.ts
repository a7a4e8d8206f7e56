const BINS = 40;
const QUANTILES = [0.05, 0.25, 0.5, 0.75, 0.95] as const;

export interface NumberSummary {
  readonly min: number;
  readonly max: number;
  readonly mean: number;
  readonly sd: number;
  /** Values below which 5, 25, 50, 75 and 95 % lie. */
  readonly quantiles: readonly number[];
  readonly histogram: { readonly low: number; readonly high: number; readonly counts: readonly number[] };
}

export interface LabelSummary {
  /** Most frequent labels first, at most a hundred. */
  readonly labels: readonly { readonly label: string; readonly count: number }[];
  readonly distinct: number;
}

/** What tables and the front page say of an attribute without reading its values again. */
export function summarise(
  type: 'number' | 'label',
  values: Float64Array,
  labels: readonly (string | null)[] | null,
): Record<string, unknown> {
  return { ...(type === 'number' ? numbers(values) : texts(labels ?? [])) };
}

function numbers(values: Float64Array): NumberSummary | Record<string, never> {
  const sorted = values.filter((value) => !Number.isNaN(value)).sort();
  if (sorted.length === 0) return {};
  const min = sorted[0]!;
  const max = sorted.at(-1)!;
  const mean = sorted.reduce((sum, value) => sum + value, 0) / sorted.length;
  const squares = sorted.reduce((sum, value) => sum + (value - mean) ** 2, 0);
  const counts = new Array<number>(BINS).fill(0);
  const width = (max - min) / BINS || 1;
  for (const value of sorted) counts[Math.min(BINS - 1, Math.floor((value - min) / width))]!++;
  return {
    min,
    max,
    mean,
    sd: sorted.length > 1 ? Math.sqrt(squares / (sorted.length - 1)) : 0,
    quantiles: QUANTILES.map((share) => sorted[Math.round(share * (sorted.length - 1))]!),
    histogram: { low: min, high: max, counts },
  };
}

function texts(labels: readonly (string | null)[]): LabelSummary {
  const counts = new Map<string, number>();
  for (const label of labels) if (label !== null) counts.set(label, (counts.get(label) ?? 0) + 1);
  const sorted = [...counts.entries()].sort(([a, x], [b, y]) => y - x || (a < b ? -1 : 1));
  return { labels: sorted.slice(0, 100).map(([label, count]) => ({ label, count })), distinct: counts.size };
}
