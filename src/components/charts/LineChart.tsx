import { extent } from 'd3-array';
import { scaleLinear, scalePoint } from 'd3-scale';
import { area, line } from 'd3-shape';
import { formatNumber } from '@/lib/format';
import { LeftAxis } from './Axis';
import { ChartFrame } from './ChartFrame';
import { ticksFor } from './ticks';

export interface LinePoint {
  label: string;
  value: number | null;
  /** What neighbours predict, and the band around it. */
  predicted?: number | null;
  low?: number | null;
  high?: number | null;
}

export interface LineChartProps {
  label: string;
  points: readonly LinePoint[];
  /** Values shown; from the data when left out. */
  domain?: readonly [number, number];
  height?: number;
  format?: (value: number) => string;
  withTable?: boolean;
}

const known = (value: number | null | undefined): value is number => value != null && Number.isFinite(value);

/** A few points over time, with what was predicted and its band. A missing value leaves a gap. */
export function LineChart({
  label,
  points,
  domain,
  height = 188,
  format = (v) => formatNumber(v),
  withTable = true,
}: LineChartProps) {
  const all = points.flatMap((p) => [p.value, p.predicted, p.low, p.high]).filter(known);
  const [least = 0, most = 1] = extent(all);
  const range = domain ?? (least === most ? [least - 1, most + 1] : [least, most]);
  const banded = points.some((p) => known(p.low) && known(p.high));
  const table = withTable
    ? {
        head: ['When', 'Value', ...(points.some((p) => known(p.predicted)) ? ['Predicted'] : [])],
        rows: points.map((p) => [
          p.label,
          known(p.value) ? format(p.value) : '–',
          ...(known(p.predicted) ? [format(p.predicted)] : []),
        ]),
      }
    : undefined;
  return (
    <ChartFrame label={label} height={height} table={table} fallbackWidth={300}>
      {(width) => {
        const y = scaleLinear()
          .domain([...range])
          .nice(4)
          .range([height - 38, 18]);
        const ticks = ticksFor(y.domain() as [number, number], height - 56, 36, format);
        const left = 14 + Math.max(...ticks.map((t) => t.label.length)) * 6.4;
        const x = scalePoint<number>()
          .domain(points.map((_, i) => i))
          .range([left, width - 14])
          .padding(points.length > 1 ? 0.35 : 0.5);
        const at = (i: number) => x(i) ?? left;
        const every = Math.ceil((points.length * 52) / Math.max(1, width - left));
        const band = area<LinePoint>()
          .defined((p) => known(p.low) && known(p.high))
          .x((_, i) => at(i))
          .y0((p) => y(p.low ?? 0))
          .y1((p) => y(p.high ?? 0));
        const path = (key: 'value' | 'predicted') =>
          line<LinePoint>()
            .defined((p) => known(p[key]))
            .x((_, i) => at(i))
            .y((p) => y(p[key] ?? 0))([...points]) ?? '';
        return (
          <>
            <LeftAxis y={y} ticks={ticks} from={left} to={width} />
            {banded && <path d={band([...points]) ?? ''} fill="var(--c-sunk)" />}
            <path d={path('predicted')} fill="none" stroke="var(--c-ink-2)" strokeWidth={1.5} />
            <path d={path('value')} fill="none" stroke="var(--c-madder)" strokeWidth={2.2} />
            {points.map((p, i) => (
              <g key={i}>
                {known(p.value) && (
                  <circle
                    cx={at(i)}
                    cy={y(p.value)}
                    r={4}
                    fill="var(--c-madder)"
                    stroke="var(--c-sheet)"
                    strokeWidth={1.5}
                  >
                    <title>{`${p.label}: ${format(p.value)}`}</title>
                  </circle>
                )}
                {(points.length - 1 - i) % every === 0 && (
                  <text x={at(i)} y={height - 8} textAnchor="middle">
                    {p.label}
                  </text>
                )}
              </g>
            ))}
          </>
        );
      }}
    </ChartFrame>
  );
}
