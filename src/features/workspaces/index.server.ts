export { createWorkspace, myWorkspaces, type MyWorkspace } from './mine.server';
export { authorise, workspaceIds, type Access } from './access.server';
export { audit } from './audit.server';
export {
  acceptInvitation,
  invitationByToken,
  invite,
  listInvitations,
  revokeInvitation,
} from './invitations.server';
export { changeRole, colleagues, listPeople, removePerson } from './people.server';
export { changeSettings, getSettings, listAudit } from './settings.server';
export { createToken, listTokens, revokeToken } from './tokens.server';
