export { abilities, ACTIONS, can, mayGrant, seesNames, type Action } from './policy';
export {
  workspaceOperations,
  type AuditView,
  type InvitationView,
  type Person,
  type TokenView,
  type WorkspaceSettings,
} from './workspaces';
