import { createHash } from 'node:crypto';
import { Op } from 'sequelize';
import type { Actor, Role } from '@/lib/actor';
import { ApiToken, Membership, User, Workspace } from '@/server/models';
import { auth } from './auth.server';

export const hashToken = (token: string): string => createHash('sha256').update(token).digest('hex');

/** Memberships in workspaces that still stand. */
async function membershipsOf(userId: string): Promise<{ workspaceId: string; role: Role }[]> {
  const rows = await Membership.findAll({ where: { userId } });
  const standing = await Workspace.findAll({
    where: { id: rows.map((row) => row.workspaceId), deletedAt: null },
    attributes: ['id'],
  });
  const ids = new Set(standing.map((one) => one.id));
  return rows
    .filter((row) => ids.has(row.workspaceId))
    .map(({ workspaceId, role }) => ({ workspaceId, role: role as Role }));
}

const SEEN_EVERY = 5 * 60_000;

function noteSeen(userId: string): void {
  const before = new Date(Date.now() - SEEN_EVERY);
  void Membership.update(
    { lastSeenAt: new Date() },
    { where: { userId, [Op.or]: [{ lastSeenAt: null }, { lastSeenAt: { [Op.lt]: before } }] } },
  ).catch(() => undefined);
}

/** The person behind an API token: only its own workspace, and reading only where the token says so. */
async function tokenActor(token: string): Promise<Actor | null> {
  const row = await ApiToken.findOne({
    where: { tokenHash: hashToken(token), revokedAt: null, expiresAt: { [Op.gt]: new Date() } },
  });
  const user = row && (await User.findByPk(row.userId));
  if (!row || !user) return null;
  void row.update({ lastUsedAt: new Date() }).catch(() => undefined);
  const memberships = (await membershipsOf(user.id)).filter((one) => one.workspaceId === row.workspaceId);
  return {
    userId: user.id,
    name: user.name,
    email: user.email,
    memberships,
    via: 'token',
    readOnly: row.readOnly,
  };
}

/** Who makes a request, or null. A token in the header is asked before a cookie. */
export async function actorOf(headers: Headers): Promise<Actor | null> {
  const bearer = /^Bearer\s+(\S+)$/i.exec(headers.get('authorization') ?? '')?.[1];
  if (bearer) return tokenActor(bearer);
  if (!headers.get('cookie')?.includes('better-auth')) return null;
  const session = await auth().api.getSession({ headers });
  if (!session) return null;
  const { id, name, email } = session.user;
  noteSeen(id);
  return { userId: id, name, email, memberships: await membershipsOf(id), via: 'session', readOnly: false };
}
