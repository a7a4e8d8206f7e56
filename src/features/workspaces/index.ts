export { abilities, ACTIONS, can, mayGrant, seesNames, type Action } from './policy';
export { ROLE_NAMES } from './roles';
export {
  workspaceOperations,
  type AuditView,
  type InvitationView,
  type Person,
  type TokenView,
  type WorkspaceSettings,
} from './workspaces';
