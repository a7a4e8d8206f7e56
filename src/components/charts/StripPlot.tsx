import { scaleLinear } from 'd3-scale';
import { formatNumber, MINUS } from '@/lib/format';
import { BottomAxis } from './Axis';
import { ChartFrame, type ChartTable } from './ChartFrame';
import { stackLevels } from './stack';
import { ticksFor } from './ticks';

export interface StripPlotProps {
  /** Whose value it is. */
  name: string;
  value: number;
  /** Any CSS colour for the value's diamond. */
  colour?: string;
  neighbours: readonly { label: string; value: number; colour?: string }[];
  /** What the neighbours predict, and the interval around it. */
  predicted: number;
  interval?: readonly [number, number];
  intervalLabel?: string;
  /** Everyone's values, as a quiet rug. */
  everyone?: readonly number[];
  domain: readonly [number, number];
  format?: (value: number) => string;
  withTable?: boolean;
}

const TOP = 24;
const DOT = 6;

/** One value against the values of its neighbours, with what they predict. */
export function StripPlot(props: StripPlotProps) {
  const {
    name,
    value,
    neighbours,
    predicted,
    interval,
    everyone = [],
    domain,
    format = (v) => formatNumber(v, 2),
    withTable,
  } = props;
  const away = format(Math.abs(value - predicted)).replace(MINUS, '');
  const words = value < predicted ? `${away} below` : `${away} above`;
  const label = `${name} at ${format(value)}; the neighbourhood predicts ${format(predicted)}, so it stands ${words}. ${neighbours.length} neighbours.`;
  const table: ChartTable | undefined = withTable
    ? { head: ['Neighbour', 'Value'], rows: neighbours.map((n) => [n.label, format(n.value)]) }
    : undefined;
  const scaleFor = (width: number) =>
    scaleLinear()
      .domain([...domain])
      .range([26, width - 26])
      .clamp(true);
  const layout = (width: number) => {
    const x = scaleFor(width);
    const places = neighbours.map((n) => x(n.value));
    const levels = stackLevels(places, DOT * 2 + 0.5);
    return { x, levels, base: Math.max(106, TOP + 30 + Math.max(0, ...levels) * 12.5) };
  };
  return (
    <ChartFrame label={label} height={(width) => layout(width).base + 28} table={table}>
      {(width) => {
        const { x, levels: level, base } = layout(width);
        const room = Math.abs(x(value) - x(predicted));
        const line = Math.max(TOP + 44, base - 40);
        const anchor = x(value) < 80 ? 'start' : x(value) > width - 80 ? 'end' : 'middle';
        const middle = interval ? (x(interval[0]) + x(interval[1])) / 2 : x(predicted);
        return (
          <>
            {interval && (
              <>
                <rect
                  x={x(interval[0])}
                  y={TOP}
                  width={Math.max(1, x(interval[1]) - x(interval[0]))}
                  height={base - TOP}
                  rx={4}
                  fill="var(--c-ground)"
                />
                <text
                  x={Math.max(96, Math.min(width - 96, middle))}
                  y={15}
                  textAnchor="middle"
                  style={{ fontWeight: 600 }}
                >
                  {props.intervalLabel ?? 'where 95% of such members fall'}
                </text>
              </>
            )}
            <BottomAxis x={x} y={base} from={26} to={width - 26} ticks={ticksFor(domain, width, 70)} />
            <path
              d={everyone.map((v) => `M${x(v).toFixed(1)} ${base - 8}v6`).join('')}
              stroke="var(--c-ink-3)"
              opacity={0.5}
            />
            <path d={`M${x(predicted)} ${TOP}V${base}`} stroke="var(--c-ink)" strokeWidth={2} />
            <path
              d={`M${x(value)} ${line}H${x(predicted)}`}
              stroke="var(--c-madder)"
              strokeWidth={2}
              strokeDasharray="5 4"
            />
            {neighbours.map((n, i) => (
              <circle
                key={n.label}
                cx={x(n.value)}
                cy={base - 18 - (level[i] ?? 0) * 12.5}
                r={DOT - 0.4}
                fill={n.colour ?? 'var(--c-line-strong)'}
                stroke="var(--c-node-edge)"
              >
                <title>{`${n.label} ${format(n.value)}`}</title>
              </circle>
            ))}
            <rect
              x={x(value) - 8.5}
              y={line - 8.5}
              width={17}
              height={17}
              rx={1.5}
              transform={`rotate(45 ${x(value)} ${line})`}
              fill={props.colour ?? 'var(--c-sheet)'}
              stroke="var(--c-madder)"
              strokeWidth={2.4}
            />
            <text
              x={x(value)}
              y={line - 20}
              textAnchor={anchor}
              style={{ fontWeight: 700, fontSize: 12.5, fill: 'var(--c-ink)' }}
            >
              {`${name} ${format(value)}`}
            </text>
            <text
              x={room > 130 ? (x(value) + x(predicted)) / 2 : x(value)}
              y={room > 130 ? line + 4.5 : line + 26}
              textAnchor={room > 130 ? 'middle' : anchor}
              style={{
                fontWeight: 700,
                fontSize: 13,
                fill: 'var(--c-madder)',
                stroke: 'var(--c-sheet)',
                strokeWidth: 9,
                paintOrder: 'stroke',
              }}
            >
              {words}
            </text>
          </>
        );
      }}
    </ChartFrame>
  );
}
