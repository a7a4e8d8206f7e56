import { Op, type WhereOptions } from 'sequelize';
import type { Actor } from '@/lib/actor';
import { forbidden, notFound } from '@/lib/problem';
import { Snapshot, View, ViewShare } from '@/server/models';
import type { Action } from '@/features/workspaces';
import { authorise, workspaceIds, type Access } from '@/features/workspaces/index.server';
import { fieldsOf, viewStateSchema, type Filter } from './state';

/** Ids of the views that are shared with this person by name or by role, in one workspace. */
async function sharedWith(actor: Actor, role: Access['role'], editOnly = false): Promise<string[]> {
  const shares = await ViewShare.findAll({
    where: { [Op.or]: [{ userId: actor.userId }, { role }], ...(editOnly ? { canEdit: true } : {}) },
    attributes: ['viewId'],
  });
  return shares.map((share) => share.viewId);
}

/** The condition of every query for views: own, shared with all, or shared with this person or role. */
export async function visibleViews(actor: Actor, access: Access): Promise<WhereOptions<View>> {
  return {
    workspaceId: access.workspace.id,
    [Op.or]: [
      { ownerId: actor.userId },
      { visibility: 'workspace' },
      { id: await sharedWith(actor, access.role) },
    ],
  };
}

/**
 * A view that this person may open. Admins see every share and so every shared view, but not private ones.
 * @throws ProblemError 404 for everyone else.
 */
export async function viewFor(actor: Actor, id: string): Promise<{ view: View; access: Access }> {
  const found = await View.findOne({ where: { id, workspaceId: workspaceIds(actor) } });
  if (!found) throw notFound();
  const access = await authorise(actor, found.workspaceId, 'views.open');
  if (found.ownerId === actor.userId || found.visibility === 'workspace') return { view: found, access };
  if ((await sharedWith(actor, access.role)).includes(id)) return { view: found, access };
  if (access.can('workspace.manage') && (await ViewShare.count({ where: { viewId: id } })) > 0)
    return { view: found, access };
  throw notFound();
}

/** May this person change the view's state and name? */
export async function mayEdit(actor: Actor, view: View, access: Access): Promise<boolean> {
  if (!access.can('views.save')) return false;
  return view.ownerId === actor.userId || (await sharedWith(actor, access.role, true)).includes(view.id);
}

export interface SharedSnapshot {
  readonly snapshot: Snapshot;
  readonly access: Access;
  /** Null for people who may explore freely; else the fields and filters that the view lets through. */
  readonly through: { readonly fields: ReadonlySet<string>; readonly filters: readonly Filter[] } | null;
}

/**
 * A snapshot that this person may read: freely by role, or through one saved view that is shared with them and
 * keeps to this snapshot. What comes through a view is limited to the fields and filters of that view.
 * @throws ProblemError 404 for outsiders and views that are not theirs, 403 for a role that needs a view and has none.
 */
export async function snapshotThroughView(
  actor: Actor,
  snapshotId: string,
  viewId: string | undefined,
  action: Action = 'explore.open',
): Promise<SharedSnapshot> {
  const snapshot = await Snapshot.findOne({
    where: { id: snapshotId, workspaceId: workspaceIds(actor), state: 'ready' },
  });
  if (!snapshot) throw notFound();
  const access = await authorise(actor, snapshot.workspaceId, 'views.open');
  if (access.can(action)) return { snapshot, access, through: null };
  if (!viewId) throw forbidden('Your role opens this through a saved view that is shared with you.');
  const { view } = await viewFor(actor, viewId);
  if (view.snapshotId !== snapshot.id) throw notFound();
  const state = viewStateSchema.parse(view.state);
  return { snapshot, access, through: { fields: fieldsOf(state), filters: state.filters } };
}
