import { ROLES, type Role } from '@/lib/actor';

/**
 * The one permission table. Each line is one thing that can be done and the roles that may do it;
 * the server asks it on every page, endpoint and query, and the interface only ever repeats its answers.
 */
const TABLE = {
  'brief.open': ['owner', 'admin', 'analyst', 'moderator', 'viewer'],
  'views.open': ['owner', 'admin', 'analyst', 'moderator', 'viewer'],
  'explore.open': ['owner', 'admin', 'analyst', 'moderator'],
  'names.see': ['owner', 'admin', 'analyst', 'moderator'],
  'analysis.make': ['owner', 'admin', 'analyst'],
  'views.save': ['owner', 'admin', 'analyst', 'moderator'],
  'cases.open': ['owner', 'admin', 'analyst', 'moderator'],
  'cases.read': ['owner', 'admin', 'analyst', 'moderator'],
  'cases.work': ['owner', 'admin', 'moderator'],
  'export.tables': ['owner', 'admin', 'analyst'],
  'export.cases': ['owner', 'admin', 'analyst', 'moderator'],
  'workspace.manage': ['owner', 'admin'],
  'workspace.own': ['owner'],
} as const satisfies Record<string, readonly Role[]>;

export type Action = keyof typeof TABLE;
export const ACTIONS = Object.keys(TABLE) as readonly Action[];

/** May a person of this role do this? Pure; membership of the workspace is the caller's to establish. */
export const can = (role: Role, action: Action): boolean => (TABLE[action] as readonly Role[]).includes(role);

/** Everything a role may do, to send along with data so that the interface need not work it out. */
export const abilities = (role: Role): Action[] => ACTIONS.filter((action) => can(role, action));

/** Do names reach this role? Viewers see them only where the workspace allows it. */
export const seesNames = (role: Role, viewersSeeNames: boolean): boolean =>
  can(role, 'names.see') || (role === 'viewer' && viewersSeeNames);

/** Nobody hands out a role above their own, and ownership moves only by transfer. */
export const mayGrant = (granter: Role, role: Role): boolean =>
  can(granter, 'workspace.manage') && role !== 'owner' && ROLES.indexOf(granter) <= ROLES.indexOf(role);
