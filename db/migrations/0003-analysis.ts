import type { Migration } from './types';

/** Groupings, readings, cases, saved views. */
export const analysis: Migration = {
  name: '0003-analysis',
  up: `
    CREATE TABLE groupings (
      id uuid PRIMARY KEY, workspace_id uuid NOT NULL REFERENCES workspaces ON DELETE CASCADE,
      community_id uuid NOT NULL REFERENCES communities ON DELETE CASCADE,
      snapshot_id uuid NOT NULL REFERENCES snapshots ON DELETE CASCADE, name text NOT NULL,
      method text NOT NULL CHECK (method IN ('fiedler', 'spectral', 'louvain')), laplacian text NOT NULL, cut text,
      options jsonb NOT NULL, seed integer NOT NULL,
      state text NOT NULL DEFAULT 'queued' CHECK (state IN ('queued', 'ready', 'failed')), k integer, result jsonb,
      version text NOT NULL, created_by text, created_at timestamptz NOT NULL DEFAULT now(), finished_at timestamptz);
    CREATE INDEX groupings_snapshot ON groupings (snapshot_id, created_at DESC);
    CREATE TABLE grouping_members (
      grouping_id uuid NOT NULL REFERENCES groupings ON DELETE CASCADE, ordinal integer NOT NULL, group_index integer,
      vector double precision, PRIMARY KEY (grouping_id, ordinal));
    CREATE TABLE readings (
      id uuid PRIMARY KEY, workspace_id uuid NOT NULL REFERENCES workspaces ON DELETE CASCADE,
      community_id uuid NOT NULL REFERENCES communities ON DELETE CASCADE,
      snapshot_id uuid NOT NULL REFERENCES snapshots ON DELETE CASCADE,
      attribute_id uuid NOT NULL REFERENCES attributes ON DELETE CASCADE, attribute text NOT NULL,
      filter jsonb NOT NULL, laplacian text NOT NULL, options jsonb NOT NULL, seed integer NOT NULL,
      state text NOT NULL DEFAULT 'queued' CHECK (state IN ('queued', 'ready', 'failed')), result jsonb,
      version text NOT NULL, created_by text, created_at timestamptz NOT NULL DEFAULT now(), finished_at timestamptz);
    CREATE INDEX readings_snapshot ON readings (snapshot_id, created_at DESC);
    CREATE TABLE reading_members (
      reading_id uuid NOT NULL REFERENCES readings ON DELETE CASCADE, ordinal integer NOT NULL,
      value double precision, smoothed double precision, standard_error double precision, departure double precision,
      leverage double precision, z double precision, p double precision, q double precision,
      observed boolean NOT NULL, tested boolean NOT NULL, neighbours integer NOT NULL,
      local_i double precision, local_expectation double precision, local_variance double precision,
      local_z double precision, local_p double precision, local_q double precision, quadrant text,
      PRIMARY KEY (reading_id, ordinal));
    CREATE TABLE cases (
      id uuid PRIMARY KEY, number integer NOT NULL, workspace_id uuid NOT NULL REFERENCES workspaces ON DELETE CASCADE,
      community_id uuid NOT NULL REFERENCES communities ON DELETE CASCADE,
      snapshot_id uuid NOT NULL REFERENCES snapshots ON DELETE CASCADE,
      reading_id uuid NOT NULL REFERENCES readings ON DELETE CASCADE,
      member_id uuid NOT NULL REFERENCES community_members ON DELETE CASCADE, ordinal integer NOT NULL,
      state text NOT NULL DEFAULT 'open' CHECK (state IN ('open', 'watching', 'closed')), assignee_id text,
      priority text NOT NULL DEFAULT 'normal' CHECK (priority IN ('low', 'normal', 'high')), due_on date,
      decision text CHECK (decision IN ('no-concern', 'keep-watching', 'reach-out', 'escalate', 'data-error')),
      reason text, evidence jsonb NOT NULL, version integer NOT NULL DEFAULT 1, opened_by text,
      created_at timestamptz NOT NULL DEFAULT now(), decided_at timestamptz, decided_by text, escalation_by text,
      UNIQUE (workspace_id, number), UNIQUE (reading_id, member_id), CHECK (decision IS NULL OR reason IS NOT NULL));
    CREATE INDEX cases_community ON cases (community_id, state);
    CREATE TABLE case_events (
      id uuid PRIMARY KEY, case_id uuid NOT NULL REFERENCES cases ON DELETE CASCADE,
      workspace_id uuid NOT NULL REFERENCES workspaces ON DELETE CASCADE, actor_id text, kind text NOT NULL,
      body jsonb NOT NULL, created_at timestamptz NOT NULL DEFAULT now());
    CREATE INDEX case_events_case ON case_events (case_id, created_at);
    CREATE FUNCTION refuse_change() RETURNS trigger LANGUAGE plpgsql AS
      $$ BEGIN RAISE EXCEPTION 'this log is only ever appended to'; END $$;
    CREATE TRIGGER case_events_append_only BEFORE UPDATE ON case_events FOR EACH ROW EXECUTE FUNCTION refuse_change();
    CREATE TRIGGER audit_entries_append_only BEFORE UPDATE ON audit_entries FOR EACH ROW EXECUTE FUNCTION refuse_change();
    CREATE TABLE views (
      id uuid PRIMARY KEY, workspace_id uuid NOT NULL REFERENCES workspaces ON DELETE CASCADE,
      community_id uuid NOT NULL REFERENCES communities ON DELETE CASCADE,
      snapshot_id uuid REFERENCES snapshots ON DELETE SET NULL, name text NOT NULL, note text NOT NULL DEFAULT '',
      place text NOT NULL CHECK (place IN ('map', 'members')), state jsonb NOT NULL, follow boolean NOT NULL DEFAULT false,
      visibility text NOT NULL DEFAULT 'private' CHECK (visibility IN ('private', 'workspace')),
      pinned boolean NOT NULL DEFAULT false, owner_id text NOT NULL, version integer NOT NULL DEFAULT 1,
      created_at timestamptz NOT NULL DEFAULT now(), updated_at timestamptz NOT NULL DEFAULT now());
    CREATE INDEX views_community ON views (community_id, updated_at DESC);
    CREATE TABLE view_shares (
      id uuid PRIMARY KEY, view_id uuid NOT NULL REFERENCES views ON DELETE CASCADE, user_id text, role text,
      can_edit boolean NOT NULL DEFAULT false, created_by text NOT NULL, created_at timestamptz NOT NULL DEFAULT now(),
      CHECK ((user_id IS NULL) <> (role IS NULL)));
    CREATE UNIQUE INDEX view_shares_once ON view_shares (view_id, coalesce(user_id, ''), coalesce(role, ''));
    CREATE TABLE view_comments (
      id uuid PRIMARY KEY, view_id uuid NOT NULL REFERENCES views ON DELETE CASCADE, author_id text NOT NULL,
      body text NOT NULL, created_at timestamptz NOT NULL DEFAULT now());
  `,
};
