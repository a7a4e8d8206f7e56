import type { Tick } from './ticks';

/** A horizontal axis in an SVG: line, short ticks, words under them. */
export function BottomAxis({
  x,
  y,
  ticks,
  from,
  to,
}: {
  x: (value: number) => number;
  y: number;
  ticks: readonly Tick[];
  from: number;
  to: number;
}) {
  return (
    <g aria-hidden="true">
      <path d={`M${from} ${y}H${to}`} stroke="var(--c-line-strong)" />
      {ticks.map(({ value, label }) => (
        <g key={value}>
          <path d={`M${x(value)} ${y}v5`} stroke="var(--c-line-strong)" />
          <text x={x(value)} y={y + 19} textAnchor="middle">
            {label}
          </text>
        </g>
      ))}
    </g>
  );
}

/** Horizontal lines across a chart with their words at the left. */
export function LeftAxis({
  y,
  ticks,
  from,
  to,
}: {
  y: (value: number) => number;
  ticks: readonly Tick[];
  from: number;
  to: number;
}) {
  return (
    <g aria-hidden="true">
      {ticks.map(({ value, label }) => (
        <g key={value}>
          <path d={`M${from} ${y(value)}H${to}`} stroke="var(--c-line)" />
          <text x={from - 8} y={y(value) + 4} textAnchor="end">
            {label}
          </text>
        </g>
      ))}
    </g>
  );
}

/** Words under a strip whose width is given in percent (HTML, so they never scale). */
export function StripAxis({ domain, ticks }: { domain: readonly [number, number]; ticks: readonly Tick[] }) {
  const [low, high] = domain;
  return (
    <div className="axis" aria-hidden="true">
      {ticks.map(({ value, label }) => {
        const place = ((value - low) / (high - low)) * 100;
        return (
          <span
            key={value}
            className={place < 1.5 ? 'at-start' : place > 98.5 ? 'at-end' : undefined}
            style={{ left: `${place}%` }}
          >
            {label}
          </span>
        );
      })}
    </div>
  );
}
