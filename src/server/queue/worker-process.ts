import { randomUUID } from 'node:crypto';
import { Logger, run, type Runner } from 'graphile-worker';
import { QueryTypes } from 'sequelize';
import type { ProblemDocument } from '@/lib/problem';
import { config } from '../config';
import { log } from '../log';
import { Job, sequelize, WorkerProcess } from '../models';
import type { JobRegistry } from './context';
import { runJob } from './run-job';

const BEAT = 2_000;
/** A job whose heartbeat is older than this has lost its worker. */
const LOST_AFTER_SECONDS = 15;

/** The queue's own lines, with ours; only what went wrong. */
const quietLogger = new Logger(() => (level, message) => {
  if (level === 'error' || level === 'warning') log.warn({ queue: message }, 'queue');
});

const givenUp: ProblemDocument = {
  type: 'urn:thrum:problem:given-up',
  title: 'This could not be finished.',
  status: 500,
  detail: 'Its worker stopped several times. Nothing was kept; try again.',
};

/** Ends jobs that have used up their attempts, and marks their targets, so that a person can try again. */
async function giveUp(registry: JobRegistry): Promise<void> {
  const spent = await sequelize.query<{ id: string; kind: string; target_id: string }>(
    `SELECT id, kind, target_id FROM jobs WHERE state = 'queued' AND attempts >= 5 AND NOT EXISTS (
       SELECT 1 FROM graphile_worker._private_jobs q WHERE q.key = jobs.id::text AND q.attempts < q.max_attempts)`,
    { type: QueryTypes.SELECT },
  );
  for (const job of spent) {
    const ended = await registry[job.kind]?.ended?.();
    await ended?.(job.target_id, 'failed');
    await Job.update(
      { state: 'failed', finishedAt: new Date(), workerId: null, error: givenUp },
      { where: { id: job.id, state: 'queued' } },
    );
  }
}

/** Gives jobs of dead workers back to the queue, and ends jobs that have used up their attempts. */
export async function sweep(registry: JobRegistry): Promise<void> {
  // Also those leased by a worker that died before it marked them as running, or after it gave them up.
  const lost = await sequelize.query<{ id: string }>(
    `SELECT id FROM jobs WHERE state = 'running' AND heartbeat_at < now() - make_interval(secs => $1)
     UNION ALL
     SELECT jobs.id FROM jobs JOIN graphile_worker._private_jobs q ON q.key = jobs.id::text
     WHERE jobs.state = 'queued' AND q.locked_at < now() - make_interval(secs => $1)`,
    { bind: [LOST_AFTER_SECONDS], type: QueryTypes.SELECT },
  );
  for (const job of lost) {
    await sequelize.query(
      `UPDATE graphile_worker._private_jobs SET locked_at = NULL, locked_by = NULL, run_at = now() WHERE key = $1`,
      { bind: [job.id] },
    );
    await sequelize.query(
      `UPDATE jobs SET state = 'queued', worker_id = NULL, step = 'Waiting to try again' WHERE id = $1 AND state = 'running'`,
      { bind: [job.id] },
    );
    log.warn({ jobId: job.id }, 'a job lost its worker and goes back to the queue');
  }
  await giveUp(registry);
}

/**
 * Runs jobs until told to stop: leases them from the queue, keeps its own heartbeat for readiness,
 * and sweeps up after workers that died.
 */
export async function startWorker(
  registry: JobRegistry,
  concurrency = 2,
): Promise<{ stop(): Promise<void>; done: Promise<void> }> {
  const workerId = randomUUID();
  const stopping = new AbortController();
  const runner: Runner = await run({
    connectionString: config().DATABASE_URL,
    concurrency,
    noHandleSignals: true,
    pollInterval: 2_000,
    maxPoolSize: concurrency + 2,
    crontab: '',
    logger: quietLogger,
    taskList: {
      run: async (payload) => {
        const { jobId } = payload as { jobId: string };
        await runJob(registry, jobId, workerId, stopping.signal);
      },
    },
  });
  const beat = async (): Promise<void> => {
    await WorkerProcess.upsert({ id: workerId, heartbeatAt: new Date() });
    await sweep(registry);
  };
  await beat();
  const timer = setInterval(
    () => void beat().catch((err: unknown) => log.warn({ err }, 'worker heartbeat missed')),
    BEAT,
  );
  return {
    done: runner.promise,
    stop: async () => {
      clearInterval(timer);
      stopping.abort();
      await runner.stop();
      await WorkerProcess.destroy({ where: { id: workerId } }).catch(() => undefined);
    },
  };
}
