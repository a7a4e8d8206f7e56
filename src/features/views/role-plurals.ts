import type { Role } from '@/lib/actor';

/** Whom a share with a role reaches. */
export const ROLE_PLURALS: Readonly<Record<Role, string>> = {
  owner: 'Owners',
  admin: 'Admins',
  analyst: 'Analysts',
  moderator: 'Moderators',
  viewer: 'Viewers',
};
