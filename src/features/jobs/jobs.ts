import * as z from 'zod';
import { idSchema } from '@/lib/ids';
import { operation } from '@/lib/operation';

export const jobSchema = z
  .object({
    id: z.string(),
    kind: z.string(),
    state: z.enum(['queued', 'running', 'succeeded', 'failed', 'cancelled']),
    progress: z.number().min(0).max(1),
    step: z.string(),
    error: z
      .looseObject({ type: z.string(), title: z.string(), status: z.number(), detail: z.string() })
      .nullable(),
    result: z.object({ kind: z.string(), id: z.string(), href: z.string() }).nullable(),
    createdAt: z.string(),
    finishedAt: z.string().nullable(),
  })
  .meta({ id: 'Job' });
export type JobView = z.infer<typeof jobSchema>;

/** Body of every 202 answer. */
export const acceptedSchema = z.object({ job: jobSchema });

const params = z.object({ job: idSchema });

export const jobOperations = {
  get: operation({
    id: 'getJob',
    method: 'get',
    path: '/api/v1/jobs/{job}',
    summary: 'One background job',
    tag: 'Jobs',
    access: 'person',
    params,
    status: 200,
    response: jobSchema,
  }),
  events: operation({
    id: 'followJob',
    method: 'get',
    path: '/api/v1/jobs/{job}/events',
    summary: 'The job as server-sent events, until it ends',
    tag: 'Jobs',
    access: 'person',
    params,
    status: 200,
    produces: 'text/event-stream',
  }),
  cancel: operation({
    id: 'cancelJob',
    method: 'delete',
    path: '/api/v1/jobs/{job}',
    summary: 'Ask a job to stop',
    tag: 'Jobs',
    access: 'person',
    params,
    status: 200,
    response: jobSchema,
  }),
};
