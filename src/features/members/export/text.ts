import { csvLine } from '@/lib/csv';
import type { Encoder } from './table';

/** Comma-separated, safe to open in a spreadsheet: see `csvLine`. */
export const csv: Encoder = async function* ({ columns, chunks, cells }) {
  yield csvLine(columns.map(({ name }) => name));
  for await (const rows of chunks) yield rows.map((row) => csvLine(cells(row))).join('');
};

/** One object a line, a key for each column. */
export const jsonl: Encoder = async function* ({ columns, chunks, cells }) {
  for await (const rows of chunks)
    yield rows
      .map((row) => {
        const values = cells(row);
        return `${JSON.stringify(Object.fromEntries(columns.map(({ name }, at) => [name, values[at]])))}\n`;
      })
      .join('');
};
