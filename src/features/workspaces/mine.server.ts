import type { Actor, Role } from '@/lib/actor';
import { sequelize, Membership, Workspace } from '@/server/models';
import { audit } from './audit.server';
import { abilities, type Action } from './policy';

export interface MyWorkspace {
  readonly id: string;
  readonly name: string;
  readonly role: Role;
  readonly abilities: Action[];
}

/** Workspaces of a person, oldest first. */
export async function myWorkspaces(actor: Actor): Promise<MyWorkspace[]> {
  const roleOf = new Map(actor.memberships.map((one) => [one.workspaceId, one.role]));
  const rows = await Workspace.findAll({
    where: { id: [...roleOf.keys()], deletedAt: null },
    order: [['createdAt', 'ASC']],
  });
  return rows.map(({ id, name }) => ({
    id,
    name,
    role: roleOf.get(id)!,
    abilities: abilities(roleOf.get(id)!),
  }));
}

/** A new workspace, owned by the person who makes it. */
export const createWorkspace = (userId: string, name: string): Promise<Workspace> =>
  sequelize.transaction(async (transaction) => {
    const workspace = await Workspace.create({ name }, { transaction });
    await Membership.create({ workspaceId: workspace.id, userId, role: 'owner' }, { transaction });
    await audit(
      {
        workspaceId: workspace.id,
        actorId: userId,
        action: 'workspace.create',
        targetKind: 'workspace',
        targetId: workspace.id,
      },
      transaction,
    );
    return workspace;
  });
