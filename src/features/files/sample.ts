import { fileErrors } from './errors';
import { isGraph, type Layout, type ReadSettings, type RowSink } from './files';
import { columnsReader, NO_COLUMNS, rowReader, type Columns } from './open';
import { EncodingProbe, formatOf, guessDelimiter, guessQuote, refuseKnownBinary } from './sniff';

export interface SampleTable {
  readonly headers: string[];
  readonly rows: { cells: string[]; line: number }[];
  readonly broken: { line: number; value: string; reason: string }[];
}

/** The first part of a file, read as the whole will be. */
export interface Sample {
  readonly layout: Layout;
  readonly note: string | null;
  /** Its rows; for a graph file those of its ties. */
  readonly table: SampleTable;
  /** Members of a graph file. */
  readonly members: SampleTable | null;
  /** Whether this was all of the file. */
  readonly whole: boolean;
}

/** Format, delimiter and quotation marks of text; settings go first. */
export function layoutOf(
  text: string,
  encoding: Layout['encoding'],
  settings: ReadSettings,
  file: string,
): Layout {
  const format = formatOf(text, file);
  const delimiter = settings.delimiter ?? guessDelimiter(text);
  return {
    format,
    encoding,
    delimiter,
    quote: settings.quote ?? guessQuote(text, delimiter),
    header: settings.header ?? true,
  };
}

function collecting(): SampleTable & { sink: RowSink } {
  const headers: string[] = [];
  const rows: SampleTable['rows'] = [];
  const broken: SampleTable['broken'] = [];
  return {
    headers,
    rows,
    broken,
    sink: {
      header: (cells) => void headers.push(...cells),
      row: (cells, line) => void rows.push({ cells, line }),
      broken: (line, value, reason) => void broken.push({ line, value, reason }),
    },
  };
}

function tableOf(
  text: string,
  layout: Layout,
  columns: Columns,
  side: 'ties' | 'members',
  file: string,
  whole: boolean,
): SampleTable {
  const { sink, ...table } = collecting();
  const reader = rowReader(layout, columns, side, file, sink);
  reader.write(text);
  // The end of a part is no end: what stands there is cut off.
  if (whole) reader.end();
  return table;
}

/**
 * Reads the first bytes of a file (unpacked already) as the server will read all of it.
 * @param whole whether these are all of its bytes
 * @throws ProblemError in the words that the server would use
 */
export function readSample(
  bytes: Uint8Array,
  file: string,
  settings: ReadSettings,
  whole: boolean,
  mostColumns: number,
): Sample {
  if (bytes.length === 0) throw fileErrors.empty(file);
  refuseKnownBinary(bytes, file);
  const probe = new EncodingProbe();
  probe.write(bytes);
  const found = settings.encoding ? { encoding: settings.encoding, note: null } : probe.found(file, whole);
  const decoded = new TextDecoder(found.encoding).decode(bytes);
  // Ends at a line end, so that a part of a delimited file holds whole rows only.
  const text = whole ? decoded : decoded.slice(0, Math.max(decoded.lastIndexOf('\n'), 0) || decoded.length);
  const layout = layoutOf(text, found.encoding, settings, file);
  const first = columnsReader(layout, file, mostColumns);
  first?.write(text);
  if (whole) first?.end();
  const columns = first?.columns() ?? NO_COLUMNS;
  const closed = whole || layout.format === 'delimited';
  const read = (side: 'ties' | 'members'): SampleTable => tableOf(text, layout, columns, side, file, closed);
  return {
    layout,
    note: found.note,
    table: read('ties'),
    members: isGraph(layout.format) ? read('members') : null,
    whole,
  };
}
