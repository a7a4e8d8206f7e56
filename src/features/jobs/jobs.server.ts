import type { Actor } from '@/lib/actor';
import { forbidden, notFound } from '@/lib/problem';
import { Job } from '@/server/models';
import { authorise, workspaceIds } from '@/features/workspaces/index.server';
import type { JobView } from './jobs';

/** Field whitelist of a job; a failed job's error is a problem document already. */
export const presentJob = (job: Job): JobView => ({
  id: job.id,
  kind: job.kind,
  state: job.state,
  progress: job.progress,
  step: job.step,
  error: job.error ? { ...job.error } : null,
  result: job.result ?? null,
  createdAt: job.createdAt.toISOString(),
  finishedAt: job.finishedAt?.toISOString() ?? null,
});

/** @throws ProblemError 404 for outsiders, 403 for viewers. */
export async function jobFor(actor: Actor, id: string): Promise<Job> {
  const job = await Job.findOne({ where: { id, workspaceId: workspaceIds(actor) } });
  if (!job?.workspaceId) throw notFound();
  await authorise(actor, job.workspaceId, 'explore.open');
  return job;
}

/** Asks a job to stop: at once when it is still waiting, else as soon as its worker hears of it. */
export async function cancelJob(actor: Actor, id: string): Promise<Job> {
  const job = await jobFor(actor, id);
  const access = await authorise(actor, job.workspaceId!, 'explore.open');
  if (job.createdBy !== actor.userId && !access.can('workspace.manage'))
    throw forbidden('Only the person who started this, or an admin, can stop it.');
  if (job.state === 'queued' || job.state === 'running') await job.update({ cancelRequested: true });
  return job;
}

const ENDED = new Set(['succeeded', 'failed', 'cancelled']);
const POLL = 400;

/** The job as server-sent events: one `job` event whenever it changed, the last when it has ended. */
export function jobEvents(id: string, signal: AbortSignal): ReadableStream<Uint8Array> {
  const encoder = new TextEncoder();
  let open = true;
  signal.addEventListener('abort', () => (open = false));
  return new ReadableStream({
    async start(controller) {
      let last = '';
      while (open) {
        const job = await Job.findByPk(id).catch(() => undefined);
        if (job === null) break;
        const data = job ? JSON.stringify(presentJob(job)) : last;
        // A comment line keeps proxies from closing a quiet stream.
        controller.enqueue(
          encoder.encode(data !== last ? `event: job\ndata: ${data}\n\n` : ': still here\n\n'),
        );
        last = data;
        if (job && ENDED.has(job.state)) break;
        await new Promise((resolve) => setTimeout(resolve, POLL));
      }
      if (open) controller.close();
    },
    cancel: () => {
      open = false;
    },
  });
}
