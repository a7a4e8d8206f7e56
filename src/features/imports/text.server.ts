import { PassThrough, type Duplex, type Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import { createGunzip } from 'node:zlib';
import iconv from 'iconv-lite';
import { importErrors } from './errors';
import { guessDelimiter } from './guess';
import { LIMITS } from './imports';

export interface TextInfo {
  readonly encoding: 'utf-8' | 'utf-16le' | 'utf-16be' | 'windows-1252';
  readonly gzip: boolean;
  readonly delimiter: string;
  /** Said to the person where the encoding had to be guessed. */
  readonly warning: string | null;
}

/** Bytes from which the delimiter is guessed. */
const SAMPLE = 65_536;

/** Unpacks a stream if it is gzip, and stops what unpacks to far more than a file should hold. */
async function* unpacked(source: Readable, gzip: boolean, file: string): AsyncGenerator<Buffer> {
  let size = 0;
  const stream: Readable = gzip ? source.pipe(createGunzip()) : source;
  source.on('error', (error) => stream.destroy(error));
  try {
    for await (const chunk of stream as AsyncIterable<Buffer>) {
      size += chunk.length;
      if (size > LIMITS.textBytes) throw importErrors.tooLarge('2 GB of text');
      yield chunk;
    }
  } catch (error) {
    const { code } = error as { code?: string };
    if (code === 'Z_BUF_ERROR' || code === 'Z_DATA_ERROR') throw importErrors.truncated(file);
    throw error;
  } finally {
    source.destroy();
  }
}

/**
 * Reads a file once to learn how to read it: byte-order mark, strict UTF-8, else the zero bytes of UTF-16,
 * else Windows-1252 with a warning.
 * @throws ProblemError when it is empty, binary or damaged
 */
export async function inspectText(open: () => Promise<Readable>, file: string): Promise<TextInfo> {
  const source = await open();
  const first = await new Promise<Buffer>((resolve, reject) => {
    source.once('data', (chunk: Buffer) => {
      source.pause();
      resolve(chunk);
    });
    source.once('end', () => resolve(Buffer.alloc(0)));
    source.once('error', reject);
  });
  source.destroy();
  if (first.length === 0) throw importErrors.empty(file);
  const gzip = first[0] === 0x1f && first[1] === 0x8b;
  const utf8 = new TextDecoder('utf-8', { fatal: true });
  let isUtf8 = true;
  let zerosEven = 0;
  let zerosOdd = 0;
  let length = 0;
  const head: Buffer[] = [];
  for await (const chunk of unpacked(await open(), gzip, file)) {
    if (length < SAMPLE) head.push(chunk);
    if (isUtf8) {
      try {
        utf8.decode(chunk, { stream: true });
      } catch {
        isUtf8 = false;
      }
    }
    for (let i = 0; i < chunk.length; i++) {
      if (chunk[i] !== 0) continue;
      if ((length + i) % 2 === 0) zerosEven++;
      else zerosOdd++;
    }
    length += chunk.length;
  }
  if (length === 0) throw importErrors.empty(file);
  const sample = Buffer.concat(head).subarray(0, SAMPLE);
  const found = (encoding: TextInfo['encoding'], warning: string | null = null): TextInfo => ({
    encoding,
    gzip,
    delimiter: guessDelimiter(iconv.decode(sample, encoding)),
    warning,
  });
  if (sample[0] === 0xff && sample[1] === 0xfe) return found('utf-16le');
  if (sample[0] === 0xfe && sample[1] === 0xff) return found('utf-16be');
  const utf16 = `The ${file} file was read as UTF-16; please check the names.`;
  if (zerosOdd > length * 0.2 && zerosEven < length * 0.02) return found('utf-16le', utf16);
  if (zerosEven > length * 0.2 && zerosOdd < length * 0.02) return found('utf-16be', utf16);
  if (zerosEven + zerosOdd > 0) throw importErrors.notText(file);
  try {
    if (isUtf8) utf8.decode();
  } catch {
    isUtf8 = false;
  }
  if (isUtf8) return found('utf-8');
  return found(
    'windows-1252',
    `The ${file} file is not UTF-8; it was read as Windows-1252. Please check letters with accents.`,
  );
}

/** Opens a file as decoded text without its byte-order mark; `onBytes` hears of every piece read. */
export async function openText(
  open: () => Promise<Readable>,
  info: TextInfo,
  file: string,
  onBytes: (count: number) => void,
): Promise<Readable> {
  const decoder = iconv.decodeStream(info.encoding, { stripBOM: true }) as unknown as Duplex;
  const source = await open();
  const counted = new PassThrough();
  source.on('data', (chunk: Buffer) => onBytes(chunk.length));
  void pipeline(source, counted).catch((error: Error) => counted.destroy(error));
  void pipeline(unpacked(counted, info.gzip, file), decoder).catch((error: Error) => decoder.destroy(error));
  return decoder;
}
