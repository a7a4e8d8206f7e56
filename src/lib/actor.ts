/** The five roles of a workspace, most able first. */
export const ROLES = ['owner', 'admin', 'analyst', 'moderator', 'viewer'] as const;
export type Role = (typeof ROLES)[number];

export interface ActorMembership {
  readonly workspaceId: string;
  readonly role: Role;
}

/** Who makes a request: resolved once by the middleware from a session cookie or an API token. */
export interface Actor {
  readonly userId: string;
  readonly name: string;
  readonly email: string;
  readonly memberships: readonly ActorMembership[];
  readonly via: 'session' | 'token';
  /** A token may be held to reading only; a session never is. */
  readonly readOnly: boolean;
}
