export { authorise, workspaceIds, type Access } from './access.server';
export { audit } from './audit.server';
