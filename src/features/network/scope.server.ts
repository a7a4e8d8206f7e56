import type { Actor } from '@/lib/actor';
import { notFound } from '@/lib/problem';
import { Community, Snapshot } from '@/server/models';
import { authorise, workspaceIds, type Access } from '@/features/workspaces/index.server';
import type { Action } from '@/features/workspaces';

/** @throws ProblemError 404 for outsiders, 403 where the role does not allow `action`. */
export async function communityFor(
  actor: Actor,
  id: string,
  action: Action,
): Promise<{ community: Community; access: Access }> {
  const community = await Community.findOne({ where: { id, workspaceId: workspaceIds(actor) } });
  if (!community) throw notFound();
  return { community, access: await authorise(actor, community.workspaceId, action) };
}

/**
 * A finished snapshot of one of the actor's workspaces.
 * @throws ProblemError 404 for outsiders, 403 where the role does not allow `action`.
 */
export async function snapshotFor(
  actor: Actor,
  id: string,
  action: Action,
): Promise<{ snapshot: Snapshot; access: Access }> {
  const snapshot = await Snapshot.findOne({
    where: { id, workspaceId: workspaceIds(actor), state: 'ready' },
  });
  if (!snapshot) throw notFound();
  return { snapshot, access: await authorise(actor, snapshot.workspaceId, action) };
}
