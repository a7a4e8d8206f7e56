import { chmodSync, mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { ensurePostgres } from '../../db/postgres/index.mjs';
import { migrate } from '../../db/migrate';
import type { Actor } from '@/lib/actor';
import { settleCommunity } from '../factories/community-world';
import { largeFiles } from '../factories/large-files';
import {
  beginImport,
  beginReading,
  ended,
  expectOneSnapshot,
  midway,
  valuesOf,
} from './processes/interrupted';
import { RealWorker } from './processes/real-worker';

/** A cluster of this file's own: the others' would lose their connections with it. */
const folder = mkdtempSync(join(tmpdir(), 'thrum-restart-'));
const files = largeFiles();
let postgres: Awaited<ReturnType<typeof ensurePostgres>>;
let worker: RealWorker;
let actor: Actor;
let communityId: string;
let snapshotId: string;

const postmasters: number[] = [];
/** Ends the server as a crash would, without a checkpoint; it is brought up again as under `npm start`. */
function crash(): void {
  const pid = Number(readFileSync(join(folder, 'postgres/data/postmaster.pid'), 'utf8').split('\n')[0]);
  expect(postmasters).not.toContain(pid);
  postmasters.push(pid);
  process.kill(pid, 'SIGQUIT');
}

beforeAll(async () => {
  chmodSync(folder, 0o711);
  postgres = await ensurePostgres({ dataDir: folder });
  process.env.DATABASE_URL = postgres.url;
  await migrate(postgres.url);
  ({ actor, communityId } = await settleCommunity());
  worker = RealWorker.start(true);
}, 60_000);

afterAll(async () => {
  worker?.kill();
  const { sequelize } = await import('@/server/models');
  await sequelize.close().catch(() => undefined);
  await postgres.stop();
  rmSync(folder, { recursive: true, force: true });
});

test('PostgreSQL crashes during an import: it is finished once, whole', { timeout: 150_000 }, async () => {
  const job = await beginImport(actor, communityId, files);
  // While its rows are being written.
  await midway(job, 0.61);
  crash();
  const done = await ended(job, 120);
  expect(done).toMatchObject({ state: 'succeeded', error: null });
  expect(done.attempts).toBeGreaterThan(1);
  snapshotId = await expectOneSnapshot(actor, communityId, files.counts);
});

test('PostgreSQL crashes during a reading: it is finished once, whole', { timeout: 150_000 }, async () => {
  const job = await beginReading(actor, snapshotId);
  await midway(job);
  crash();
  const done = await ended(job, 120);
  expect(done).toMatchObject({ state: 'succeeded', error: null });
  const { Reading } = await import('@/server/models');
  expect(await Reading.count({ where: { snapshotId } })).toBe(1);
  expect((await valuesOf(actor, done.result!.id)).trim().split('\n')).toHaveLength(files.counts.members + 1);
});
