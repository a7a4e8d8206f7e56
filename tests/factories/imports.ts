import type { Actor } from '@/lib/actor';
import type { JobView } from '@/features/jobs';
import { call } from '../integration/call';

export interface UploadFiles {
  readonly ties?: string | Uint8Array<ArrayBuffer>;
  readonly members?: string | Uint8Array<ArrayBuffer>;
  readonly options?: unknown;
}

/** A multipart request as a browser would send it. */
export function uploadRequest({ ties, members, options }: UploadFiles): Request {
  const form = new FormData();
  if (options !== undefined)
    form.set('options', typeof options === 'string' ? options : JSON.stringify(options));
  if (ties !== undefined) form.set('ties', new Blob([ties]), 'ties.csv');
  if (members !== undefined) form.set('members', new Blob([members]), 'members.csv');
  return new Request('http://thrum.test/api', { method: 'POST', body: form });
}

/** Uploads through the endpoint. */
export async function upload(actor: Actor, communityId: string, files: UploadFiles): Promise<Response> {
  const { POST } = await import('@/pages/api/v1/communities/[community]/imports');
  return call(POST, { actor, params: { community: communityId }, request: uploadRequest(files) });
}

/** Runs a queued job in this process, as a worker would. */
export async function runQueued(jobId: string): Promise<JobView> {
  const { runJob } = await import('@/server/queue');
  const { Job } = await import('@/server/models');
  const { registry } = await import('@/jobs');
  await runJob(registry, jobId, 'test', new AbortController().signal);
  const { presentJob } = await import('@/features/jobs/index.server');
  return presentJob((await Job.findByPk(jobId))!);
}

/** A workspace with one community and a person of each role asked for. */
export async function makeCommunity(): Promise<{ workspaceId: string; communityId: string }> {
  const { Community, Workspace } = await import('@/server/models');
  const workspace = await Workspace.create({ name: 'Estuary' });
  const community = await Community.create({ workspaceId: workspace.id, name: 'Growers' });
  return { workspaceId: workspace.id, communityId: community.id };
}
