import * as z from 'zod';

/** How a file is meant to be read; whatever is left out is detected. */
export const readSettingsSchema = z
  .object({
    encoding: z.enum(['utf-8', 'utf-16le', 'utf-16be', 'windows-1252']),
    delimiter: z.enum([',', ';', '\t', '|']),
    quote: z.enum(['double', 'single', 'none']),
    /** Whether the first row names the columns. */
    header: z.boolean(),
    decimal: z.enum(['point', 'comma']),
    /** Order of day and month in dates that are not written year first. */
    dates: z.enum(['year-first', 'day-first', 'month-first']),
  })
  .partial();
export type ReadSettings = z.infer<typeof readSettingsSchema>;

export type Encoding = NonNullable<ReadSettings['encoding']>;
export type Quote = NonNullable<ReadSettings['quote']>;
export type DateOrder = NonNullable<ReadSettings['dates']>;
export type Format = 'delimited' | 'json-lines' | 'gexf' | 'graphml';
export type Delimiter = NonNullable<ReadSettings['delimiter']>;

export const isGraph = (format: Format): format is 'gexf' | 'graphml' =>
  format === 'gexf' || format === 'graphml';

/** How text becomes rows: everything that was set or detected. */
export interface Layout {
  readonly format: Format;
  readonly encoding: Encoding;
  readonly delimiter: Delimiter;
  readonly quote: Quote;
  readonly header: boolean;
}

/** What a reader of rows is told. Lines are counted as an editor counts them. */
export interface RowSink {
  /** Called once, before any row. */
  header(cells: string[]): void;
  /** Called for every row that is not blank. */
  row(cells: string[], line: number): void;
  /** A row that cannot be read as cells: counted and kept with its reason. */
  broken(line: number, value: string, reason: string): void;
}

/** A reader that text is pushed into, in pieces of any size. */
export interface TextReader {
  write(text: string): void;
  end(): void;
}

/** How much one field, line or element may gather before the file is given up: an open quotation mark never ends. */
export const FIELD_BUFFER = 16 * 1024 * 1024;
