import { createHash, randomUUID } from 'node:crypto';
import {
  createReadStream,
  createWriteStream,
  existsSync,
  mkdirSync,
  readdirSync,
  rmSync,
  statSync,
} from 'node:fs';
import { rename } from 'node:fs/promises';
import type { IncomingMessage, ServerResponse } from 'node:http';
import { dirname, join } from 'node:path';
import { text } from 'node:stream/consumers';
import { pipeline } from 'node:stream/promises';
import { decodeChunks } from './aws-chunked';
import { escapeXml, refuse, xml } from './s3-answers';

/** Streams bytes into a file, whole or not at all, and answers with their entity tag. */
async function write(source: AsyncIterable<Buffer>, file: string): Promise<string> {
  mkdirSync(dirname(file), { recursive: true });
  const partial = `${file}.${randomUUID()}.partial`;
  const hash = createHash('md5');
  try {
    await pipeline(
      source,
      async function* (chunks: AsyncIterable<Buffer>) {
        for await (const chunk of chunks) {
          hash.update(chunk);
          yield chunk;
        }
      },
      createWriteStream(partial),
    );
    await rename(partial, file);
  } catch (error) {
    rmSync(partial, { force: true });
    throw error;
  }
  return hash.digest('hex');
}

/** Streams a request's body into a file. */
export const receive = (request: IncomingMessage, file: string): Promise<string> =>
  write(decodeChunks(request), file);

const partFile = (folder: string, number: number): string => join(folder, String(number).padStart(6, '0'));

async function* joined(files: readonly string[]): AsyncGenerator<Buffer> {
  for (const file of files) yield* createReadStream(file) as AsyncIterable<Buffer>;
}

/** UploadPart, ListParts, AbortMultipartUpload and CompleteMultipartUpload of one upload. */
export async function multipartCall(
  request: IncomingMessage,
  response: ServerResponse,
  call: { folder: string; query: URLSearchParams; file: string; key: string },
): Promise<void> {
  const { folder, query, file, key } = call;
  if (!existsSync(folder)) return refuse(response, 'NoSuchUpload');
  if (request.method === 'PUT') {
    const tag = await receive(request, partFile(folder, Number(query.get('partNumber') ?? '1')));
    response.writeHead(200, { etag: `"${tag}"` }).end();
    return;
  }
  if (request.method === 'DELETE') {
    rmSync(folder, { recursive: true, force: true });
    response.writeHead(204).end();
    return;
  }
  if (request.method === 'GET') {
    const parts = readdirSync(folder)
      .filter((name) => !name.endsWith('.partial'))
      .sort()
      .map(
        (name) =>
          `<Part><PartNumber>${Number(name)}</PartNumber><Size>${statSync(join(folder, name)).size}</Size></Part>`,
      );
    return xml(
      response,
      `<ListPartsResult><IsTruncated>false</IsTruncated>${parts.join('')}</ListPartsResult>`,
    );
  }
  // The object is made of the parts that are named, not of all that were sent.
  const named = [...(await text(request)).matchAll(/<PartNumber>(\d+)<\/PartNumber>/g)].map((one) =>
    Number(one[1]),
  );
  const files = named.map((number) => partFile(folder, number));
  if (files.length === 0 || !files.every((part) => existsSync(part)))
    return refuse(response, 'InvalidPart', 400);
  const tag = await write(joined(files), file);
  rmSync(folder, { recursive: true, force: true });
  xml(
    response,
    `<CompleteMultipartUploadResult><Key>${escapeXml(key)}</Key><ETag>"${tag}-${files.length}"</ETag></CompleteMultipartUploadResult>`,
  );
}
