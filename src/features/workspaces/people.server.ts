import type { Transaction } from 'sequelize';
import type { Actor, Role } from '@/lib/actor';
import { forbidden, notFound, unprocessable } from '@/lib/problem';
import { ApiToken, Membership, sequelize, User } from '@/server/models';
import { audit } from './audit.server';
import { authorise } from './access.server';
import { mayGrant } from './policy';
import type { Person } from './workspaces';

const present = (membership: Membership, user: User, actor: Actor): Person => ({
  id: user.id,
  name: user.name,
  email: user.email,
  role: membership.role as Role,
  lastSeenAt: membership.lastSeenAt?.toISOString() ?? null,
  me: user.id === actor.userId,
});

/** People of a workspace with their roles; for those who manage it. */
export async function listPeople(actor: Actor, workspaceId: string): Promise<Person[]> {
  await authorise(actor, workspaceId, 'workspace.manage');
  const memberships = await Membership.findAll({ where: { workspaceId }, order: [['createdAt', 'ASC']] });
  const users = new Map(
    (await User.findAll({ where: { id: memberships.map((one) => one.userId) } })).map((user) => [
      user.id,
      user,
    ]),
  );
  return memberships.flatMap((one) =>
    users.has(one.userId) ? [present(one, users.get(one.userId)!, actor)] : [],
  );
}

/** Colleagues who may be given something, by name only: for assigning and sharing. */
export async function colleagues(
  actor: Actor,
  workspaceId: string,
): Promise<{ id: string; name: string; role: Role }[]> {
  await authorise(actor, workspaceId, 'views.save');
  const memberships = await Membership.findAll({ where: { workspaceId } });
  const users = new Map(
    (await User.findAll({ where: { id: memberships.map((one) => one.userId) } })).map((user) => [
      user.id,
      user.name,
    ]),
  );
  return memberships.map((one) => ({
    id: one.userId,
    name: users.get(one.userId) ?? '',
    role: one.role as Role,
  }));
}

/** The membership to be changed, locked; the last owner and people above the actor are not to be touched. */
async function changeable(
  actor: Actor,
  workspaceId: string,
  userId: string,
  transaction: Transaction,
): Promise<Membership> {
  const { role } = await authorise(actor, workspaceId, 'workspace.manage');
  const membership = await Membership.findOne({ where: { workspaceId, userId }, transaction, lock: true });
  if (!membership) throw notFound();
  if (membership.role === 'owner')
    throw unprocessable('owner', 'An owner is changed only by transferring the workspace.');
  if (!mayGrant(role, membership.role as Role)) throw forbidden('This person’s role is above yours.');
  return membership;
}

export async function changeRole(
  actor: Actor,
  workspaceId: string,
  userId: string,
  role: Role,
): Promise<Person> {
  const membership = await sequelize.transaction(async (transaction) => {
    const row = await changeable(actor, workspaceId, userId, transaction);
    const { role: own } = await authorise(actor, workspaceId, 'workspace.manage');
    if (!mayGrant(own, role)) throw forbidden('You cannot give a role above your own.');
    await audit(
      {
        workspaceId,
        actorId: actor.userId,
        action: 'person.role',
        targetKind: 'person',
        targetId: userId,
        detail: { from: row.role, to: role },
      },
      transaction,
    );
    return row.update({ role }, { transaction });
  });
  return present(membership, (await User.findByPk(userId))!, actor);
}

/** Ends a person's access at once: memberships are read with every request. Their tokens end with it. */
export async function removePerson(actor: Actor, workspaceId: string, userId: string): Promise<void> {
  await sequelize.transaction(async (transaction) => {
    const row = await changeable(actor, workspaceId, userId, transaction);
    await row.destroy({ transaction });
    await ApiToken.update(
      { revokedAt: new Date() },
      { where: { workspaceId, userId, revokedAt: null }, transaction },
    );
    await audit(
      { workspaceId, actorId: actor.userId, action: 'person.remove', targetKind: 'person', targetId: userId },
      transaction,
    );
  });
}
