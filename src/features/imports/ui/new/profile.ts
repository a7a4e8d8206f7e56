import type { DateOrder, SampleTable } from '@/features/files';
import { dateOrderOf, parseNumber } from '../../numbers';

/** What the first rows say about one column. */
export interface Profile {
  readonly column: string;
  /** A few of its first values, blanks left out. */
  readonly first: readonly string[];
  /** Shares of all rows that were looked at. */
  readonly blank: number;
  /** Share of the filled cells that are numbers. */
  readonly numbers: number;
  readonly dates: DateOrder | null;
  readonly freeText: boolean;
}

const ROWS = 2_000;
const DATE_ROWS = 200;
/** Characters from which a value that nobody else has is free text rather than a label. */
const LONG = 12;

/** Profiles of the columns of a table, from its first rows. */
export function profilesOf(table: SampleTable): Profile[] {
  const rows = table.rows.slice(0, ROWS);
  return table.headers.map((column, at) => {
    const filled = rows.map((row) => row.cells[at]?.trim() ?? '').filter((cell) => cell !== '');
    const numbers = filled.filter((cell) => !Number.isNaN(parseNumber(cell, true))).length;
    const distinct = new Set(filled).size;
    const length = filled.reduce((sum, cell) => sum + cell.length, 0) / Math.max(1, filled.length);
    return {
      column,
      first: filled.slice(0, 3),
      blank: rows.length === 0 ? 0 : 1 - filled.length / rows.length,
      numbers: filled.length === 0 ? 0 : numbers / filled.length,
      dates: dateOrderOf(filled.slice(0, DATE_ROWS)),
      freeText: filled.length > 20 && distinct > filled.length * 0.9 && length > LONG,
    };
  });
}
