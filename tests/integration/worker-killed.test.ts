import { afterAll, beforeAll, expect, test } from 'vitest';
import type { Actor } from '@/lib/actor';
import { listObjects } from '@/server/storage';
import { makeCommunityWorld, type CommunityWorld } from '../factories/community-world';
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

const files = largeFiles();
const workers: RealWorker[] = [];
const newWorker = (): RealWorker => {
  const worker = RealWorker.start();
  workers.push(worker);
  return worker;
};
let world: CommunityWorld;
let actor: Actor;
let communityId: string;
let snapshotId: string;

beforeAll(async () => {
  world = await makeCommunityWorld();
  ({ actor, communityId } = world);
});
afterAll(async () => {
  for (const worker of workers) worker.kill();
  await world.close();
});

test(
  'an import whose worker was killed is finished by the next one: one snapshot, whole',
  { timeout: 120_000 },
  async () => {
    const first = newWorker();
    const job = await beginImport(actor, communityId, files);
    await midway(job, 0.3);
    first.kill();
    newWorker();
    expect(await ended(job)).toMatchObject({ state: 'succeeded', attempts: 2 });
    snapshotId = await expectOneSnapshot(actor, communityId, files.counts);
    expect(await listObjects('imports/')).toEqual([]);
  },
);

test('the same two files sent twice at once are one import', { timeout: 60_000 }, async () => {
  const [one, two] = await Promise.all([
    beginImport(actor, communityId, largeFiles(500, 4, 2)),
    beginImport(actor, communityId, largeFiles(500, 4, 2)),
  ]);
  expect(two).toBe(one);
  expect(await ended(one)).toMatchObject({ state: 'succeeded' });
  const { Snapshot } = await import('@/server/models');
  expect(await Snapshot.count({ where: { communityId } })).toBe(2);
});

test(
  'a reading whose worker was killed is finished by the next one, with the values of an undisturbed one',
  { timeout: 180_000 },
  async () => {
    const job = await beginReading(actor, snapshotId);
    await midway(job);
    for (const worker of workers) worker.kill();
    newWorker();
    const done = await ended(job);
    expect(done).toMatchObject({ state: 'succeeded', attempts: 2 });
    const { Reading } = await import('@/server/models');
    expect(await Reading.count({ where: { snapshotId } })).toBe(1);
    const values = await valuesOf(actor, done.result!.id);
    expect(values.trim().split('\n')).toHaveLength(files.counts.members + 1);
    // Asked again, the same reading is one and the same; so the first is taken away before it is computed anew.
    await Reading.destroy({ where: { id: done.result!.id } });
    const again = await ended(await beginReading(actor, snapshotId));
    expect(again.attempts).toBe(1);
    expect(await valuesOf(actor, again.result!.id)).toBe(values);
  },
);
