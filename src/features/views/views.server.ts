import type * as z from 'zod';
import type { Actor } from '@/lib/actor';
import { conflict, forbidden, notFound } from '@/lib/problem';
import { sequelize, Snapshot, User, View, ViewShare } from '@/server/models';
import { communityFor } from '@/features/network/index.server';
import { audit, type Access } from '@/features/workspaces/index.server';
import { viewStateSchema } from './state';
import { mayEdit, viewFor, visibleViews } from './visible.server';
import type { changeViewSchema, newViewSchema, SavedView } from './views';

/** Names of people by id, for owners and authors. */
export async function namesOf(ids: readonly string[]): Promise<Map<string, string>> {
  const users = await User.findAll({ where: { id: [...new Set(ids)] }, attributes: ['id', 'name'] });
  return new Map(users.map((user) => [user.id, user.name]));
}

async function present(actor: Actor, access: Access, views: readonly View[]): Promise<SavedView[]> {
  const names = await namesOf(views.map((view) => view.ownerId));
  return Promise.all(
    views.map(async (view) => {
      const mine = view.ownerId === actor.userId;
      return {
        id: view.id,
        communityId: view.communityId,
        snapshotId: view.snapshotId,
        name: view.name,
        note: view.note,
        place: view.place,
        state: viewStateSchema.parse(view.state),
        visibility: view.visibility,
        pinned: view.pinned,
        version: view.version,
        owner: { id: view.ownerId, name: names.get(view.ownerId) ?? 'A former colleague' },
        shares: await ViewShare.count({ where: { viewId: view.id } }),
        mine,
        canEdit: await mayEdit(actor, view, access),
        canShare: (mine && access.can('views.save')) || access.can('workspace.manage'),
        href: `/w/${view.workspaceId}/c/${view.communityId}/views/${view.id}`,
        updatedAt: view.updatedAt.toISOString(),
      };
    }),
  );
}

/** Every view of a community that this person may open, pinned first, then newest. */
export async function listViews(actor: Actor, communityId: string): Promise<SavedView[]> {
  const { community, access } = await communityFor(actor, communityId, 'views.open');
  const views = await View.findAll({
    where: { ...(await visibleViews(actor, access)), communityId: community.id },
    order: [
      ['pinned', 'DESC'],
      ['updatedAt', 'DESC'],
    ],
    limit: 200,
  });
  return present(actor, access, views);
}

export async function getView(actor: Actor, id: string): Promise<SavedView> {
  const { view, access } = await viewFor(actor, id);
  return (await present(actor, access, [view]))[0]!;
}

export async function createView(
  actor: Actor,
  communityId: string,
  input: z.output<typeof newViewSchema>,
): Promise<SavedView> {
  const { community, access } = await communityFor(actor, communityId, 'views.save');
  const snapshot = await Snapshot.findOne({
    where: { id: input.snapshotId, communityId: community.id, state: 'ready' },
  });
  if (!snapshot) throw notFound();
  const view = await sequelize.transaction(async (transaction) => {
    const made = await View.create(
      { ...input, workspaceId: community.workspaceId, communityId: community.id, ownerId: actor.userId },
      { transaction },
    );
    await audit(
      {
        workspaceId: community.workspaceId,
        actorId: actor.userId,
        action: 'view.create',
        targetKind: 'view',
        targetId: made.id,
        detail: { visibility: input.visibility },
      },
      transaction,
    );
    return made;
  });
  return (await present(actor, access, [view]))[0]!;
}

/** @throws ProblemError 409 when somebody saved a newer version; nobody's work is overwritten. */
export async function changeView(
  actor: Actor,
  id: string,
  input: z.output<typeof changeViewSchema>,
): Promise<SavedView> {
  const { view, access } = await viewFor(actor, id);
  const { version, ...changes } = input;
  if (!(await mayEdit(actor, view, access)))
    throw forbidden('This view is shared with you to open, not to change.');
  if (changes.visibility && view.ownerId !== actor.userId && !access.can('workspace.manage'))
    throw forbidden('Only its owner or an admin changes who sees a view.');
  await sequelize.transaction(async (transaction) => {
    const [count] = await View.update(
      { ...changes, version: version + 1, updatedAt: new Date() },
      { where: { id, version }, transaction },
    );
    if (count === 0)
      throw conflict(
        'view-changed',
        'This view was saved by somebody else meanwhile. Your change has not been recorded; open the new version and apply it again.',
      );
    await audit(
      {
        workspaceId: view.workspaceId,
        actorId: actor.userId,
        action: 'view.change',
        targetKind: 'view',
        targetId: id,
        detail: { fields: Object.keys(changes) },
      },
      transaction,
    );
  });
  return getView(actor, id);
}

export async function deleteView(actor: Actor, id: string): Promise<void> {
  const { view, access } = await viewFor(actor, id);
  if (view.ownerId !== actor.userId && !access.can('workspace.manage'))
    throw forbidden('Only its owner or an admin deletes a view.');
  if (!access.can('views.save')) throw forbidden();
  await sequelize.transaction(async (transaction) => {
    await view.destroy({ transaction });
    await audit(
      {
        workspaceId: view.workspaceId,
        actorId: actor.userId,
        action: 'view.delete',
        targetKind: 'view',
        targetId: id,
      },
      transaction,
    );
  });
}
