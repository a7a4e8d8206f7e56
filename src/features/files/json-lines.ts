import { fileErrors } from './errors';
import { FIELD_BUFFER, type RowSink, type TextReader } from './files';

/** Splits text into lines; a line may come in many pieces. */
abstract class Lines implements TextReader {
  private pieces: string[] = [];
  private held = 0;
  private line = 0;
  constructor(protected readonly file: string) {}

  protected abstract take(text: string, line: number): void;

  write(text: string): void {
    let from = 0;
    for (let at = text.indexOf('\n'); at >= 0; at = text.indexOf('\n', from)) {
      this.flush(text.slice(from, at));
      from = at + 1;
    }
    const rest = text.slice(from);
    this.held += rest.length;
    if (this.held > FIELD_BUFFER) throw fileErrors.longField(this.file, this.line + 1);
    this.pieces.push(rest);
  }
  end(): void {
    if (this.held > 0) this.flush('');
  }
  private flush(tail: string): void {
    const whole = this.pieces.length > 0 ? this.pieces.join('') + tail : tail;
    this.pieces = [];
    this.held = 0;
    this.line++;
    if (whole.trim() !== '') this.take(whole, this.line);
  }
}

/** The object on a line, or why there is none. */
function objectOf(text: string): Map<string, unknown> | string {
  let value: unknown;
  try {
    value = JSON.parse(text);
  } catch {
    return 'This line is not JSON.';
  }
  if (typeof value !== 'object' || value === null || Array.isArray(value))
    return 'This line is not a JSON object.';
  return new Map(Object.entries(value).map(([key, one]) => [key.trim(), one]));
}

const cellOf = (value: unknown): string => {
  if (value === undefined || value === null) return '';
  return typeof value === 'object' ? JSON.stringify(value) : String(value as string | number | boolean);
};

/** First pass over JSON Lines: every key, in the order met. */
export class JsonLineKeys extends Lines {
  readonly keys = new Set<string>();
  constructor(
    file: string,
    private readonly most: number,
  ) {
    super(file);
  }
  protected take(text: string): void {
    const object = objectOf(text);
    if (typeof object === 'string') return;
    for (const key of object.keys()) this.keys.add(key);
    if (this.keys.size > this.most) throw fileErrors.tooManyKeys(this.file, this.most);
  }
}

/** Second pass: one row a line; a key that a line does not have is a blank cell. */
export class JsonLineReader extends Lines {
  constructor(
    file: string,
    private readonly columns: readonly string[],
    private readonly sink: RowSink,
  ) {
    super(file);
    sink.header([...columns]);
  }
  protected take(text: string, line: number): void {
    const object = objectOf(text);
    if (typeof object === 'string') return this.sink.broken(line, text, object);
    this.sink.row(
      this.columns.map((column) => cellOf(object.get(column))),
      line,
    );
  }
}
