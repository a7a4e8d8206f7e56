/** The door of the Saltmarsh scenario. */
export { generateSaltmarsh, SALTMARSH_GROUPS, type Saltmarsh, type SaltmarshSnapshot } from './generate';
export { MEMBERS_FILE, TIES_FILE, writeSaltmarshFiles } from './files';
export type { SaltmarshTruth } from './truth';
