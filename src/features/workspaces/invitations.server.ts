import { createHash, randomBytes } from 'node:crypto';
import { Op } from 'sequelize';
import type { Actor, Role } from '@/lib/actor';
import type { Letter } from '@/lib/letter';
import { forbidden, notFound, unprocessable } from '@/lib/problem';
import { config } from '@/server/config';
import { queueMail } from '@/server/mail';
import { Invitation, Membership, sequelize, User, Workspace } from '@/server/models';
import { audit } from './audit.server';
import { authorise } from './access.server';
import { mayGrant } from './policy';
import type { InvitationView } from './workspaces';

const WEEK = 7 * 86_400_000;
const hash = (token: string): string => createHash('sha256').update(token).digest('hex');
const present = (row: Invitation): InvitationView => ({
  id: row.id,
  email: row.email,
  role: row.role as Role,
  invitedAt: row.createdAt.toISOString(),
  expiresAt: row.expiresAt.toISOString(),
});
const waiting = () => ({ acceptedAt: null, revokedAt: null, expiresAt: { [Op.gt]: new Date() } });

export async function listInvitations(actor: Actor, workspaceId: string): Promise<InvitationView[]> {
  await authorise(actor, workspaceId, 'workspace.manage');
  return (
    await Invitation.findAll({ where: { workspaceId, ...waiting() }, order: [['createdAt', 'DESC']] })
  ).map(present);
}

/** Writes the letter of an invitation; given by the caller, so that this feature need not know about mail texts. */
export type WriteLetter = (to: string, workspace: string, by: string, role: string, link: string) => Letter;

/** Invites an address; an earlier invitation of the same address stops working. */
export async function invite(
  actor: Actor,
  workspaceId: string,
  input: { email: string; role: Role },
  write: WriteLetter,
): Promise<InvitationView> {
  const { role: own, workspace } = await authorise(actor, workspaceId, 'workspace.manage');
  if (!mayGrant(own, input.role)) throw forbidden('You cannot give a role above your own.');
  const email = input.email.toLowerCase();
  const known = await User.findOne({ where: { email } });
  if (known && (await Membership.findOne({ where: { workspaceId, userId: known.id } })))
    throw unprocessable('already-here', 'This person is in the workspace already.');
  const token = randomBytes(24).toString('base64url');
  return sequelize.transaction(async (transaction) => {
    await Invitation.update(
      { revokedAt: new Date() },
      { where: { workspaceId, email, ...waiting() }, transaction },
    );
    const row = await Invitation.create(
      {
        workspaceId,
        email,
        role: input.role,
        tokenHash: hash(token),
        invitedBy: actor.userId,
        expiresAt: new Date(Date.now() + WEEK),
      },
      { transaction },
    );
    await audit(
      {
        workspaceId,
        actorId: actor.userId,
        action: 'invitation.send',
        targetKind: 'invitation',
        targetId: row.id,
        detail: { role: input.role },
      },
      transaction,
    );
    await queueMail(
      write(email, workspace.name, actor.name, input.role, `${config().PUBLIC_URL}/invitations/${token}`),
      transaction,
    );
    return present(row);
  });
}

export async function revokeInvitation(actor: Actor, workspaceId: string, id: string): Promise<void> {
  await authorise(actor, workspaceId, 'workspace.manage');
  await sequelize.transaction(async (transaction) => {
    const [count] = await Invitation.update(
      { revokedAt: new Date() },
      { where: { id, workspaceId, acceptedAt: null, revokedAt: null }, transaction },
    );
    if (count === 0) throw notFound();
    await audit(
      {
        workspaceId,
        actorId: actor.userId,
        action: 'invitation.revoke',
        targetKind: 'invitation',
        targetId: id,
      },
      transaction,
    );
  });
}

/** What an invitation link says, or null when it does not work (any more). */
export async function invitationByToken(
  token: string,
): Promise<{ workspace: string; role: Role; email: string } | null> {
  const row = await Invitation.findOne({ where: { tokenHash: hash(token), ...waiting() } });
  const workspace = row && (await Workspace.findOne({ where: { id: row.workspaceId, deletedAt: null } }));
  return row && workspace ? { workspace: workspace.name, role: row.role as Role, email: row.email } : null;
}

/**
 * Accepts an invitation as the signed-in person, whose address must be the invited one.
 * @returns the workspace to open
 */
export async function acceptInvitation(actor: Actor, token: string): Promise<string> {
  return sequelize.transaction(async (transaction) => {
    const row = await Invitation.findOne({
      where: { tokenHash: hash(token), ...waiting() },
      transaction,
      lock: true,
    });
    if (!row) throw notFound();
    if (row.email !== actor.email.toLowerCase())
      throw forbidden(`This invitation is for ${row.email}. Sign in with that address.`);
    const { workspaceId } = row;
    await Membership.findOrCreate({
      where: { workspaceId, userId: actor.userId },
      defaults: { workspaceId, userId: actor.userId, role: row.role },
      transaction,
    });
    await row.update({ acceptedAt: new Date() }, { transaction });
    await audit(
      {
        workspaceId,
        actorId: actor.userId,
        action: 'invitation.accept',
        targetKind: 'invitation',
        targetId: row.id,
      },
      transaction,
    );
    return workspaceId;
  });
}
