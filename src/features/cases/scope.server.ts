import type { Actor } from '@/lib/actor';
import { notFound } from '@/lib/problem';
import { Case, Reading } from '@/server/models';
import type { Action } from '@/features/workspaces';
import { authorise, workspaceIds, type Access } from '@/features/workspaces/index.server';

/** @throws ProblemError 404 for outsiders, 403 where the role does not allow `action`. */
export async function caseFor(
  actor: Actor,
  id: string,
  action: Action,
): Promise<{ row: Case; access: Access }> {
  const row = await Case.findOne({ where: { id, workspaceId: workspaceIds(actor) } });
  if (!row) throw notFound();
  return { row, access: await authorise(actor, row.workspaceId, action) };
}

/** A finished reading, for opening cases from it. */
export async function readingForCases(
  actor: Actor,
  id: string,
): Promise<{ reading: Reading; access: Access }> {
  const reading = await Reading.findOne({ where: { id, workspaceId: workspaceIds(actor), state: 'ready' } });
  if (!reading) throw notFound();
  return { reading, access: await authorise(actor, reading.workspaceId, 'cases.open') };
}
