import { Readable } from 'node:stream';
import { createGunzip } from 'node:zlib';
import { fileErrors } from './errors';

const BIG = 1024 * 1024;

/**
 * The bytes of a stream, unpacked if it is gzip; stops what unpacks to more than a file may hold.
 * @param mostBytes after unpacking
 * @throws ProblemError 413 when it is more, 422 when the packing is damaged
 */
export async function* unpacked(
  source: Readable,
  gzip: boolean,
  file: string,
  mostBytes: number,
): AsyncGenerator<Buffer> {
  let size = 0;
  const stream: Readable = gzip ? source.pipe(createGunzip({ chunkSize: 64 * 1024 })) : source;
  if (gzip) source.on('error', (error) => stream.destroy(error));
  try {
    for await (const chunk of stream as AsyncIterable<Buffer>) {
      size += chunk.length;
      if (size > mostBytes) throw fileErrors.tooLarge(`${Math.floor(mostBytes / BIG)} MB of text`);
      yield chunk;
    }
  } catch (error) {
    const code = (error as { code?: string }).code ?? '';
    if (code.startsWith('Z_')) throw fileErrors.truncated(file);
    throw error;
  } finally {
    source.destroy();
    stream.destroy();
  }
}
