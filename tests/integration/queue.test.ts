import { spawn, type ChildProcess } from 'node:child_process';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { createTestDatabase, type TestDatabase } from './database';
import { until } from './processes/until';

let database: TestDatabase;
let models: typeof import('@/server/models');
let queue: typeof import('@/server/queue');
const processes: ChildProcess[] = [];

beforeAll(async () => {
  database = await createTestDatabase();
  models = await import('@/server/models');
  queue = await import('@/server/queue');
});

afterAll(async () => {
  for (const one of processes) one.kill('SIGKILL');
  await models.sequelize.close();
  await database.drop();
});

async function startSlowWorker(): Promise<ChildProcess> {
  const child = spawn(process.execPath, ['--import', 'tsx', 'tests/integration/processes/slow-worker.ts'], {
    env: process.env,
    stdio: ['ignore', 'pipe', 'inherit'],
  });
  processes.push(child);
  await new Promise<void>((resolve) => child.stdout!.once('data', () => resolve()));
  return child;
}

const newJob = (): Promise<string> =>
  models.sequelize.transaction(async (transaction) => {
    const job = await queue.enqueue(
      { kind: 'count', targetId: 'target', workspaceId: null, createdBy: null },
      transaction,
    );
    return job.id;
  });

const inState = (id: string, state: string) => async () => {
  const job = await models.Job.findByPk(id);
  return job?.state === state ? job : null;
};

test('a rolled-back transaction leaves neither a job nor a queue entry', async () => {
  await expect(
    models.sequelize.transaction(async (transaction) => {
      await queue.enqueue(
        { kind: 'count', targetId: 'gone', workspaceId: null, createdBy: null },
        transaction,
      );
      throw new Error('no');
    }),
  ).rejects.toThrow('no');
  expect(await models.Job.count({ where: { targetId: 'gone' } })).toBe(0);
});

test('a job whose worker was killed is finished by the next one, once, with true progress', async () => {
  const first = await startSlowWorker();
  const id = await newJob();
  const running = await until(async () => {
    const job = await models.Job.findByPk(id);
    return job && job.state === 'running' && job.progress > 0 ? job : null;
  });
  expect(running.step).toMatch(/^Step \d+ of 16$/);
  first.kill('SIGKILL');
  await startSlowWorker();
  const done = await until(inState(id, 'succeeded'));
  expect(done.attempts).toBe(2);
  expect(done.progress).toBe(1);
  expect(done.result).toEqual({ kind: 'count', id: 'target', href: '/' });
});

test('a running job stops when asked, and says so', async () => {
  const id = await newJob();
  await until(inState(id, 'running'));
  await models.Job.update({ cancelRequested: true }, { where: { id } });
  const job = await until(inState(id, 'cancelled'));
  expect(job.error?.title).toBe('Stopped.');
  expect(job.finishedAt).not.toBeNull();
});

test('a job that ended is not run again', async () => {
  const id = await newJob();
  const job = await until(inState(id, 'succeeded'));
  await queue.runJob({}, id, 'another', new AbortController().signal);
  expect((await models.Job.findByPk(id))?.attempts).toBe(job.attempts);
});
