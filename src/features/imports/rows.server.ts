import type { Readable } from 'node:stream';
import Papa from 'papaparse';
import { importErrors } from './errors';
import { LIMITS } from './imports';

export interface RowReader {
  /** Called once, with the first row. */
  header(cells: string[]): void;
  /** Called for every other row that is not blank. */
  row(cells: string[], line: number): void;
}

const NEWLINE = /\r\n|\r|\n/g;

/**
 * Streams a delimited file through papaparse. Lines are counted as an editor counts them, so a quoted field with
 * line ends in it takes several.
 * @param signal stops reading
 */
export function readRows(
  text: Readable,
  delimiter: string,
  file: string,
  reader: RowReader,
  signal: AbortSignal,
): Promise<void> {
  return new Promise((resolve, reject) => {
    let line = 1;
    let sawHeader = false;
    let waiting = 0;
    let settled = false;
    const finish = (error?: unknown): void => {
      if (settled) return;
      settled = true;
      text.destroy();
      if (error) reject(error as Error);
      else resolve();
    };
    const aborted = (): void => finish(Object.assign(new Error('Stopped.'), { name: 'AbortError' }));
    signal.addEventListener('abort', aborted, { once: true });
    text.on('error', finish);
    // An unclosed quotation mark would gather the rest of the file into one field.
    text.on('data', (chunk: string) => {
      waiting += chunk.length;
      if (waiting > LIMITS.cellLength * LIMITS.columns) finish(importErrors.longField(file, line));
    });
    Papa.parse<string[]>(
      text as unknown as NodeJS.ReadableStream as never,
      {
        delimiter,
        chunk: ({ data, errors }: Papa.ParseResult<string[]>, parser: Papa.Parser) => {
          if (settled) return parser.abort();
          if (data.length > 0) waiting = 0;
          try {
            for (const cells of data) {
              const start = line;
              line += 1;
              for (const cell of cells)
                if (cell.includes('\n') || cell.includes('\r')) line += cell.match(NEWLINE)?.length ?? 0;
              if (cells.length === 1 && cells[0]!.trim() === '') continue;
              if (sawHeader) reader.row(cells, start);
              else {
                sawHeader = true;
                reader.header(cells.map((cell) => cell.trim()));
              }
            }
            const quotes = errors.find((error) => error.type === 'Quotes' && error.code === 'MissingQuotes');
            if (quotes) throw importErrors.longField(file, line - 1);
          } catch (error) {
            // First: aborting calls `complete`, which would end well.
            finish(error);
            parser.abort();
          }
        },
        complete: () => {
          signal.removeEventListener('abort', aborted);
          if (!sawHeader) finish(importErrors.empty(file));
          else finish();
        },
        error: (error: Error) => finish(error),
      } as Papa.ParseConfig<string[]> as never,
    );
  });
}
