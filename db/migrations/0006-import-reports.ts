import type { Migration } from './types';

/** Problems of an import by kind, and choices kept as recipes. */
export const importReports: Migration = {
  name: '0006-import-reports',
  up: `
    ALTER TABLE imports ADD COLUMN problem_kinds jsonb;
    ALTER TABLE import_problems ADD COLUMN kind integer NOT NULL DEFAULT 0;
    CREATE INDEX import_problems_kind ON import_problems (import_id, kind, ordinal);
    CREATE TABLE import_recipes (
      id uuid PRIMARY KEY, workspace_id uuid NOT NULL REFERENCES workspaces ON DELETE CASCADE,
      community_id uuid NOT NULL REFERENCES communities ON DELETE CASCADE, name text NOT NULL,
      options jsonb NOT NULL, shared boolean NOT NULL DEFAULT false, created_by text NOT NULL,
      created_at timestamptz NOT NULL DEFAULT now(), updated_at timestamptz NOT NULL DEFAULT now());
    CREATE INDEX import_recipes_workspace ON import_recipes (workspace_id, community_id);
  `,
};
