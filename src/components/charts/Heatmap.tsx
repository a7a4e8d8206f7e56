import type { ReactNode } from 'react';
import { formatNumber } from '@/lib/format';
import { rampColour, rampInk, sequentialStep, type RampKind } from '@/lib/ramps';

export interface HeatmapEntry {
  key: string;
  /** Name for assistive technology and titles. */
  name: string;
  /** What stands at the head of the row and column (a Tag, a word). */
  head: ReactNode;
}

export interface HeatmapProps {
  /** What the figures are, e.g. "Ties between groups, per 1,000 possible pairs". */
  label: string;
  rows: readonly HeatmapEntry[];
  columns?: readonly HeatmapEntry[];
  /** values[row][column]; null or 0 draws a dot. */
  values: readonly (readonly (number | null)[])[];
  format?: (value: number) => string;
  /** Step 1…7 of a value; log-spaced over the values when left out. */
  step?: (value: number) => number;
  /** Cells with a stitched edge (the loosest seam), as [row, column]. */
  stitched?: readonly (readonly [number, number])[];
  /** Outline the diagonal. Default: when rows and columns are the same. */
  diagonal?: boolean;
}

/** A table of figures on the sequential ramp. It is a real table, so it needs no other form. */
export function Heatmap(props: HeatmapProps) {
  const {
    label,
    rows,
    columns = rows,
    values,
    format = (v) => formatNumber(v, v < 10 ? 1 : 0),
    stitched = [],
    diagonal = columns === rows,
  } = props;
  const positive = values.flat().filter((v): v is number => v !== null && v > 0);
  const low = Math.log(Math.min(...positive, 1e300));
  const high = Math.log(Math.max(...positive, 1e-300));
  const step = props.step ?? ((value: number) => sequentialStep(Math.log(value), low, high));
  return (
    <table className="hm">
      <caption className="vh">{label}</caption>
      <thead>
        <tr>
          <td />
          {columns.map((column) => (
            <th key={column.key} scope="col" title={column.name}>
              {column.head}
            </th>
          ))}
        </tr>
      </thead>
      <tbody>
        {rows.map((row, i) => (
          <tr key={row.key}>
            <th scope="row" title={row.name}>
              {row.head}
            </th>
            {columns.map((column, j) => {
              const value = values[i]?.[j] ?? null;
              const bare = value === null || value <= 0;
              const at = bare ? 0 : step(value);
              const marked = stitched.some(([r, c]) => r === i && c === j);
              return (
                <td
                  key={column.key}
                  title={`${row.name} to ${column.name}`}
                  className={marked ? 'hi' : diagonal && i === j ? 'diag' : undefined}
                  style={
                    bare
                      ? { background: 'var(--c-ground)', color: 'var(--c-ink-3)' }
                      : { background: rampColour('sequential', at), color: rampInk(at) }
                  }
                >
                  {bare ? (value === null ? '–' : '·') : format(value)}
                </td>
              );
            })}
          </tr>
        ))}
      </tbody>
    </table>
  );
}

/** The ramp with its words: "Few … Many", or the values at its ends and centre. */
export function RampLegend({
  kind,
  low,
  middle,
  high,
}: {
  kind: RampKind;
  low: ReactNode;
  middle?: ReactNode;
  high: ReactNode;
}) {
  const steps = Array.from({ length: kind === 'diverging' ? 9 : 7 }, (_, i) => i + 1);
  return (
    <div>
      <div className="rampstrip" aria-hidden="true">
        {steps.map((s) => (
          <i key={s} style={{ background: rampColour(kind, s) }} />
        ))}
      </div>
      <div className="row sp micro mut" style={{ marginTop: 4 }}>
        <span>{low}</span>
        {middle && <span>{middle}</span>}
        <span>{high}</span>
      </div>
    </div>
  );
}
