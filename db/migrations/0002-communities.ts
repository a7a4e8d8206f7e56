import type { Migration } from './types';

/** Communities, imports, snapshots and the rows of a snapshot. */
export const communities: Migration = {
  name: '0002-communities',
  up: `
    CREATE TABLE communities (
      id uuid PRIMARY KEY, workspace_id uuid NOT NULL REFERENCES workspaces ON DELETE CASCADE, name text NOT NULL,
      created_by text, created_at timestamptz NOT NULL DEFAULT now());
    CREATE INDEX communities_workspace ON communities (workspace_id);
    CREATE TABLE imports (
      id uuid PRIMARY KEY, workspace_id uuid NOT NULL REFERENCES workspaces ON DELETE CASCADE,
      community_id uuid NOT NULL REFERENCES communities ON DELETE CASCADE,
      state text NOT NULL CHECK (state IN ('received','checking','review','accepted','discarded','failed','cancelled')),
      options jsonb NOT NULL, files jsonb NOT NULL, fingerprint text NOT NULL, counts jsonb, warnings jsonb,
      problems_total integer NOT NULL DEFAULT 0, snapshot_id uuid, created_by text,
      created_at timestamptz NOT NULL DEFAULT now(), finished_at timestamptz);
    CREATE INDEX imports_community ON imports (community_id, created_at DESC);
    CREATE TABLE import_problems (
      import_id uuid NOT NULL REFERENCES imports ON DELETE CASCADE, ordinal integer NOT NULL, file text NOT NULL,
      line integer NOT NULL, "column" text, value text, reason text NOT NULL, PRIMARY KEY (import_id, ordinal));
    CREATE TABLE snapshots (
      id uuid PRIMARY KEY, workspace_id uuid NOT NULL REFERENCES workspaces ON DELETE CASCADE,
      community_id uuid NOT NULL REFERENCES communities ON DELETE CASCADE, import_id uuid, taken_on date NOT NULL,
      label text NOT NULL, state text NOT NULL DEFAULT 'pending' CHECK (state IN ('pending', 'ready')),
      members integer NOT NULL, ties integer NOT NULL, total_weight double precision NOT NULL,
      components integer NOT NULL, largest_component integer NOT NULL, isolated integer NOT NULL,
      created_by text, created_at timestamptz NOT NULL DEFAULT now());
    CREATE INDEX snapshots_community ON snapshots (community_id, taken_on DESC);
    CREATE UNIQUE INDEX snapshots_import ON snapshots (import_id);
    CREATE TABLE attributes (
      id uuid PRIMARY KEY, snapshot_id uuid NOT NULL REFERENCES snapshots ON DELETE CASCADE, ordinal integer NOT NULL,
      name text NOT NULL, type text NOT NULL CHECK (type IN ('number', 'label')),
      direction text NOT NULL DEFAULT 'neither' CHECK (direction IN ('higher-better', 'higher-worse', 'neither')),
      sensitive boolean NOT NULL DEFAULT false, observed integer NOT NULL, summary jsonb NOT NULL, count_of text,
      UNIQUE (snapshot_id, name));
    CREATE TABLE community_members (
      id uuid PRIMARY KEY, community_id uuid NOT NULL REFERENCES communities ON DELETE CASCADE,
      external_id text NOT NULL, UNIQUE (community_id, external_id));
    CREATE TABLE snapshot_members (
      snapshot_id uuid NOT NULL REFERENCES snapshots ON DELETE CASCADE, ordinal integer NOT NULL,
      member_id uuid NOT NULL REFERENCES community_members ON DELETE CASCADE, external_id text NOT NULL, name text,
      component integer NOT NULL, degree integer NOT NULL, strength double precision NOT NULL,
      x double precision NOT NULL, y double precision NOT NULL, PRIMARY KEY (snapshot_id, ordinal));
    CREATE UNIQUE INDEX snapshot_members_member ON snapshot_members (member_id, snapshot_id);
    CREATE TABLE ties (
      snapshot_id uuid NOT NULL REFERENCES snapshots ON DELETE CASCADE, source integer NOT NULL, target integer NOT NULL,
      weight double precision NOT NULL CHECK (weight > 0), kind text, count integer NOT NULL,
      PRIMARY KEY (snapshot_id, source, target), CHECK (source < target));
    CREATE INDEX ties_target ON ties (snapshot_id, target);
    CREATE TABLE attribute_values (
      attribute_id uuid NOT NULL REFERENCES attributes ON DELETE CASCADE, ordinal integer NOT NULL,
      value double precision, label text, PRIMARY KEY (attribute_id, ordinal));
    CREATE TABLE snapshot_arrays (
      snapshot_id uuid NOT NULL REFERENCES snapshots ON DELETE CASCADE, name text NOT NULL, type text NOT NULL,
      bytes bytea NOT NULL, PRIMARY KEY (snapshot_id, name));
    ALTER TABLE snapshot_arrays ALTER COLUMN bytes SET STORAGE EXTERNAL;
  `,
};
