import { extent } from 'd3-array';
import { scaleLinear } from 'd3-scale';
import { line } from 'd3-shape';
import type { Bin } from './bins';

/** A few values as one small line with a dot at the end. `label` says what it shows; empty when words stand beside it. */
export function Sparkline({
  values,
  label,
  pressing = false,
  width = 88,
  height = 28,
}: {
  values: readonly (number | null)[];
  label?: string;
  pressing?: boolean;
  width?: number;
  height?: number;
}) {
  const known = values.filter((v): v is number => v !== null && Number.isFinite(v));
  const [low = 0, high = 1] = extent(known);
  const x = scaleLinear()
    .domain([0, Math.max(1, values.length - 1)])
    .range([2, width - 6]);
  const y = scaleLinear()
    .domain(low === high ? [low - 1, high + 1] : [low, high])
    .range([height - 5, 5]);
  const path = line<number | null>()
    .defined((v) => v !== null && Number.isFinite(v))
    .x((_, i) => x(i))
    .y((v) => y(v ?? 0))([...values]);
  const last = values.reduce<number>((found, v, i) => (v !== null && Number.isFinite(v) ? i : found), -1);
  const colour = pressing ? 'var(--c-madder)' : 'var(--c-ink)';
  return (
    <svg
      width={width}
      height={height}
      viewBox={`0 0 ${width} ${height}`}
      role={label ? 'img' : undefined}
      aria-label={label}
      aria-hidden={label ? undefined : true}
    >
      {path && <path d={path} fill="none" stroke={colour} strokeWidth={1.7} strokeLinejoin="round" />}
      {last >= 0 && <circle cx={x(last)} cy={y(values[last] ?? 0)} r={3} fill={colour} />}
    </svg>
  );
}

/** A small distribution without words, for a row of a list. */
export function MiniHistogram({
  bins,
  label,
  height = 30,
}: {
  bins: readonly Bin[];
  label?: string;
  height?: number;
}) {
  const tallest = Math.max(1, ...bins.map((bin) => bin.count));
  return (
    <svg
      viewBox={`0 0 ${Math.max(1, bins.length) * 10} ${height}`}
      preserveAspectRatio="none"
      width="100%"
      height={height}
      role={label ? 'img' : undefined}
      aria-label={label}
      aria-hidden={label ? undefined : true}
    >
      {bins.map((bin, i) => {
        const tall = bin.count > 0 ? Math.max(1, (bin.count / tallest) * (height - 2)) : 0;
        return (
          <rect
            key={bin.x0}
            x={i * 10 + 0.6}
            y={height - tall}
            width={8.8}
            height={tall}
            fill={bin.colour ?? 'var(--c-line-strong)'}
            stroke="var(--c-node-edge)"
            strokeWidth={0.5}
            vectorEffect="non-scaling-stroke"
          />
        );
      })}
      <path
        d={`M0 ${height}H${bins.length * 10}`}
        stroke="var(--c-line-strong)"
        vectorEffect="non-scaling-stroke"
      />
    </svg>
  );
}
