import type { Actor, Role } from '@/lib/actor';
import { forbidden, notFound } from '@/lib/problem';
import { Workspace } from '@/server/models';
import { can, seesNames, type Action } from './policy';

/** What one person may do in one workspace, established once for a request. */
export interface Access {
  readonly workspace: Workspace;
  readonly role: Role;
  /** Whether member names and external ids may be sent. */
  readonly names: boolean;
  can(action: Action): boolean;
}

/**
 * Lets `actor` through to a workspace for an action.
 * @throws ProblemError 404 for outsiders (whether or not the workspace exists), 403 where the role does not allow it.
 */
export async function authorise(actor: Actor, workspaceId: string, action: Action): Promise<Access> {
  const membership = actor.memberships.find((one) => one.workspaceId === workspaceId);
  if (!membership) throw notFound();
  const workspace = await Workspace.findOne({ where: { id: workspaceId, deletedAt: null } });
  if (!workspace) throw notFound();
  const { role } = membership;
  if (!can(role, action)) throw forbidden();
  return {
    workspace,
    role,
    names: seesNames(role, workspace.viewersSeeNames),
    can: (other) => can(role, other),
  };
}

/** Ids of the workspaces that a person belongs to: the tenant condition of every query by id. */
export const workspaceIds = (actor: Actor): string[] => actor.memberships.map((one) => one.workspaceId);
