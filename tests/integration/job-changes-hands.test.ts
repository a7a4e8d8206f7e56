import { QueryTypes } from 'sequelize';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { listObjects } from '@/server/storage';
import { makeCommunityWorld, type CommunityWorld } from '../factories/community-world';
import { largeFiles } from '../factories/large-files';
import { runQueued } from '../factories/imports';
import { hold } from './processes/hold';
import { beginImport, beginReading, expectOneSnapshot, valuesOf } from './processes/interrupted';
import { until } from './processes/until';

/** Jobs that two workers take for their own, that nobody starts, and that are given up: each has one end. */
const files = largeFiles(600, 5, 3);
let world: CommunityWorld;
let models: typeof import('@/server/models');

beforeAll(async () => {
  world = await makeCommunityWorld();
  models = await import('@/server/models');
});
afterAll(() => world.close());

/** Runs a job as a worker of this name would; what it throws is for the queue to see. */
async function runAs(worker: string, jobId: string): Promise<void> {
  const { runJob } = await import('@/server/queue');
  const { registry } = await import('@/jobs');
  await runJob(registry, jobId, worker, new AbortController().signal);
}

const sweep = async (): Promise<void> => {
  const queue = await import('@/server/queue');
  await queue.sweep((await import('@/jobs')).registry);
};

/** Sessions of this database that wait for a lock of another. */
async function waiting(): Promise<number> {
  const [row] = await models.sequelize.query<{ count: number }>(
    `SELECT count(DISTINCT l.pid)::int AS count FROM pg_locks l JOIN pg_stat_activity a ON a.pid = l.pid
     WHERE NOT l.granted AND a.datname = current_database()`,
    { type: QueryTypes.SELECT },
  );
  return row!.count;
}

/** Two runs of one job that both reach the saving of their rows, as when a worker slept through its lease. */
async function runTwice(jobId: string, table: string): Promise<PromiseSettledResult<void>[]> {
  const release = await hold(table);
  const first = runAs('sleeper', jobId);
  await until(async () => (await waiting()) === 1);
  const second = runAs('successor', jobId);
  await until(async () => (await waiting()) === 2);
  const both = Promise.allSettled([first, second]);
  await release();
  return both;
}

const expectOneEnd = async (jobId: string, runs: PromiseSettledResult<void>[]): Promise<void> => {
  // The run that lost its job says so to the queue, and changes nothing.
  expect(runs.map((run) => run.status)).toEqual(['rejected', 'fulfilled']);
  expect(await models.Job.findByPk(jobId)).toMatchObject({ state: 'succeeded', attempts: 2, error: null });
};

test('an import that two workers run at once is made once, and its job succeeds', async () => {
  const job = await beginImport(world.actor, world.communityId, files);
  await expectOneEnd(job, await runTwice(job, 'ties'));
  await expectOneSnapshot(world.actor, world.communityId, files.counts);
  expect(await models.Import.count({ where: { state: 'accepted' } })).toBe(1);
  expect(await listObjects('imports/')).toEqual([]);
});

test('a reading that two workers run at once is made once, and its job succeeds', async () => {
  const snapshot = (await models.Snapshot.findOne({ where: { communityId: world.communityId } }))!;
  const job = await beginReading(world.actor, snapshot.id);
  await expectOneEnd(job, await runTwice(job, 'reading_members'));
  const reading = await models.Reading.findOne({ where: { snapshotId: snapshot.id } });
  expect((await valuesOf(world.actor, reading!.id)).trim().split('\n')).toHaveLength(
    files.counts.members + 1,
  );
});

test('a job whose worker died between leasing and starting it goes back to the queue', async () => {
  const job = await beginImport(world.actor, world.communityId, largeFiles(50, 3, 4));
  const lease = (since: string) =>
    models.sequelize.query(
      `UPDATE graphile_worker._private_jobs SET locked_at = now() - $2::interval, locked_by = 'dead' WHERE key = $1`,
      { bind: [job, since], type: QueryTypes.UPDATE },
    );
  const leased = async (): Promise<boolean> => {
    const [row] = await models.sequelize.query<{ locked_by: string | null }>(
      'SELECT locked_by FROM graphile_worker._private_jobs WHERE key = $1',
      { bind: [job], type: QueryTypes.SELECT },
    );
    return row!.locked_by !== null;
  };
  // A worker that has only just taken it is left alone.
  await lease('1 second');
  await sweep();
  expect(await leased()).toBe(true);
  await lease('1 minute');
  await sweep();
  expect(await leased()).toBe(false);
  expect((await runQueued(job)).state).toBe('succeeded');
});

test('a job out of attempts fails with a reason, and the same upload can be sent again', async () => {
  const unlucky = largeFiles(50, 3, 5);
  const job = await beginImport(world.actor, world.communityId, unlucky);
  await models.Job.update({ attempts: 5 }, { where: { id: job } });
  await models.sequelize.query(
    'UPDATE graphile_worker._private_jobs SET attempts = max_attempts WHERE key = $1',
    { bind: [job], type: QueryTypes.UPDATE },
  );
  await sweep();
  const given = (await models.Job.findByPk(job))!;
  expect(given).toMatchObject({ state: 'failed', error: { title: 'This could not be finished.' } });
  expect((await models.Import.findByPk(given.targetId))!.state).toBe('failed');
  expect(await listObjects('imports/')).toEqual([]);
  const again = await beginImport(world.actor, world.communityId, unlucky);
  expect(again).not.toBe(job);
  expect((await runQueued(again)).state).toBe('succeeded');
  expect(await listObjects('imports/')).toEqual([]);
});
