import type { Migration } from './types';

/** People and how they sign in, workspaces, memberships, invitations, tokens, the audit log. */
export const people: Migration = {
  name: '0001-people',
  up: `
    CREATE TABLE users (
      id text PRIMARY KEY, name text NOT NULL, email text NOT NULL UNIQUE, email_verified boolean NOT NULL DEFAULT false,
      image text, created_at timestamptz NOT NULL DEFAULT now(), updated_at timestamptz NOT NULL DEFAULT now());
    CREATE TABLE sessions (
      id text PRIMARY KEY, token text NOT NULL UNIQUE, user_id text NOT NULL REFERENCES users ON DELETE CASCADE,
      expires_at timestamptz NOT NULL, ip_address text, user_agent text,
      created_at timestamptz NOT NULL DEFAULT now(), updated_at timestamptz NOT NULL DEFAULT now());
    CREATE INDEX sessions_user ON sessions (user_id);
    CREATE TABLE accounts (
      id text PRIMARY KEY, account_id text NOT NULL, provider_id text NOT NULL,
      user_id text NOT NULL REFERENCES users ON DELETE CASCADE, access_token text, refresh_token text, id_token text,
      access_token_expires_at timestamptz, refresh_token_expires_at timestamptz, scope text, password text,
      created_at timestamptz NOT NULL DEFAULT now(), updated_at timestamptz NOT NULL DEFAULT now());
    CREATE INDEX accounts_user ON accounts (user_id);
    CREATE TABLE verifications (
      id text PRIMARY KEY, identifier text NOT NULL, value text NOT NULL, expires_at timestamptz NOT NULL,
      created_at timestamptz NOT NULL DEFAULT now(), updated_at timestamptz NOT NULL DEFAULT now());
    CREATE INDEX verifications_identifier ON verifications (identifier);
    CREATE TABLE rate_limits (id text PRIMARY KEY, key text NOT NULL UNIQUE, count integer NOT NULL, last_request bigint NOT NULL);
    CREATE TABLE workspaces (
      id uuid PRIMARY KEY, name text NOT NULL, viewers_see_names boolean NOT NULL DEFAULT false,
      smallest_group integer NOT NULL DEFAULT 5 CHECK (smallest_group >= 1),
      neighbour_floor integer NOT NULL DEFAULT 5 CHECK (neighbour_floor >= 1),
      created_at timestamptz NOT NULL DEFAULT now(), deleted_at timestamptz);
    CREATE TABLE memberships (
      id uuid PRIMARY KEY, workspace_id uuid NOT NULL REFERENCES workspaces ON DELETE CASCADE,
      user_id text NOT NULL REFERENCES users ON DELETE CASCADE,
      role text NOT NULL CHECK (role IN ('owner', 'admin', 'analyst', 'moderator', 'viewer')),
      created_at timestamptz NOT NULL DEFAULT now(), last_seen_at timestamptz, UNIQUE (workspace_id, user_id));
    CREATE INDEX memberships_user ON memberships (user_id);
    CREATE TABLE invitations (
      id uuid PRIMARY KEY, workspace_id uuid NOT NULL REFERENCES workspaces ON DELETE CASCADE, email text NOT NULL,
      role text NOT NULL CHECK (role IN ('admin', 'analyst', 'moderator', 'viewer')), token_hash text NOT NULL UNIQUE,
      invited_by text NOT NULL REFERENCES users ON DELETE CASCADE, created_at timestamptz NOT NULL DEFAULT now(),
      expires_at timestamptz NOT NULL, accepted_at timestamptz, revoked_at timestamptz);
    CREATE INDEX invitations_workspace ON invitations (workspace_id);
    CREATE TABLE api_tokens (
      id uuid PRIMARY KEY, workspace_id uuid NOT NULL REFERENCES workspaces ON DELETE CASCADE,
      user_id text NOT NULL REFERENCES users ON DELETE CASCADE, name text NOT NULL, token_hash text NOT NULL UNIQUE,
      read_only boolean NOT NULL DEFAULT false, created_at timestamptz NOT NULL DEFAULT now(),
      expires_at timestamptz NOT NULL, last_used_at timestamptz, revoked_at timestamptz);
    CREATE TABLE audit_entries (
      id uuid PRIMARY KEY, workspace_id uuid NOT NULL REFERENCES workspaces ON DELETE CASCADE, actor_id text,
      action text NOT NULL, target_kind text NOT NULL, target_id text, detail jsonb NOT NULL,
      created_at timestamptz NOT NULL DEFAULT now());
    CREATE INDEX audit_entries_workspace ON audit_entries (workspace_id, created_at DESC);
  `,
};
