import { expect } from 'vitest';
import type { Actor } from '@/lib/actor';
import type { JobView } from '@/features/jobs';
import type { LargeFiles } from '../../factories/large-files';
import { upload } from '../../factories/imports';
import { call } from '../call';
import { until } from './until';

/** Loads both files and answers with the job of their import. */
export async function beginImport(actor: Actor, communityId: string, files: LargeFiles): Promise<string> {
  const response = await upload(actor, communityId, files);
  expect(response.status).toBe(202);
  return ((await response.json()) as { job: JobView }).job.id;
}

/** Asks for a reading of the score with fixed options and answers with its job. */
export async function beginReading(actor: Actor, snapshotId: string): Promise<string> {
  const { POST } = await import('@/pages/api/v1/snapshots/[snapshot]/readings');
  const body = { attribute: 'score', permutations: 199, seed: 1 };
  const response = await call(POST, { actor, params: { snapshot: snapshotId }, body });
  expect(response.status).toBe(202);
  return ((await response.json()) as { job: JobView }).job.id;
}

type JobRow = InstanceType<(typeof import('@/server/models'))['Job']>;

/** Waits until a job is some way in; fails when it was over before anything could interrupt it. */
export async function midway(jobId: string, share = 0.1): Promise<JobRow> {
  const { Job } = await import('@/server/models');
  const row = await until(async () => {
    const job = await Job.findByPk(jobId);
    return job && (job.progress >= share || job.state !== 'queued' ? job.progress >= share && job : null);
  });
  expect(row.state).toBe('running');
  return row;
}

/** Waits for a job's end, through outages of the database. */
export async function ended(jobId: string, seconds = 90): Promise<JobRow> {
  const { Job } = await import('@/server/models');
  return until(async () => {
    const job = await Job.findByPk(jobId).catch(() => null);
    return job && !['queued', 'running'].includes(job.state) ? job : null;
  }, seconds);
}

/** The community has this one snapshot, whole, and no other. */
export async function expectOneSnapshot(
  actor: Actor,
  communityId: string,
  counts: LargeFiles['counts'],
): Promise<string> {
  const { Snapshot, SnapshotMember, Tie } = await import('@/server/models');
  const snapshots = await Snapshot.findAll({ where: { communityId } });
  expect(snapshots).toHaveLength(1);
  const { id } = snapshots[0]!;
  const { GET } = await import('@/pages/api/v1/snapshots/[snapshot]/index');
  const view: unknown = await (await call(GET, { actor, params: { snapshot: id } })).json();
  expect(view).toMatchObject(counts);
  expect(await SnapshotMember.count({ where: { snapshotId: id } })).toBe(counts.members);
  expect(await Tie.count({ where: { snapshotId: id } })).toBe(counts.ties);
  return id;
}

/** Every member's values of a reading, as exported. */
export async function valuesOf(actor: Actor, readingId: string): Promise<string> {
  const { GET } = await import('@/pages/api/v1/readings/[reading]/members.csv');
  const response = await call(GET, { actor, params: { reading: readingId } });
  expect(response.status).toBe(200);
  return response.text();
}
