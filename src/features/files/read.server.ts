import { createHash } from 'node:crypto';
import type { Readable } from 'node:stream';
import { fileErrors } from './errors';
import type { Layout, ReadSettings, RowSink, TextReader } from './files';
import { columnsReader, NO_COLUMNS, rowReader, type Columns } from './open';
import { layoutOf } from './sample';
import { EncodingProbe, isGzip, refuseKnownBinary, SAMPLE } from './sniff';
import { unpacked } from './unpack.server';

export interface SourceFile {
  /** What the file is called in messages: ties, members, … */
  readonly what: string;
  readonly open: () => Promise<Readable>;
  readonly settings: ReadSettings;
  readonly limits: { readonly textBytes: number; readonly columns: number };
  /** Hears of every piece of the packed file that was read, over all passes. */
  readonly onBytes: (count: number) => void;
  readonly signal: AbortSignal;
}

/** A file that was looked at as a whole, and can be read row by row. */
export interface OpenedFile {
  readonly layout: Layout;
  readonly note: string | null;
  readonly sha256: string;
  readonly gzip: boolean;
  readonly columns: Columns;
  /** Passes over the file that reading its rows will take, the first look not counted. */
  rows(side: 'ties' | 'members', sink: RowSink): Promise<void>;
}

async function bytesOf(source: SourceFile, onChunk?: (chunk: Buffer) => void): Promise<Readable> {
  const stream = await source.open();
  stream.on('data', (chunk: Buffer) => {
    source.onBytes(chunk.length);
    onChunk?.(chunk);
  });
  stream.pause();
  return stream;
}

async function firstBytes(source: SourceFile): Promise<Buffer> {
  const stream = await source.open();
  try {
    for await (const chunk of stream as AsyncIterable<Buffer>) if (chunk.length > 0) return chunk;
    return Buffer.alloc(0);
  } finally {
    stream.destroy();
  }
}

const stopped = (): Error => Object.assign(new Error('Stopped.'), { name: 'AbortError' });

async function pushText(
  source: SourceFile,
  gzip: boolean,
  layout: Layout,
  reader: TextReader,
): Promise<void> {
  const decoder = new TextDecoder(layout.encoding);
  const bytes = unpacked(await bytesOf(source), gzip, source.what, source.limits.textBytes);
  for await (const chunk of bytes) {
    if (source.signal.aborted) throw stopped();
    reader.write(decoder.decode(chunk, { stream: true }));
  }
  reader.write(decoder.decode());
  reader.end();
}

/**
 * Looks at a whole file once (encoding, checksum; twice where its columns are spread over it) and answers with how to
 * read its rows. Memory stays at a few pieces of 64 KB whatever the size.
 * @throws ProblemError when it is empty, damaged, too large or no text
 */
export async function openFile(source: SourceFile): Promise<OpenedFile> {
  const { what, settings, limits } = source;
  const first = await firstBytes(source);
  if (first.length === 0) throw fileErrors.empty(what);
  const gzip = isGzip(first);
  const hash = createHash('sha256');
  const probe = new EncodingProbe();
  const head: Buffer[] = [];
  let length = 0;
  const stream = await bytesOf(source, (chunk) => void hash.update(chunk));
  for await (const chunk of unpacked(stream, gzip, what, limits.textBytes)) {
    if (source.signal.aborted) throw stopped();
    if (length === 0) refuseKnownBinary(chunk, what);
    if (length < SAMPLE) head.push(chunk);
    probe.write(chunk);
    length += chunk.length;
  }
  if (length === 0) throw fileErrors.empty(what);
  const found = settings.encoding ? { encoding: settings.encoding, note: null } : probe.found(what, true);
  const sample = Buffer.concat(head).subarray(0, SAMPLE);
  const layout = layoutOf(new TextDecoder(found.encoding).decode(sample), found.encoding, settings, what);
  const reader = columnsReader(layout, what, limits.columns);
  if (reader) await pushText(source, gzip, layout, reader);
  const columns = reader?.columns() ?? NO_COLUMNS;
  return {
    layout,
    note: found.note,
    sha256: hash.digest('hex'),
    gzip,
    columns,
    rows: (side, sink) => pushText(source, gzip, layout, rowReader(layout, columns, side, what, sink)),
  };
}
