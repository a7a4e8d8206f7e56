import { ROLES, type Role } from '@/lib/actor';
import { can, type Action } from './policy';

export const ROLE_NAMES: Record<Role, string> = {
  owner: 'Owner',
  admin: 'Admin',
  analyst: 'Analyst',
  moderator: 'Moderator',
  viewer: 'Viewer',
};

/** What the table "What each role can do" says in words, line by line. */
const WORDS: Record<Action, string> = {
  'brief.open': 'Open the Brief',
  'views.open': 'Open shared views',
  'explore.open': 'Open Map, Members, Groups and Readings',
  'names.see': 'See names and ids of members',
  'analysis.make': 'Import, take readings, make groupings',
  'views.save': 'Save and share views',
  'cases.open': 'Open cases from a reading',
  'cases.read': 'Read cases',
  'cases.work': 'Work and decide cases',
  'export.tables': 'Export tables',
  'export.cases': 'Export cases',
  'workspace.manage': 'Invite people, change roles and settings',
  'workspace.own': 'Transfer or delete the workspace',
};

export interface RoleLine {
  readonly action: Action;
  readonly words: string;
  readonly may: readonly { role: Role; may: boolean }[];
}

/** The permission table as it is enforced, in words, least able role first. */
export const roleTable = (): RoleLine[] =>
  (Object.keys(WORDS) as Action[]).map((action) => ({
    action,
    words: WORDS[action],
    may: [...ROLES].reverse().map((role) => ({ role, may: can(role, action) })),
  }));
