import { createHash, randomBytes } from 'node:crypto';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { Readable } from 'node:stream';
import { buffer } from 'node:stream/consumers';
import {
  AbortMultipartUploadCommand,
  CompleteMultipartUploadCommand,
  CreateBucketCommand,
  CreateMultipartUploadCommand,
  DeleteObjectsCommand,
  GetObjectCommand,
  HeadBucketCommand,
  HeadObjectCommand,
  ListObjectsV2Command,
  ListPartsCommand,
  PutObjectCommand,
  S3Client,
  UploadPartCommand,
} from '@aws-sdk/client-s3';
import { createTransport } from 'nodemailer';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { startFakes, type Fakes } from '../fakes';
import type { CaughtMail } from '../fakes/mail';

const folder = mkdtempSync(join(tmpdir(), 'thrum-fakes-'));
const Bucket = 'trial';
let fakes: Fakes;
let s3: S3Client;

const client = (checksums: 'WHEN_REQUIRED' | 'WHEN_SUPPORTED'): S3Client =>
  new S3Client({
    endpoint: fakes.env.S3_ENDPOINT,
    region: 'local',
    forcePathStyle: true,
    credentials: { accessKeyId: 'local', secretAccessKey: 'local-only' },
    requestChecksumCalculation: checksums,
    responseChecksumValidation: checksums,
  });

beforeAll(async () => {
  fakes = await startFakes({ dataDir: folder });
  s3 = client('WHEN_REQUIRED');
  await expect(s3.send(new HeadBucketCommand({ Bucket }))).rejects.toThrow();
  await s3.send(new CreateBucketCommand({ Bucket }));
  await s3.send(new HeadBucketCommand({ Bucket }));
});

afterAll(async () => {
  await fakes.stop();
  rmSync(folder, { recursive: true, force: true });
});

async function read(Key: string, Range?: string): Promise<Buffer> {
  const { Body } = await s3.send(new GetObjectCommand({ Bucket, Key, Range }));
  return buffer(Body as Readable);
}

test('the entity tag of a put is the MD5 of its bytes, and head tells the size', async () => {
  const Body = randomBytes(70_000);
  const { ETag } = await s3.send(new PutObjectCommand({ Bucket, Key: 'a/one & <two>', Body }));
  expect(ETag).toBe(`"${createHash('md5').update(Body).digest('hex')}"`);
  const head = await s3.send(new HeadObjectCommand({ Bucket, Key: 'a/one & <two>' }));
  expect(head.ContentLength).toBe(70_000);
  expect((await read('a/one & <two>')).equals(Body)).toBe(true);
});

test.each([
  ['bytes=10-19', 10, 20],
  ['bytes=990-', 990, 1000],
  ['bytes=-5', 995, 1000],
  ['bytes=900-5000', 900, 1000],
])('a range %s is those bytes and no others', async (range, from, to) => {
  const Body = randomBytes(1000);
  await s3.send(new PutObjectCommand({ Bucket, Key: 'ranged', Body }));
  expect((await read('ranged', range)).equals(Body.subarray(from, to))).toBe(true);
});

test('a range outside the object is refused', async () => {
  await s3.send(new PutObjectCommand({ Bucket, Key: 'short', Body: 'abc' }));
  await expect(read('short', 'bytes=3-9')).rejects.toMatchObject({ name: 'InvalidRange' });
});

test('a streamed body in chunks with a trailing checksum is stored without its frames', async () => {
  const bytes = randomBytes(300_000);
  const framed = client('WHEN_SUPPORTED');
  await framed.send(
    new PutObjectCommand({
      Bucket,
      Key: 'framed',
      Body: Readable.from([bytes.subarray(0, 100_001), bytes.subarray(100_001)], { objectMode: false }),
      ContentLength: bytes.length,
    }),
  );
  framed.destroy();
  expect((await read('framed')).equals(bytes)).toBe(true);
});

test('a multipart upload is made of the parts that are named, in their order', async () => {
  const Key = 'parts';
  const { UploadId } = await s3.send(new CreateMultipartUploadCommand({ Bucket, Key }));
  const send = (PartNumber: number, Body: string) =>
    s3.send(new UploadPartCommand({ Bucket, Key, UploadId, PartNumber, Body }));
  const tags = new Map<number, string>();
  for (const [number, body] of [
    [2, 'second'],
    [1, 'first-'],
    [3, 'left out'],
  ] as const)
    tags.set(number, (await send(number, body)).ETag!);
  const listed = await s3.send(new ListPartsCommand({ Bucket, Key, UploadId }));
  expect(listed.Parts?.map((part) => part.PartNumber)).toEqual([1, 2, 3]);
  await expect(read(Key)).rejects.toMatchObject({ name: 'NoSuchKey' });
  await s3.send(
    new CompleteMultipartUploadCommand({
      Bucket,
      Key,
      UploadId,
      MultipartUpload: { Parts: [1, 2].map((PartNumber) => ({ PartNumber, ETag: tags.get(PartNumber) })) },
    }),
  );
  expect(String(await read(Key))).toBe('first-second');
});

test('an aborted multipart upload is gone', async () => {
  const Key = 'aborted';
  const { UploadId } = await s3.send(new CreateMultipartUploadCommand({ Bucket, Key }));
  await s3.send(new UploadPartCommand({ Bucket, Key, UploadId, PartNumber: 1, Body: 'x' }));
  await s3.send(new AbortMultipartUploadCommand({ Bucket, Key, UploadId }));
  await expect(s3.send(new ListPartsCommand({ Bucket, Key, UploadId }))).rejects.toMatchObject({
    name: 'NoSuchUpload',
  });
});

test('a listing comes in pages, in order, and several objects go in one call', async () => {
  const keys = Array.from({ length: 7 }, (_, i) => `many/${i}&`);
  for (const Key of keys) await s3.send(new PutObjectCommand({ Bucket, Key, Body: Key }));
  const found: string[] = [];
  let ContinuationToken: string | undefined;
  do {
    const page = await s3.send(
      new ListObjectsV2Command({ Bucket, Prefix: 'many/', MaxKeys: 3, ContinuationToken }),
    );
    expect(page.Contents!.length).toBeLessThanOrEqual(3);
    found.push(...page.Contents!.map((one) => one.Key!));
    ContinuationToken = page.NextContinuationToken;
  } while (ContinuationToken);
  expect(found).toEqual(keys);
  await s3.send(
    new DeleteObjectsCommand({ Bucket, Delete: { Objects: keys.slice(1).map((Key) => ({ Key })) } }),
  );
  const { Contents } = await s3.send(new ListObjectsV2Command({ Bucket, Prefix: 'many/' }));
  expect(Contents?.map((one) => one.Key)).toEqual([keys[0]]);
});

test('no key reaches outside the store', async () => {
  const answer = await fetch(`${fakes.env.S3_ENDPOINT}/${Bucket}/..%2F..%2F..%2Fetc%2Fpasswd`);
  expect(answer.status).toBe(404);
});

test('a mail is caught, listed, read alone, and can be waited for by its receiver', async () => {
  const transport = createTransport(fakes.env.SMTP_URL);
  const waiting = fetch(`${fakes.env.MAIL_FAKE_URL}/wait?to=nora@person.example&ms=5000`);
  for (const to of ['olaf@person.example', 'nora@person.example'])
    await transport.sendMail({ from: 'a@b.example', to, subject: `For ${to} – ü`, text: 'Read me.' });
  const waited = (await (await waiting).json()) as CaughtMail;
  expect(waited).toMatchObject({ to: ['nora@person.example'], subject: 'For nora@person.example – ü' });
  const list = (await (await fetch(`${fakes.env.MAIL_FAKE_URL}/mails`)).json()) as CaughtMail[];
  expect(list).toHaveLength(2);
  const one = await fetch(`${fakes.env.MAIL_FAKE_URL}/mails/${waited.id}`);
  expect(((await one.json()) as CaughtMail).text.trim()).toBe('Read me.');
  expect((await fetch(`${fakes.env.MAIL_FAKE_URL}/wait?to=nobody@person.example&ms=100`)).status).toBe(404);
});
