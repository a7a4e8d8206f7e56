import type { ReactNode } from 'react';
import { useWidth } from './useWidth';

export interface ChartTable {
  head: readonly string[];
  rows: readonly (readonly (string | number)[])[];
}

export interface ChartFrameProps {
  /** What the picture shows, with its main number: it is read in place of the picture. */
  label: string;
  /** In pixels; a function of the width when the content needs more room on a narrow screen. */
  height: number | ((width: number) => number);
  /** Draws the inside of the SVG at the real width. */
  children: (width: number) => ReactNode;
  /** The same numbers as a table, behind "Show as table". */
  table?: ChartTable;
  className?: string;
  /** Width assumed before it is measured. */
  fallbackWidth?: number;
}

/** A picture laid out at its real width, with an accessible name and, when given, its numbers as a table. */
export function ChartFrame({ label, height, children, table, className, fallbackWidth }: ChartFrameProps) {
  const [ref, width] = useWidth<HTMLDivElement>(fallbackWidth);
  const tall = typeof height === 'function' ? height(width) : height;
  return (
    <div className={`chart ${className ?? ''}`} ref={ref}>
      <svg role="img" aria-label={label} width={width} height={tall} viewBox={`0 0 ${width} ${tall}`}>
        {children(width)}
      </svg>
      {table && <TableFallback label={label} table={table} />}
    </div>
  );
}

/** The numbers of a chart, folded away until wanted. */
export function TableFallback({ label, table }: { label: string; table: ChartTable }) {
  return (
    <details>
      <summary>Show as table</summary>
      <div className="tscroll" tabIndex={0} role="region" aria-label={`${label}, as a table`}>
        <table className="tbl">
          <thead>
            <tr>
              {table.head.map((cell) => (
                <th key={cell} scope="col">
                  {cell}
                </th>
              ))}
            </tr>
          </thead>
          <tbody>
            {table.rows.map((row, i) => (
              <tr key={i}>
                {row.map((cell, j) => (
                  <td key={j}>{cell}</td>
                ))}
              </tr>
            ))}
          </tbody>
        </table>
      </div>
    </details>
  );
}
