import type { Actor } from '@/lib/actor';
import { can } from '@/features/workspaces';
import { authorise } from '@/features/workspaces/index.server';
import { listCases } from './list.server';

const QUEUES = ['mine', 'open', 'watching', 'closed'] as const;
export type Queue = (typeof QUEUES)[number];

/**
 * The queue that the Cases place shows: the one asked for, else a person's own; and everybody's for who works no cases or
 * has none of their own.
 */
export async function queueFor(
  actor: Actor,
  workspaceId: string,
  communityId: string,
  asked: string | null,
): Promise<{ state: Queue; queue: Awaited<ReturnType<typeof listCases>> }> {
  const { role } = await authorise(actor, workspaceId, 'cases.read');
  const list = (state: Queue) =>
    listCases(actor, workspaceId, {
      community: communityId,
      state: state === 'mine' ? 'open' : state,
      limit: 200,
      ...(state === 'mine' ? { assignee: 'me' } : {}),
    });
  const state = QUEUES.find((one) => one === asked) ?? (can(role, 'cases.work') ? 'mine' : 'open');
  const queue = await list(state);
  return !asked && state === 'mine' && queue.items.length === 0
    ? { state: 'open', queue: await list('open') }
    : { state, queue };
}
