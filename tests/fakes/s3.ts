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
import { appendFile, readFile, rename } from 'node:fs/promises';
import { createServer, type IncomingMessage, type ServerResponse } from 'node:http';
import type { AddressInfo } from 'node:net';
import { dirname, join } from 'node:path';
import { pipeline } from 'node:stream/promises';
import { decodeChunks } from './aws-chunked';

export interface S3Fake {
  readonly endpoint: string;
  stop(): Promise<void>;
}

const escape = (text: string): string =>
  text.replaceAll('&', '&amp;').replaceAll('<', '&lt;').replaceAll('>', '&gt;');
const xml = (response: ServerResponse, body: string, status = 200): void => {
  response.writeHead(status, { 'content-type': 'application/xml' });
  response.end(`<?xml version="1.0" encoding="UTF-8"?>${body}`);
};
const missing = (response: ServerResponse, code: string): void =>
  xml(response, `<Error><Code>${code}</Code></Error>`, 404);

/** Every file under a folder, as keys. */
function keysUnder(folder: string, prefix = ''): string[] {
  if (!existsSync(folder)) return [];
  return readdirSync(folder, { withFileTypes: true }).flatMap((entry) =>
    entry.isDirectory()
      ? keysUnder(join(folder, entry.name), `${prefix}${entry.name}/`)
      : [`${prefix}${entry.name}`],
  );
}

/** Streams a request's body into a file and answers with its entity tag. */
async function receive(request: IncomingMessage, file: string): Promise<string> {
  mkdirSync(dirname(file), { recursive: true });
  const partial = `${file}.${randomUUID()}.partial`;
  const hash = createHash('md5');
  try {
    await pipeline(
      decodeChunks(request),
      async function* (source: AsyncIterable<Buffer>) {
        for await (const chunk of source) {
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

/**
 * A small S3-compatible store on loopback, path style, files under `folder`: enough for put, get, head, delete, list
 * and multipart uploads through the SDK. Signatures are not checked.
 */
export async function startS3Fake(folder: string): Promise<S3Fake> {
  const objects = join(folder, 'objects');
  const uploads = join(folder, 'uploads');
  mkdirSync(objects, { recursive: true });

  const handle = async (request: IncomingMessage, response: ServerResponse): Promise<void> => {
    const url = new URL(request.url ?? '/', 'http://s3.local');
    const [bucket = '', ...rest] = url.pathname.slice(1).split('/');
    const key = decodeURIComponent(rest.join('/'));
    if (bucket.includes('..') || key.split('/').includes('..')) return missing(response, 'NoSuchKey');
    const bucketFolder = join(objects, bucket);
    const file = join(bucketFolder, key);
    const uploadId = url.searchParams.get('uploadId');
    const { method } = request;
    if (!key) return bucketCall(method, url, bucketFolder, response);
    if (method === 'POST' && url.searchParams.has('uploads')) {
      const id = randomUUID();
      mkdirSync(join(uploads, id), { recursive: true });
      return xml(
        response,
        `<InitiateMultipartUploadResult><Bucket>${bucket}</Bucket><Key>${escape(key)}</Key><UploadId>${id}</UploadId></InitiateMultipartUploadResult>`,
      );
    }
    if (uploadId !== null) return multipartCall(request, response, uploadId, url, file, key);
    if (method === 'PUT') {
      const tag = await receive(request, file);
      response.writeHead(200, { etag: `"${tag}"` }).end();
      return;
    }
    if (method === 'DELETE') {
      rmSync(file, { force: true });
      response.writeHead(204).end();
      return;
    }
    if (!existsSync(file))
      return method === 'HEAD' ? void response.writeHead(404).end() : missing(response, 'NoSuchKey');
    sendObject(request, response, file);
  };

  const multipartCall = async (
    request: IncomingMessage,
    response: ServerResponse,
    id: string,
    url: URL,
    file: string,
    key: string,
  ): Promise<void> => {
    const parts = join(uploads, id.replaceAll(/[^\w-]/g, ''));
    if (!existsSync(parts)) return missing(response, 'NoSuchUpload');
    if (request.method === 'PUT') {
      const tag = await receive(
        request,
        join(parts, (url.searchParams.get('partNumber') ?? '1').padStart(6, '0')),
      );
      response.writeHead(200, { etag: `"${tag}"` }).end();
      return;
    }
    if (request.method === 'DELETE') {
      rmSync(parts, { recursive: true, force: true });
      response.writeHead(204).end();
      return;
    }
    mkdirSync(dirname(file), { recursive: true });
    rmSync(file, { force: true });
    for (const part of readdirSync(parts).sort()) await appendFile(file, await readFile(join(parts, part)));
    rmSync(parts, { recursive: true, force: true });
    xml(
      response,
      `<CompleteMultipartUploadResult><Key>${escape(key)}</Key><ETag>"${id}"</ETag></CompleteMultipartUploadResult>`,
    );
  };

  const server = createServer((request, response) => {
    handle(request, response).catch((error: Error) => {
      if (!response.headersSent)
        xml(
          response,
          `<Error><Code>InternalError</Code><Message>${escape(error.message)}</Message></Error>`,
          500,
        );
      else response.destroy();
    });
  });
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', () => resolve()));
  return {
    endpoint: `http://127.0.0.1:${(server.address() as AddressInfo).port}`,
    stop: async () => {
      server.closeAllConnections();
      await new Promise<void>((resolve) => server.close(() => resolve()));
    },
  };
}

function bucketCall(method: string | undefined, url: URL, folder: string, response: ServerResponse): void {
  if (method === 'PUT') {
    mkdirSync(folder, { recursive: true });
    response.writeHead(200).end();
    return;
  }
  if (!existsSync(folder))
    return method === 'HEAD' ? void response.writeHead(404).end() : missing(response, 'NoSuchBucket');
  if (method === 'HEAD') return void response.writeHead(200).end();
  const prefix = url.searchParams.get('prefix') ?? '';
  const items = keysUnder(folder)
    .filter((key) => key.startsWith(prefix) && !key.endsWith('.partial'))
    .map((key) => {
      const { mtime, size } = statSync(join(folder, key));
      return `<Contents><Key>${escape(key)}</Key><LastModified>${mtime.toISOString()}</LastModified><Size>${size}</Size></Contents>`;
    });
  xml(
    response,
    `<ListBucketResult><KeyCount>${items.length}</KeyCount><IsTruncated>false</IsTruncated>${items.join('')}</ListBucketResult>`,
  );
}

function sendObject(request: IncomingMessage, response: ServerResponse, file: string): void {
  const { size, mtime } = statSync(file);
  const range = /^bytes=(\d+)-(\d*)$/.exec(request.headers.range ?? '');
  const start = range ? Number(range[1]) : 0;
  const end = range?.[2] ? Math.min(Number(range[2]), size - 1) : size - 1;
  response.writeHead(range ? 206 : 200, {
    'content-length': Math.max(0, end - start + 1),
    'last-modified': mtime.toUTCString(),
    'accept-ranges': 'bytes',
    ...(range ? { 'content-range': `bytes ${start}-${end}/${size}` } : {}),
  });
  if (request.method === 'HEAD' || size === 0) response.end();
  else createReadStream(file, { start, end }).pipe(response);
}
