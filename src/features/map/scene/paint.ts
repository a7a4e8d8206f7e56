import { binValues, colourBins, type Bin } from '@/components/charts/bins';
import { divergingStep, readRamp, readToken, sequentialStep, type RampKind, type Rgb } from '@/lib/ramps';
import { groupColour, groupLetter } from '@/lib/groups';
import type { ViewState } from '@/features/views';

/** How values become colours; the same for the picture and for the strip under it. */
export interface Scale {
  readonly kind: RampKind | 'group' | 'plain';
  readonly low: number;
  readonly high: number;
  readonly centre: number;
  readonly spread: number;
}

const hex = ([red, green, blue]: Rgb): string =>
  `#${[red, green, blue].map((part) => Math.round(part).toString(16).padStart(2, '0')).join('')}`;

/** Value below which a share of the sorted finite values lies. */
const quantile = (sorted: Float64Array, share: number): number =>
  sorted[Math.min(sorted.length - 1, Math.max(0, Math.round(share * (sorted.length - 1))))] ?? NaN;

/**
 * Departures diverge around zero, scores around their mean, both out to the middle 95 % of values;
 * wild values take the end colours instead of washing out the rest.
 */
export function scaleOf(by: ViewState['colour']['by'], values: Float64Array | null): Scale {
  const finite = values ? values.filter(Number.isFinite).sort() : new Float64Array();
  const low = finite[0] ?? 0;
  const high = finite.at(-1) ?? 1;
  if (by === 'plain' || by === 'group' || finite.length === 0)
    return { kind: by === 'group' ? 'group' : 'plain', low, high, centre: 0, spread: 1 };
  const centre = by === 'departure' ? 0 : finite.reduce((sum, value) => sum + value, 0) / finite.length;
  const spread = Math.max(centre - quantile(finite, 0.025), quantile(finite, 0.975) - centre) || 1;
  return { kind: 'diverging', low, high, centre, spread };
}

/** One colour a member, read from the tokens of the present theme. Members without a value are hollow. */
export function coloursOf(
  style: CSSStyleDeclaration,
  scale: Scale,
  values: Float64Array | null,
  n: number,
): string[] {
  const plain = hex(readToken(style, '--c-line-strong'));
  const hollow = hex(readToken(style, '--c-sheet'));
  if (!values || scale.kind === 'plain') return new Array<string>(n).fill(plain);
  const steps = scale.kind === 'group' ? [] : readRamp(style, scale.kind).map(hex);
  const groups = new Map<number, string>();
  const ofGroup = (index: number): string => {
    let colour = groups.get(index);
    if (!colour) {
      colour = hex(readToken(style, groupColour(groupLetter(index))!.fill));
      groups.set(index, colour);
    }
    return colour;
  };
  return Array.from(values, (value) => {
    if (!Number.isFinite(value)) return hollow;
    if (scale.kind === 'group') return ofGroup(value);
    const step =
      scale.kind === 'diverging'
        ? divergingStep(value, scale.centre, scale.spread)
        : sequentialStep(value, scale.low, scale.high);
    return steps[step - 1]!;
  });
}

const BINS = 56;

/** Bars of the strip under the map, in the map's own colours; with groups, stacked by group. */
export function binsOf(
  scale: Scale,
  values: Float64Array,
  groups: Float64Array | null,
): { bins: Bin[]; missing: number } {
  const domain: [number, number] =
    scale.high > scale.low ? [scale.low, scale.high] : [scale.low - 0.5, scale.low + 0.5];
  const { bins, missing } = binValues(values, BINS, domain);
  if (!groups)
    return { bins: scale.kind === 'diverging' ? colourBins(bins, 'diverging', scale) : bins, missing };
  const width = (domain[1] - domain[0]) / BINS;
  const counts = bins.map(() => new Map<number, number>());
  values.forEach((value, i) => {
    const group = groups[i]!;
    if (!Number.isFinite(value) || !Number.isFinite(group)) return;
    const bin = counts[Math.max(0, Math.min(BINS - 1, Math.floor((value - domain[0]) / width)))]!;
    bin.set(group, (bin.get(group) ?? 0) + 1);
  });
  return {
    missing,
    bins: bins.map((bin, i) => ({
      ...bin,
      parts: [...counts[i]!.entries()]
        .sort(([a], [b]) => a - b)
        .map(([group, count]) => ({
          key: groupLetter(group),
          count,
          colour: `var(${groupColour(groupLetter(group))!.fill})`,
        })),
    })),
  };
}
