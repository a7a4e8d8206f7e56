import Papa from 'papaparse';
import { fileErrors } from './errors';
import { FIELD_BUFFER, type Layout, type RowSink, type TextReader } from './files';

/** Text is gathered to pieces of this many characters before it is parsed. */
const PIECE = 256 * 1024;
const QUOTES = { double: '"', single: "'", none: '\uffff' } as const;

/** Line ends of any kind, also mixed ones, as one; the pair of a line end may lie in two pieces. */
class LineEnds {
  private held = false;
  next(text: string): string {
    const whole = this.held ? `\r${text}` : text;
    this.held = whole.endsWith('\r');
    const ready = this.held ? whole.slice(0, -1) : whole;
    return ready.includes('\r') ? ready.replaceAll(/\r\n?/g, '\n') : ready;
  }
  end(): string {
    return this.held ? '\n' : '';
  }
}

const lineEndsIn = (cells: readonly string[]): number => {
  let count = 0;
  for (const cell of cells)
    for (let at = cell.indexOf('\n'); at >= 0; at = cell.indexOf('\n', at + 1)) count++;
  return count;
};

/**
 * Rows of delimited text, through papaparse. A row whose quotation marks do not fit is handed over as broken, with
 * the number of lines that it swallowed, so that nothing is lost in silence.
 */
export class DelimitedReader implements TextReader {
  private readonly ends = new LineEnds();
  private waiting: string[] = [];
  private length = 0;
  /** Parsed again only when this much has gathered, so that a long field costs no square of its length. */
  private enough = PIECE;
  private line = 1;
  private sawHeader = false;

  constructor(
    private readonly file: string,
    private readonly layout: Pick<Layout, 'delimiter' | 'quote' | 'header'>,
    private readonly sink: RowSink,
  ) {}

  write(text: string): void {
    const ready = this.ends.next(text);
    this.waiting.push(ready);
    this.length += ready.length;
    if (this.length >= this.enough) this.parse(false);
  }

  end(): void {
    this.waiting.push(this.ends.end());
    this.parse(true);
    if (!this.sawHeader) throw fileErrors.empty(this.file);
  }

  private parse(last: boolean): void {
    const text = this.waiting.join('');
    const parser = new Papa.Parser({
      delimiter: this.layout.delimiter,
      newline: '\n',
      quoteChar: QUOTES[this.layout.quote],
    });
    const { data, errors, meta } = parser.parse(text, 0, !last) as Papa.ParseResult<string[]>;
    const misquoted = new Set<number>();
    for (const error of errors) {
      if (error.code === 'MissingQuotes' && last)
        throw fileErrors.longField(
          this.file,
          this.line + lineEndsIn(data.slice(0, -1).flat()) + data.length - 1,
        );
      if (error.code === 'InvalidQuotes') misquoted.add(error.row!);
    }
    for (let i = 0; i < data.length; i++) this.take(data[i]!, misquoted.has(i));
    const rest = last ? '' : text.slice(meta.cursor);
    if (rest.length > FIELD_BUFFER) throw fileErrors.longField(this.file, this.line);
    this.waiting = [rest];
    this.length = rest.length;
    this.enough = Math.max(PIECE, rest.length * 2);
  }

  private take(cells: string[], misquoted: boolean): void {
    const start = this.line;
    const within = lineEndsIn(cells);
    this.line += 1 + within;
    if (cells.length === 1 && cells[0]!.trim() === '') return;
    if (!this.sawHeader) {
      this.sawHeader = true;
      if (this.layout.header) return this.sink.header(cells.map((cell) => cell.trim()));
      this.sink.header(cells.map((_, i) => `Column ${i + 1}`));
    }
    if (misquoted) {
      const lines = within > 0 ? ` ${within + 1} lines were read as one row because of it.` : '';
      return this.sink.broken(start, cells.join(' | '), `A quotation mark is in the wrong place.${lines}`);
    }
    this.sink.row(cells, start);
  }
}
