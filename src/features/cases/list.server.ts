import type { WhereOptions } from 'sequelize';
import type * as z from 'zod';
import type { Actor } from '@/lib/actor';
import { Case } from '@/server/models';
import { authorise } from '@/features/workspaces/index.server';
import type { CaseView, casesQuerySchema } from './cases';
import { presentCases } from './present.server';

/** Cases of a workspace, soonest due first, then oldest. */
export async function listCases(
  actor: Actor,
  workspaceId: string,
  query: z.output<typeof casesQuerySchema>,
): Promise<{ items: CaseView[]; total: number; nextCursor: string | null }> {
  const access = await authorise(actor, workspaceId, 'cases.read');
  const where: WhereOptions<Case> = { workspaceId };
  if (query.state !== 'any') where.state = query.state;
  if (query.community) where.communityId = query.community;
  if (query.assignee === 'me') where.assigneeId = actor.userId;
  else if (query.assignee === 'nobody') where.assigneeId = null;
  else if (query.assignee) where.assigneeId = query.assignee;
  const offset = Number.parseInt(query.cursor ?? '0', 10) || 0;
  const { rows, count } = await Case.findAndCountAll({
    where,
    order: [
      ['dueOn', 'ASC NULLS LAST'],
      ['number', 'ASC'],
    ],
    limit: query.limit,
    offset: Math.max(0, offset),
  });
  const next = offset + rows.length;
  return {
    items: await presentCases(actor, access, rows),
    total: count,
    nextCursor: next < count && rows.length > 0 ? String(next) : null,
  };
}
