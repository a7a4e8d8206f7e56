import { ConnectionError, DatabaseError, type InferAttributes, type WhereOptions } from 'sequelize';
import { ProblemError, type ProblemDocument } from '@/lib/problem';
import { log } from '../log';
import { Job } from '../models';
import type { JobContext, JobKind, JobRegistry } from './context';

const REPORT_EVERY = 250;

/** SQLSTATE classes for a server that is stopping, starting or unreachable. */
const isOutage = (error: unknown): boolean => {
  if (error instanceof ConnectionError) return true;
  const cause = error instanceof DatabaseError ? error.original : error;
  const code = (cause as { code?: string } | null)?.code ?? '';
  const message = cause instanceof Error ? cause.message : '';
  return (
    /^(57P0|08|ECONNREFUSED|ECONNRESET|EPIPE)/.test(code) ||
    /Connection terminated|Client has encountered a connection error/.test(message)
  );
};

const cancelled: ProblemDocument = {
  type: 'urn:thrum:problem:cancelled',
  title: 'Stopped.',
  status: 409,
  detail: 'Somebody stopped this. Nothing was kept.',
};

function problemOf(error: unknown, jobId: string): ProblemDocument {
  if (error instanceof ProblemError) return error.toDocument();
  const incident = jobId.slice(-8);
  return {
    type: 'urn:thrum:problem:internal',
    title: 'Something went wrong on our side.',
    status: 500,
    detail: `Nothing was kept. Try again; if it happens again, quote ${incident}.`,
  };
}

/** The job belongs to another run by now: this one must change nothing any more. */
class SupersededError extends Error {
  override readonly name = 'SupersededError';
}

/**
 * The row of a job as this run left it. Changes it only while it is this run's: a worker that slept through its lease
 * finds its job taken over when it wakes, maybe by itself.
 */
const ownRow = (job: Job): WhereOptions<InferAttributes<Job>> => ({
  id: job.id,
  workerId: job.workerId,
  attempts: job.attempts,
  state: 'running',
});

async function update(job: Job, values: Partial<InferAttributes<Job>>): Promise<void> {
  const [count] = await Job.update(values, { where: ownRow(job) });
  // Thrown, not returned: a run that ends well takes the entry out of the queue, which the other run still needs.
  if (count === 0) throw new SupersededError(`Job ${job.id} was given to another run.`);
}

async function settle(
  job: Job,
  kind: JobKind,
  state: 'failed' | 'cancelled',
  error: ProblemDocument,
): Promise<void> {
  // Before the target is touched, too.
  await update(job, { heartbeatAt: new Date() });
  const ended = await kind.ended?.();
  await ended?.(job.targetId, state);
  await update(job, { state, error, finishedAt: new Date(), workerId: null });
}

/**
 * Runs one job to an end state. Outages are thrown on, so that the queue tries again;
 * every other error is the job's own and is kept with it.
 */
export async function runJob(
  registry: JobRegistry,
  jobId: string,
  workerId: string,
  stopping: AbortSignal,
): Promise<void> {
  const job = await Job.findByPk(jobId);
  if (!job || job.state === 'succeeded' || job.state === 'failed' || job.state === 'cancelled') return;
  const kind = registry[job.kind];
  if (!kind) throw new Error(`No handler for jobs of kind ${job.kind}`);
  await job.update({
    state: 'running',
    workerId,
    attempts: job.attempts + 1,
    startedAt: job.startedAt ?? new Date(),
    heartbeatAt: new Date(),
    progress: 0,
    step: 'Starting',
  });
  if (job.cancelRequested) return settle(job, kind, 'cancelled', cancelled);

  const stop = new AbortController();
  const onStopping = (): void => stop.abort('worker-stopping');
  stopping.addEventListener('abort', onStopping);
  let latest: { progress: number; step: string } | null = null;
  // One timer writes progress, keeps the lease alive and hears of a cancel.
  const beat = setInterval(() => {
    const report = latest;
    latest = null;
    void update(job, { ...report, heartbeatAt: new Date() })
      .then(() => Job.findByPk(jobId, { attributes: ['cancelRequested'] }))
      .then((row) => {
        if (!row || row.cancelRequested) stop.abort('cancelled');
      })
      .catch((error: unknown) => {
        if (error instanceof SupersededError) stop.abort('superseded');
        else log.warn({ jobId, err: error }, 'heartbeat missed');
      });
  }, REPORT_EVERY);
  const context: JobContext = {
    jobId,
    targetId: job.targetId,
    workspaceId: job.workspaceId,
    createdBy: job.createdBy,
    attempt: job.attempts,
    signal: stop.signal,
    progress: (done, step) => {
      latest = { progress: Math.min(1, Math.max(0, done)), step };
    },
  };
  try {
    const handler = await kind.load();
    const result = await handler(context);
    clearInterval(beat);
    await update(job, {
      state: 'succeeded',
      progress: 1,
      step: 'Done',
      result,
      error: null,
      finishedAt: new Date(),
      workerId: null,
    });
  } catch (error) {
    clearInterval(beat);
    if (stop.signal.aborted && stop.signal.reason === 'cancelled')
      return await settle(job, kind, 'cancelled', cancelled);
    if (error instanceof SupersededError || stop.signal.reason === 'superseded') throw error;
    if (isOutage(error) || (stop.signal.aborted && stop.signal.reason === 'worker-stopping')) {
      await update(job, { state: 'queued', step: 'Waiting to try again', workerId: null }).catch(
        () => undefined,
      );
      throw error;
    }
    if (!(error instanceof ProblemError)) log.error({ jobId, err: error }, 'job failed');
    await settle(job, kind, 'failed', problemOf(error, jobId));
  } finally {
    clearInterval(beat);
    stopping.removeEventListener('abort', onStopping);
  }
}
