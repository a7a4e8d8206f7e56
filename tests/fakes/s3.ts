import { randomUUID } from 'node:crypto';
import { existsSync, mkdirSync, rmSync } from 'node:fs';
import { createServer, type IncomingMessage, type ServerResponse } from 'node:http';
import type { AddressInfo } from 'node:net';
import { join } from 'node:path';
import { text } from 'node:stream/consumers';
import { escapeXml, refuse, sendObject, unescapeXml, xml } from './s3-answers';
import { listObjects } from './s3-list';
import { multipartCall, receive } from './s3-upload';

export interface S3Fake {
  readonly endpoint: string;
  stop(): Promise<void>;
}

/** Whether a bucket or key stays inside the folder that it is kept in. */
const inside = (name: string): boolean => !name.split('/').includes('..') && !name.includes('\0');

/**
 * A small S3-compatible store on loopback, path style, files under `folder`: put, get (with ranges), head, delete,
 * list and multipart uploads through the SDK, and presigned addresses. Signatures are not checked.
 */
export async function startS3Fake(folder: string): Promise<S3Fake> {
  const objects = join(folder, 'objects');
  const uploads = join(folder, 'uploads');
  mkdirSync(objects, { recursive: true });

  const handle = async (request: IncomingMessage, response: ServerResponse): Promise<void> => {
    const { pathname, searchParams: query } = new URL(request.url ?? '/', 'http://s3.local');
    const [bucket = '', ...rest] = pathname.slice(1).split('/');
    const key = decodeURIComponent(rest.join('/'));
    if (!inside(bucket) || !inside(key)) return refuse(response, 'NoSuchKey');
    const bucketFolder = join(objects, bucket);
    if (!key) return bucketCall(request, response, query, bucketFolder);
    const { method } = request;
    const file = join(bucketFolder, key);
    if (method === 'POST' && query.has('uploads')) {
      const id = randomUUID();
      mkdirSync(join(uploads, id), { recursive: true });
      return xml(
        response,
        `<InitiateMultipartUploadResult><Bucket>${bucket}</Bucket><Key>${escapeXml(key)}</Key><UploadId>${id}</UploadId></InitiateMultipartUploadResult>`,
      );
    }
    const upload = query.get('uploadId');
    if (upload !== null)
      return multipartCall(request, response, {
        folder: join(uploads, upload.replaceAll(/[^\w-]/g, '') || 'none'),
        query,
        file,
        key,
      });
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
      return method === 'HEAD' ? void response.writeHead(404).end() : refuse(response, 'NoSuchKey');
    sendObject(request, response, file);
  };

  const server = createServer((request, response) => {
    handle(request, response).catch((error: Error) => {
      if (response.headersSent) response.destroy();
      else
        xml(
          response,
          `<Error><Code>InternalError</Code><Message>${escapeXml(error.message)}</Message></Error>`,
          500,
        );
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

/** CreateBucket, HeadBucket, DeleteObjects and ListObjectsV2. */
async function bucketCall(
  request: IncomingMessage,
  response: ServerResponse,
  query: URLSearchParams,
  folder: string,
): Promise<void> {
  const { method } = request;
  if (method === 'PUT') {
    mkdirSync(folder, { recursive: true });
    response.writeHead(200).end();
    return;
  }
  if (!existsSync(folder))
    return method === 'HEAD' ? void response.writeHead(404).end() : refuse(response, 'NoSuchBucket');
  if (method === 'HEAD') return void response.writeHead(200).end();
  if (method === 'POST' && query.has('delete')) {
    const keys = [...(await text(request)).matchAll(/<Key>([^<]*)<\/Key>/g)].map((one) =>
      unescapeXml(one[1]!),
    );
    for (const key of keys.filter(inside)) rmSync(join(folder, key), { force: true });
    const deleted = keys.map((key) => `<Deleted><Key>${escapeXml(key)}</Key></Deleted>`);
    return xml(response, `<DeleteResult>${deleted.join('')}</DeleteResult>`);
  }
  xml(response, listObjects(folder, query));
}
