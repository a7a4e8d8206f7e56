import { randomBytes } from 'node:crypto';
import { Readable } from 'node:stream';
import { buffer } from 'node:stream/consumers';
import { beforeAll, expect, test } from 'vitest';
import { deleteObject, ensureBucket, getObject, listObjects, putObject } from '@/server/storage';

beforeAll(ensureBucket);

test.each([0, 10, 6_000_000, 13_000_000])('an object of %i bytes comes back as it went in', async (size) => {
  const bytes = randomBytes(size);
  const key = `test/${size}`;
  await putObject(key, Readable.from(size ? [bytes] : [], { objectMode: false }));
  expect((await buffer(await getObject(key))).equals(bytes)).toBe(true);
  expect((await listObjects('test/')).map((one) => one.key)).toContain(key);
  await deleteObject(key);
  expect((await listObjects('test/')).map((one) => one.key)).not.toContain(key);
  await expect(getObject(key)).rejects.toThrow();
});

test('an aborted upload leaves no object', async () => {
  const stop = new AbortController();
  async function* endless(): AsyncGenerator<Buffer> {
    for (let i = 0; ; i++) {
      yield Buffer.alloc(1_000_000);
      if (i === 12) stop.abort();
      await new Promise((resolve) => setTimeout(resolve, 2));
    }
  }
  const body = Readable.from(endless());
  await expect(putObject('test/aborted', body, stop.signal)).rejects.toThrow();
  body.destroy();
  expect((await listObjects('test/aborted')).length).toBe(0);
});
