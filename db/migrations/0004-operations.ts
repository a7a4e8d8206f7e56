import type { Migration } from './types';

/** Background jobs as people see them, the processes that run them, and mail waiting to be sent. */
export const operations: Migration = {
  name: '0004-operations',
  up: `
    CREATE TABLE jobs (
      id uuid PRIMARY KEY, workspace_id uuid REFERENCES workspaces ON DELETE CASCADE, kind text NOT NULL,
      target_id text NOT NULL,
      state text NOT NULL DEFAULT 'queued' CHECK (state IN ('queued','running','succeeded','failed','cancelled')),
      progress double precision NOT NULL DEFAULT 0 CHECK (progress >= 0 AND progress <= 1),
      step text NOT NULL DEFAULT 'Waiting for its turn', error jsonb, result jsonb, attempts integer NOT NULL DEFAULT 0,
      cancel_requested boolean NOT NULL DEFAULT false, worker_id text, heartbeat_at timestamptz, created_by text,
      created_at timestamptz NOT NULL DEFAULT now(), started_at timestamptz, finished_at timestamptz);
    CREATE INDEX jobs_target ON jobs (target_id);
    CREATE INDEX jobs_running ON jobs (heartbeat_at) WHERE state = 'running';
    CREATE TABLE worker_processes (
      id text PRIMARY KEY, started_at timestamptz NOT NULL DEFAULT now(), heartbeat_at timestamptz NOT NULL DEFAULT now());
    CREATE TABLE outgoing_mails (
      id uuid PRIMARY KEY, recipient text NOT NULL, subject text NOT NULL, text text NOT NULL, html text NOT NULL,
      sent_at timestamptz, created_at timestamptz NOT NULL DEFAULT now());
  `,
};
