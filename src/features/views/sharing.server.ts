import type * as z from 'zod';
import type { Actor, Role } from '@/lib/actor';
import { forbidden, notFound, unprocessable } from '@/lib/problem';
import { Membership, sequelize, ViewComment, ViewShare, type View } from '@/server/models';
import { audit, type Access } from '@/features/workspaces/index.server';
import { ROLE_PLURALS } from './role-plurals';
import { viewFor } from './visible.server';
import { namesOf } from './views.server';
import type { Comment, newShareSchema, Share } from './views';

async function sharableView(actor: Actor, id: string): Promise<{ view: View; access: Access }> {
  const found = await viewFor(actor, id);
  const mine = found.view.ownerId === actor.userId && found.access.can('views.save');
  if (!mine && !found.access.can('workspace.manage'))
    throw forbidden('Only its owner or an admin shares a view.');
  return found;
}

async function presentShares(rows: readonly ViewShare[]): Promise<Share[]> {
  const names = await namesOf(rows.flatMap((row) => row.userId ?? []));
  return rows.map((row) => ({
    id: row.id,
    userId: row.userId,
    role: row.role,
    name: row.role ? ROLE_PLURALS[row.role as Role] : (names.get(row.userId!) ?? 'A former colleague'),
    canEdit: row.canEdit,
  }));
}

export async function listShares(actor: Actor, id: string): Promise<Share[]> {
  const { view } = await sharableView(actor, id);
  return presentShares(
    await ViewShare.findAll({ where: { viewId: view.id }, order: [['createdAt', 'ASC']] }),
  );
}

/** Shares a view with one person of the workspace or with a role; sharing again changes the right to edit. */
export async function addShare(
  actor: Actor,
  id: string,
  input: z.output<typeof newShareSchema>,
): Promise<Share> {
  const { view } = await sharableView(actor, id);
  const { userId = null, role = null, canEdit } = input;
  if (userId && !(await Membership.findOne({ where: { workspaceId: view.workspaceId, userId } })))
    throw unprocessable('not-a-colleague', 'That person is not in this workspace. Invite them first.');
  const share = await sequelize.transaction(async (transaction) => {
    const [row] = await ViewShare.findOrCreate({
      where: { viewId: view.id, userId, role },
      defaults: { viewId: view.id, userId, role, canEdit, createdBy: actor.userId },
      transaction,
    });
    await row.update({ canEdit }, { transaction });
    await audit(
      {
        workspaceId: view.workspaceId,
        actorId: actor.userId,
        action: 'view.share',
        targetKind: 'view',
        targetId: id,
        detail: { userId, role, canEdit },
      },
      transaction,
    );
    return row;
  });
  return (await presentShares([share]))[0]!;
}

export async function endShare(actor: Actor, id: string, shareId: string): Promise<void> {
  const { view } = await sharableView(actor, id);
  const share = await ViewShare.findOne({ where: { id: shareId, viewId: view.id } });
  if (!share) throw notFound();
  await sequelize.transaction(async (transaction) => {
    await share.destroy({ transaction });
    await audit(
      {
        workspaceId: view.workspaceId,
        actorId: actor.userId,
        action: 'view.unshare',
        targetKind: 'view',
        targetId: id,
        detail: { userId: share.userId, role: share.role },
      },
      transaction,
    );
  });
}

export async function listComments(actor: Actor, id: string): Promise<Comment[]> {
  const { view } = await viewFor(actor, id);
  const rows = await ViewComment.findAll({
    where: { viewId: view.id },
    order: [['createdAt', 'ASC']],
    limit: 500,
  });
  const names = await namesOf(rows.map((row) => row.authorId));
  return rows.map((row) => ({
    id: row.id,
    author: { id: row.authorId, name: names.get(row.authorId) ?? 'A former colleague' },
    body: row.body,
    createdAt: row.createdAt.toISOString(),
  }));
}

export async function addComment(actor: Actor, id: string, body: string): Promise<Comment> {
  const { view } = await viewFor(actor, id);
  const row = await ViewComment.create({ viewId: view.id, authorId: actor.userId, body });
  return {
    id: row.id,
    author: { id: actor.userId, name: actor.name },
    body,
    createdAt: row.createdAt.toISOString(),
  };
}
