import type { Actor } from '@/lib/actor';
import { notFound } from '@/lib/problem';
import { Grouping } from '@/server/models';
import { snapshotThroughView } from '@/features/views/index.server';
import type { Action } from '@/features/workspaces';
import { authorise, workspaceIds, type Access } from '@/features/workspaces/index.server';
import type { Group, GroupingResult } from './groupings';

export interface OpenGrouping {
  readonly grouping: Grouping;
  readonly access: Access;
  /** Groups too small to show to this person. */
  readonly masked: ReadonlySet<number>;
}

export const resultOf = (grouping: Grouping): GroupingResult | null =>
  grouping.result as unknown as GroupingResult | null;

export const groupsOf = (grouping: Grouping): readonly Group[] => resultOf(grouping)?.groups ?? [];

/** A grouping for people who may explore freely. @throws ProblemError 404 for outsiders, 403 by role. */
export async function groupingFor(actor: Actor, id: string, action: Action): Promise<OpenGrouping> {
  const grouping = await Grouping.findOne({ where: { id, workspaceId: workspaceIds(actor) } });
  if (!grouping) throw notFound();
  const access = await authorise(actor, grouping.workspaceId, action);
  return { grouping, access, masked: new Set() };
}

/**
 * A grouping by role, or through one saved view that is shared with this person and shows it; then groups smaller
 * than the workspace's smallest group are masked.
 * @throws ProblemError 404 for outsiders and what the view does not show, 403 for a role that needs a view and has none.
 */
export async function groupingThroughView(
  actor: Actor,
  id: string,
  viewId: string | undefined,
): Promise<OpenGrouping> {
  const grouping = await Grouping.findOne({ where: { id, workspaceId: workspaceIds(actor) } });
  if (!grouping) throw notFound();
  const { access, through } = await snapshotThroughView(actor, grouping.snapshotId, viewId);
  if (through && !through.fields.has(`group:${id}`)) throw notFound();
  const { smallestGroup } = access.workspace;
  const small = through ? groupsOf(grouping).filter((group) => group.size < smallestGroup) : [];
  return { grouping, access, masked: new Set(small.map((group) => group.index)) };
}
