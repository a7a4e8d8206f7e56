import type { Readable } from 'node:stream';
import {
  DeleteObjectCommand,
  GetObjectCommand,
  HeadBucketCommand,
  CreateBucketCommand,
  ListObjectsV2Command,
  S3Client,
} from '@aws-sdk/client-s3';
import { Upload } from '@aws-sdk/lib-storage';
import { config } from './config';

let client: S3Client | undefined;

function s3(): S3Client {
  const { S3_ENDPOINT, S3_REGION, S3_ACCESS_KEY_ID, S3_SECRET_ACCESS_KEY } = config();
  client ??= new S3Client({
    endpoint: S3_ENDPOINT,
    region: S3_REGION,
    forcePathStyle: true,
    credentials: { accessKeyId: S3_ACCESS_KEY_ID, secretAccessKey: S3_SECRET_ACCESS_KEY },
    // Streamed puts with trailing checksums are not understood by every S3-compatible store.
    requestChecksumCalculation: 'WHEN_REQUIRED',
    responseChecksumValidation: 'WHEN_REQUIRED',
  });
  return client;
}

const bucket = (): string => config().S3_BUCKET;

/** Makes the bucket if it is missing; called once when a process starts. */
export async function ensureBucket(): Promise<void> {
  try {
    await s3().send(new HeadBucketCommand({ Bucket: bucket() }));
  } catch {
    await s3().send(new CreateBucketCommand({ Bucket: bucket() }));
  }
}

/** Streams `body` into object `key`; memory stays at a few parts of 5 MB whatever the size. */
export async function putObject(key: string, body: Readable, signal?: AbortSignal): Promise<void> {
  const upload = new Upload({
    client: s3(),
    params: { Bucket: bucket(), Key: key, Body: body },
    queueSize: 2,
  });
  const abort = (): void => void upload.abort();
  signal?.addEventListener('abort', abort);
  try {
    await upload.done();
  } finally {
    signal?.removeEventListener('abort', abort);
  }
}

/** Opens object `key` as a stream. */
export async function getObject(key: string): Promise<Readable> {
  const { Body } = await s3().send(new GetObjectCommand({ Bucket: bucket(), Key: key }));
  if (!Body) throw new Error('The object has no body.');
  return Body as Readable;
}

export async function deleteObject(key: string): Promise<void> {
  await s3().send(new DeleteObjectCommand({ Bucket: bucket(), Key: key }));
}

/** Keys and times of the objects under a prefix, a thousand at a time. */
export async function listObjects(prefix: string): Promise<{ key: string; modified: Date }[]> {
  const found: { key: string; modified: Date }[] = [];
  let token: string | undefined;
  do {
    const page = await s3().send(
      new ListObjectsV2Command({ Bucket: bucket(), Prefix: prefix, ContinuationToken: token }),
    );
    for (const item of page.Contents ?? []) found.push({ key: item.Key!, modified: item.LastModified! });
    token = page.NextContinuationToken;
  } while (token);
  return found;
}
