import { createHash, randomBytes } from 'node:crypto';
import { Op } from 'sequelize';
import type { Actor } from '@/lib/actor';
import { forbidden, notFound } from '@/lib/problem';
import { ApiToken, sequelize, User } from '@/server/models';
import { audit } from './audit.server';
import { authorise } from './access.server';
import type { TokenView } from './workspaces';

const present = (row: ApiToken, person: string): TokenView => ({
  id: row.id,
  name: row.name,
  readOnly: row.readOnly,
  person,
  createdAt: row.createdAt.toISOString(),
  expiresAt: row.expiresAt.toISOString(),
  lastUsedAt: row.lastUsedAt?.toISOString() ?? null,
});

/** Tokens that work: one's own, or everybody's for those who manage the workspace. */
export async function listTokens(actor: Actor, workspaceId: string): Promise<TokenView[]> {
  const access = await authorise(actor, workspaceId, 'explore.open');
  const own = access.can('workspace.manage') ? {} : { userId: actor.userId };
  const rows = await ApiToken.findAll({
    where: { workspaceId, revokedAt: null, expiresAt: { [Op.gt]: new Date() }, ...own },
    order: [['createdAt', 'DESC']],
  });
  const users = new Map(
    (await User.findAll({ where: { id: rows.map((row) => row.userId) } })).map((user) => [
      user.id,
      user.name,
    ]),
  );
  return rows.map((row) => present(row, users.get(row.userId) ?? ''));
}

/** A new token with the person's own rights in this workspace. Only its hash is kept. */
export async function createToken(
  actor: Actor,
  workspaceId: string,
  input: { name: string; readOnly: boolean; days: number },
): Promise<TokenView & { token: string }> {
  await authorise(actor, workspaceId, 'explore.open');
  // Else a token could outlive its own expiry.
  if (actor.via === 'token') throw forbidden('A token cannot make tokens. Sign in for that.');
  const token = `thrum_${randomBytes(30).toString('base64url')}`;
  const row = await sequelize.transaction(async (transaction) => {
    const made = await ApiToken.create(
      {
        workspaceId,
        userId: actor.userId,
        name: input.name,
        readOnly: input.readOnly,
        tokenHash: createHash('sha256').update(token).digest('hex'),
        expiresAt: new Date(Date.now() + input.days * 86_400_000),
      },
      { transaction },
    );
    await audit(
      {
        workspaceId,
        actorId: actor.userId,
        action: 'token.create',
        targetKind: 'token',
        targetId: made.id,
        detail: { readOnly: input.readOnly, days: input.days },
      },
      transaction,
    );
    return made;
  });
  return { ...present(row, actor.name), token };
}

export async function revokeToken(actor: Actor, workspaceId: string, id: string): Promise<void> {
  const access = await authorise(actor, workspaceId, 'explore.open');
  const own = access.can('workspace.manage') ? {} : { userId: actor.userId };
  await sequelize.transaction(async (transaction) => {
    const [count] = await ApiToken.update(
      { revokedAt: new Date() },
      { where: { id, workspaceId, revokedAt: null, ...own }, transaction },
    );
    if (count === 0) throw notFound();
    await audit(
      { workspaceId, actorId: actor.userId, action: 'token.revoke', targetKind: 'token', targetId: id },
      transaction,
    );
  });
}
