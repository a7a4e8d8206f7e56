import { divergingStep, rampColour, sequentialStep, type RampKind } from '@/lib/ramps';

export interface Bin {
  x0: number;
  x1: number;
  count: number;
  /** Any CSS colour; muted when left out. */
  colour?: string;
  /** Stacked from below; their counts add up to `count`. */
  parts?: readonly { key: string; count: number; colour: string }[];
}

/** Equal-width bins over `domain`; values outside it go to the end bins, NaN and infinities are counted as missing. */
export function binValues(
  values: ArrayLike<number>,
  bins: number,
  domain: readonly [number, number],
): { bins: Bin[]; missing: number } {
  const [low, high] = domain;
  const width = (high - low) / bins;
  const made: Bin[] = Array.from({ length: bins }, (_, i) => ({
    x0: low + i * width,
    x1: low + (i + 1) * width,
    count: 0,
  }));
  let missing = 0;
  for (const value of Array.from(values)) {
    if (!Number.isFinite(value)) {
      missing++;
      continue;
    }
    const bin = made[Math.max(0, Math.min(bins - 1, Math.floor((value - low) / width)))];
    if (bin) bin.count++;
  }
  return { bins: made, missing };
}

/** Colours bins by the ramp of the picture they belong to: `diverging` around `centre`, or `sequential` over their range. */
export function colourBins(
  bins: readonly Bin[],
  kind: RampKind,
  scale: { centre: number; spread: number } | { low: number; high: number },
): Bin[] {
  return bins.map((bin) => {
    const middle = (bin.x0 + bin.x1) / 2;
    const step =
      'centre' in scale
        ? divergingStep(middle, scale.centre, scale.spread)
        : sequentialStep(middle, scale.low, scale.high);
    return { ...bin, colour: rampColour(kind, step) };
  });
}

/** A range of bins as edge numbers: bins `[from, to)`. */
export type EdgeRange = readonly [from: number, to: number];

/** All edges, low to high: one more than there are bins. */
export function edgesOf(bins: readonly Bin[]): number[] {
  const first = bins[0];
  return first ? [first.x0, ...bins.map((bin) => bin.x1)] : [];
}

/** Number of the edge nearest to a value. */
export function nearestEdge(edges: readonly number[], value: number): number {
  let best = 0;
  edges.forEach((edge, i) => {
    if (Math.abs(edge - value) < Math.abs((edges[best] ?? 0) - value)) best = i;
  });
  return best;
}

/** Moves one end by some bins; at least one bin stays inside, and nothing leaves the strip. */
export function moveEdge([from, to]: EdgeRange, end: 'low' | 'high', by: number, bins: number): EdgeRange {
  return end === 'low'
    ? [Math.max(0, Math.min(to - 1, from + by)), to]
    : [from, Math.min(bins, Math.max(from + 1, to + by))];
}

/** Moves the whole range by some bins, keeping its width. */
export function shiftRange([from, to]: EdgeRange, by: number, bins: number): EdgeRange {
  const step = Math.max(-from, Math.min(bins - to, by));
  return [from + step, to + step];
}
