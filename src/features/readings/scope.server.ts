import type { Actor } from '@/lib/actor';
import { notFound } from '@/lib/problem';
import { Reading } from '@/server/models';
import type { Action } from '@/features/workspaces';
import { authorise, workspaceIds, type Access } from '@/features/workspaces/index.server';
import type { ReadingSummaryResult } from './readings';

export const resultOf = (reading: Reading): ReadingSummaryResult | null =>
  reading.result as unknown as ReadingSummaryResult | null;

export const hrefOf = (reading: Reading): string =>
  `/w/${reading.workspaceId}/c/${reading.communityId}/readings/${reading.id}?snapshot=${reading.snapshotId}`;

/** @throws ProblemError 404 for outsiders, 403 where the role does not allow `action`. */
export async function readingFor(
  actor: Actor,
  id: string,
  action: Action,
): Promise<{ reading: Reading; access: Access }> {
  const reading = await Reading.findOne({ where: { id, workspaceId: workspaceIds(actor) } });
  if (!reading) throw notFound();
  return { reading, access: await authorise(actor, reading.workspaceId, action) };
}
