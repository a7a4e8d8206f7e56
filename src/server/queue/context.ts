import type { JobResult } from '../models';

/** What a job handler is given. Everything else it loads by `targetId`. */
export interface JobContext {
  readonly jobId: string;
  readonly targetId: string;
  readonly workspaceId: string | null;
  readonly createdBy: string | null;
  /** 1 on the first run; more after a worker died or the database went away. */
  readonly attempt: number;
  /** Aborted when a person cancels or the worker is told to stop. */
  readonly signal: AbortSignal;
  /** Reports the share of the work done, 0…1, and the step in plain words. Cheap to call often. */
  progress(done: number, step: string): void;
}

/**
 * Does the work and returns what it made. Running one twice for the same target must do no harm:
 * a handler starts by removing what an earlier, interrupted run left.
 */
export type JobHandler = (context: JobContext) => Promise<JobResult | null>;

export interface JobKind {
  /** Loaded on first use, so that a worker starts quickly. */
  readonly load: () => Promise<JobHandler>;
  /** Called when a job of this kind ends without success, to mark its target. */
  readonly ended?: () => Promise<(targetId: string, state: 'failed' | 'cancelled') => Promise<void>>;
}

export type JobRegistry = Readonly<Record<string, JobKind>>;
