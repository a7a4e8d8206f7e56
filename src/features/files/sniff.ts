import { fileErrors } from './errors';
import type { Delimiter, Encoding, Format, Quote } from './files';

/** Bytes from which format, delimiter and quotation marks are guessed. */
export const SAMPLE = 65_536;

const DELIMITERS: readonly Delimiter[] = [',', ';', '\t', '|'];

/** Cells that a line would have, quotation marks respected. */
function cellsWith(line: string, delimiter: string): number {
  let cells = 1;
  let quoted = false;
  for (const sign of line) {
    if (sign === '"') quoted = !quoted;
    else if (sign === delimiter && !quoted) cells++;
  }
  return cells;
}

/**
 * The delimiter that splits the first lines into equally many cells, the more the better. A header decides where
 * rows are ragged. A comma when nothing splits them.
 */
export function guessDelimiter(sample: string): Delimiter {
  const lines = sample
    .split(/\r\n|\r|\n/)
    .filter((line) => line.trim() !== '')
    .slice(0, 20);
  let best: Delimiter = ',';
  let score = 0;
  for (const delimiter of DELIMITERS) {
    const header = cellsWith(lines[0] ?? '', delimiter);
    if (header < 2) continue;
    const same = lines.filter((line) => cellsWith(line, delimiter) === header).length / lines.length;
    const value = header * (0.2 + same);
    if (value > score) {
      best = delimiter;
      score = value;
    }
  }
  return best;
}

/** Single quotation marks where cells begin and end with them and none does with double ones. */
export function guessQuote(sample: string, delimiter: Delimiter): Quote {
  const edge = delimiter === '|' ? '\\|' : delimiter;
  const wrapped = (mark: string): number =>
    sample.match(new RegExp(`(^|${edge})${mark}[^${mark}\\n]*${mark}(?=${edge}|\\r?\\n|$)`, 'gm'))?.length ??
    0;
  return wrapped("'") > 2 && wrapped('"') === 0 ? 'single' : 'double';
}

/** Beginnings of files that are no text, or no text of ours. */
const MAGIC: readonly (readonly [readonly number[], string])[] = [
  [[0x50, 0x4b, 0x03, 0x04], 'a workbook or a ZIP archive'],
  [[0xd0, 0xcf, 0x11, 0xe0], 'a workbook of an old office program'],
  [[0x25, 0x50, 0x44, 0x46], 'a PDF'],
  [[0x89, 0x50, 0x4e, 0x47], 'a picture'],
  [[0xff, 0xd8, 0xff], 'a picture'],
  [[0x42, 0x5a, 0x68], 'compressed with bzip2'],
  [[0xfd, 0x37, 0x7a, 0x58], 'compressed with xz'],
  [[0x28, 0xb5, 0x2f, 0xfd], 'compressed with zstd'],
  [[0x50, 0x41, 0x52, 0x31], 'a Parquet file'],
];

export const isGzip = (bytes: Uint8Array): boolean => bytes[0] === 0x1f && bytes[1] === 0x8b;

/** @throws ProblemError where the first bytes are those of a well-known kind that is no text */
export function refuseKnownBinary(bytes: Uint8Array, file: string): void {
  const known = MAGIC.find(([magic]) => magic.every((byte, i) => bytes[i] === byte));
  if (known) throw fileErrors.notText(file, known[1]);
}

/** Zero bytes at even and odd places, and whether the bytes are UTF-8 throughout. */
export class EncodingProbe {
  private even = 0;
  private odd = 0;
  private length = 0;
  private first: Uint8Array = new Uint8Array();
  private isUtf8 = true;
  private readonly decoder = new TextDecoder('utf-8', { fatal: true });

  write(chunk: Uint8Array): void {
    if (this.length === 0) this.first = chunk.slice(0, 4);
    if (this.isUtf8) this.decode(chunk, true);
    for (let at = chunk.indexOf(0); at >= 0; at = chunk.indexOf(0, at + 1)) {
      if ((this.length + at) % 2 === 0) this.even++;
      else this.odd++;
    }
    this.length += chunk.length;
  }

  private decode(chunk: Uint8Array | undefined, stream: boolean): void {
    try {
      this.decoder.decode(chunk, { stream });
    } catch {
      this.isUtf8 = false;
    }
  }

  /**
   * Byte-order mark, then the zero bytes of UTF-16, then strict UTF-8, else Windows-1252 with a note.
   * @param whole whether this was all of the file, so that a letter cut in half counts as broken
   * @throws ProblemError when it is binary
   */
  found(file: string, whole: boolean): { encoding: Encoding; note: string | null } {
    const [a, b] = this.first;
    if (a === 0xff && b === 0xfe) return { encoding: 'utf-16le', note: null };
    if (a === 0xfe && b === 0xff) return { encoding: 'utf-16be', note: null };
    const note = `The ${file} file was read as UTF-16; please check the names.`;
    if (this.odd > this.length * 0.2 && this.even < this.length * 0.02) return { encoding: 'utf-16le', note };
    if (this.even > this.length * 0.2 && this.odd < this.length * 0.02) return { encoding: 'utf-16be', note };
    // A stray zero byte is left to the rows; many make it something else than text.
    if (this.even + this.odd > Math.max(8, this.length * 0.002))
      throw fileErrors.notText(file, 'a binary file');
    if (whole && this.isUtf8) this.decode(undefined, false);
    if (this.isUtf8) return { encoding: 'utf-8', note: null };
    return {
      encoding: 'windows-1252',
      note: `The ${file} file is not UTF-8; it was read as Windows-1252. Please check letters with accents.`,
    };
  }
}

/** The format of a file from its first characters. @throws ProblemError for XML, HTML and JSON of another kind */
export function formatOf(sample: string, file: string): Format {
  const start = sample.replace(/^\ufeff/, '').trimStart();
  if (/^<(!doctype html|html)/i.test(start)) throw fileErrors.webPage(file);
  if (/^<[?!a-z]/i.test(start)) {
    const root = /<([\w.-]+:)?(gexf|graphml)[\s>/]/.exec(start)?.[2];
    if (root) return root as 'gexf' | 'graphml';
    // Only a prologue so far, as with a long list of declarations: the reader will see.
    if (!/<[a-z]/i.test(start.replaceAll(/<!--[\s\S]*?-->/g, ''))) return 'graphml';
    throw fileErrors.otherXml(file);
  }
  if (/^\[\s*[[{\]"]/.test(start)) throw fileErrors.oneJson(file);
  if (start.startsWith('{')) {
    const line = /^[^\n]*/.exec(start)![0].trim();
    // Pretty-printed JSON opens its brace and goes on below; JSON Lines closes it in the same line.
    if (/^\{\s*$/.test(line)) throw fileErrors.oneJson(file);
    return 'json-lines';
  }
  return 'delimited';
}
