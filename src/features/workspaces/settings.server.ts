import { Op } from 'sequelize';
import type { Actor } from '@/lib/actor';
import { AuditEntry, sequelize, User, type Workspace } from '@/server/models';
import { audit } from './audit.server';
import { authorise } from './access.server';
import type { AuditView, WorkspaceSettings } from './workspaces';

const present = ({ name, viewersSeeNames, smallestGroup, neighbourFloor }: Workspace): WorkspaceSettings => ({
  name,
  viewersSeeNames,
  smallestGroup,
  neighbourFloor,
});

export const getSettings = async (actor: Actor, workspaceId: string): Promise<WorkspaceSettings> =>
  present((await authorise(actor, workspaceId, 'workspace.manage')).workspace);

export async function changeSettings(
  actor: Actor,
  workspaceId: string,
  changes: Partial<WorkspaceSettings>,
): Promise<WorkspaceSettings> {
  const { workspace } = await authorise(actor, workspaceId, 'workspace.manage');
  return sequelize.transaction(async (transaction) => {
    await audit(
      {
        workspaceId,
        actorId: actor.userId,
        action: 'workspace.settings',
        targetKind: 'workspace',
        targetId: workspaceId,
        detail: { ...changes },
      },
      transaction,
    );
    return present(await workspace.update(changes, { transaction }));
  });
}

/** The audit log, newest first, paged by the id of the last line seen (ids sort by time). */
export async function listAudit(
  actor: Actor,
  workspaceId: string,
  limit: number,
  cursor?: string,
): Promise<{ items: AuditView[]; nextCursor: string | null }> {
  await authorise(actor, workspaceId, 'workspace.manage');
  const rows = await AuditEntry.findAll({
    where: { workspaceId, ...(cursor && /^[0-9a-f-]{36}$/.test(cursor) ? { id: { [Op.lt]: cursor } } : {}) },
    order: [['id', 'DESC']],
    limit: limit + 1,
  });
  const shown = rows.slice(0, limit);
  const users = new Map(
    (await User.findAll({ where: { id: shown.flatMap((row) => row.actorId ?? []) } })).map((user) => [
      user.id,
      user.name,
    ]),
  );
  return {
    items: shown.map((row) => ({
      id: row.id,
      at: row.createdAt.toISOString(),
      actor: row.actorId ? (users.get(row.actorId) ?? 'A former colleague') : null,
      action: row.action,
      targetKind: row.targetKind,
      targetId: row.targetId,
      detail: row.detail,
    })),
    nextCursor: rows.length > limit ? shown.at(-1)!.id : null,
  };
}
