import { scaleBand, scaleLinear } from 'd3-scale';
import { formatNumber } from '@/lib/format';
import { ChartFrame } from './ChartFrame';

export interface Column {
  key: string;
  label: string;
  value: number;
  /** Drawn in madder: the one in force. */
  current?: boolean;
}

export interface ColumnChartProps {
  label: string;
  columns: readonly Column[];
  height?: number;
  format?: (value: number) => string;
  withTable?: boolean;
}

/** A few columns with a word under each, such as the strength of each possible cut. */
export function ColumnChart({
  label,
  columns,
  height = 92,
  format = (v) => formatNumber(v),
  withTable = false,
}: ColumnChartProps) {
  const y = scaleLinear()
    .domain([0, Math.max(1e-12, ...columns.map((c) => c.value))])
    .range([0, height - 30]);
  const table = withTable
    ? { head: ['', 'Value'], rows: columns.map((c) => [c.label, format(c.value)]) }
    : undefined;
  return (
    <ChartFrame label={label} height={height} table={table}>
      {(width) => {
        const x = scaleBand<string>()
          .domain(columns.map((c) => c.key))
          .range([0, width])
          .padding(0.5);
        const wide = Math.min(30, x.bandwidth());
        return (
          <>
            {columns.map((column) => {
              const middle = (x(column.key) ?? 0) + x.bandwidth() / 2;
              return (
                <g key={column.key}>
                  <rect
                    x={middle - wide / 2}
                    y={height - 22 - y(column.value)}
                    width={wide}
                    height={y(column.value)}
                    rx={2}
                    fill={column.current ? 'var(--c-madder)' : 'var(--c-line-strong)'}
                  >
                    <title>{`${column.label}: ${format(column.value)}`}</title>
                  </rect>
                  <text
                    x={middle}
                    y={height - 6}
                    textAnchor="middle"
                    style={column.current ? { fontWeight: 700, fill: 'var(--c-madder)' } : undefined}
                  >
                    {column.label}
                  </text>
                </g>
              );
            })}
            <path d={`M0 ${height - 21.5}H${width}`} stroke="var(--c-line-strong)" />
          </>
        );
      }}
    </ChartFrame>
  );
}
