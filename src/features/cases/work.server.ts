import type { Transaction } from 'sequelize';
import type * as z from 'zod';
import type { Actor } from '@/lib/actor';
import { conflict, unprocessable } from '@/lib/problem';
import { Case, CaseEvent, Membership, sequelize } from '@/server/models';
import { audit } from '@/features/workspaces/index.server';
import { can } from '@/features/workspaces';
import type { Role } from '@/lib/actor';
import type { CaseDetail, CaseEventView, changeCaseSchema, decideSchema, reopenSchema } from './cases';
import { getCase } from './case.server';
import { peopleByIds } from './present.server';
import { outcomeOf } from './rules';
import { caseFor } from './scope.server';

type Changes = Parameters<Case['update']>[0];

const log = (
  row: Case,
  actor: Actor,
  kind: CaseEventView['kind'],
  body: Record<string, unknown>,
  transaction: Transaction,
): Promise<CaseEvent> =>
  CaseEvent.create(
    { caseId: row.id, workspaceId: row.workspaceId, actorId: actor.userId, kind, body },
    { transaction },
  );

/** Applies changes only to the version that the person saw, and writes the log and the audit line with them. */
async function apply(
  actor: Actor,
  row: Case,
  version: number,
  changes: Changes,
  event: { kind: CaseEventView['kind']; body: Record<string, unknown> },
): Promise<void> {
  await sequelize.transaction(async (transaction) => {
    const [count] = await Case.update({ ...changes, version: version + 1 } as never, {
      where: { id: row.id, version },
      transaction,
    });
    if (count === 0) {
      const fresh = await Case.findByPk(row.id);
      const by = fresh?.decidedBy
        ? (await peopleByIds([fresh.decidedBy])).get(fresh.decidedBy)?.name
        : undefined;
      throw conflict(
        'case-changed',
        `${by ?? 'Somebody'} changed this case meanwhile. Yours hasn’t been recorded.`,
      );
    }
    await log(row, actor, event.kind, event.body, transaction);
    await audit(
      {
        workspaceId: row.workspaceId,
        actorId: actor.userId,
        action: `case.${event.kind}`,
        targetKind: 'case',
        targetId: row.id,
      },
      transaction,
    );
  });
}

/** Assigns, prioritises or dates a case. */
export async function changeCase(
  actor: Actor,
  id: string,
  input: z.output<typeof changeCaseSchema>,
): Promise<CaseDetail> {
  const { row } = await caseFor(actor, id, 'cases.work');
  const { version, ...changes } = input;
  if (changes.assigneeId) {
    const membership = await Membership.findOne({
      where: { workspaceId: row.workspaceId, userId: changes.assigneeId },
    });
    if (!membership || !can(membership.role as Role, 'cases.work'))
      throw unprocessable('not-a-reviewer', 'That person does not work cases in this workspace.');
  }
  const assigned = changes.assigneeId !== undefined;
  const name = changes.assigneeId
    ? (await peopleByIds([changes.assigneeId])).get(changes.assigneeId)?.name
    : undefined;
  await apply(actor, row, version, changes, {
    kind: assigned ? 'assigned' : 'changed',
    body: { ...changes, ...(assigned ? { assigneeName: name ?? null } : {}) },
  });
  return getCase(actor, id);
}

export async function addNote(actor: Actor, id: string, body: string): Promise<CaseDetail> {
  const { row } = await caseFor(actor, id, 'cases.work');
  await sequelize.transaction((transaction) => log(row, actor, 'note', { text: body }, transaction));
  return getCase(actor, id);
}

/** Records a decision and its reason. A closed case must be reopened first. */
export async function decideCase(
  actor: Actor,
  id: string,
  input: z.output<typeof decideSchema>,
): Promise<CaseDetail> {
  const { row } = await caseFor(actor, id, 'cases.work');
  if (row.state === 'closed')
    throw conflict(
      'case-closed',
      'This case has been decided. Yours hasn’t been recorded; reopen it to decide again.',
    );
  const outcome = outcomeOf(input.decision, actor.userId, row.escalationBy);
  const decided = outcome.decision !== null;
  await apply(
    actor,
    row,
    input.version ?? row.version,
    {
      state: outcome.state,
      decision: outcome.decision,
      reason: decided ? input.reason : null,
      escalationBy: outcome.escalationBy,
      dueOn: input.lookAgainOn ?? (decided ? null : row.dueOn),
      decidedAt: decided ? new Date() : null,
      decidedBy: decided ? actor.userId : null,
    },
    { kind: outcome.event, body: { decision: input.decision, reason: input.reason } },
  );
  return getCase(actor, id);
}

/** Opens a decided case again; the earlier decision stays in the log. */
export async function reopenCase(
  actor: Actor,
  id: string,
  input: z.output<typeof reopenSchema>,
): Promise<CaseDetail> {
  const { row } = await caseFor(actor, id, 'cases.work');
  if (row.state === 'open') throw conflict('case-open', 'This case is open already.');
  await apply(
    actor,
    row,
    input.version ?? row.version,
    { state: 'open', decision: null, reason: null, escalationBy: null, decidedAt: null, decidedBy: null },
    { kind: 'reopened', body: { reason: input.reason } },
  );
  return getCase(actor, id);
}
