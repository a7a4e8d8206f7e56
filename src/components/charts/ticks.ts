import { scaleLinear } from 'd3-scale';
import { formatNumber } from '@/lib/format';

export interface Tick {
  value: number;
  label: string;
}

/** Round values inside the domain, at most one every `gap` pixels, with as many decimals as their step needs. */
export function ticksFor(
  domain: readonly [number, number],
  width: number,
  gap = 64,
  format?: (value: number) => string,
): Tick[] {
  const scale = scaleLinear().domain([...domain]);
  let wanted = Math.max(2, Math.floor(width / gap));
  let values = scale.ticks(wanted);
  // d3 takes the count as a hint and may give nearly twice as many.
  while (values.length > 3 && values.length > width / gap + 1) values = scale.ticks(--wanted);
  const step = values.length > 1 ? (values[1] ?? 0) - (values[0] ?? 0) : 1;
  const decimals = Math.max(0, Math.min(6, -Math.floor(Math.log10(step) + 1e-9)));
  return values.map((value) => ({
    value,
    label: format
      ? format(value)
      : formatNumber(value, Number.isInteger(value) && decimals === 0 ? 0 : decimals),
  }));
}
