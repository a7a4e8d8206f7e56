import type { Actor } from '@/lib/actor';
import { CaseEvent, type Case } from '@/server/models';
import type { Access } from '@/features/workspaces/index.server';
import { evidenceSchema, type CaseDetail, type CaseEventView } from './cases';
import { historyOf, neighbourhoodOf, othersOf } from './evidence.server';
import { peopleByIds, presentCases } from './present.server';
import { caseFor } from './scope.server';

async function eventsOf(row: Case): Promise<CaseEventView[]> {
  const events = await CaseEvent.findAll({
    where: { caseId: row.id },
    order: [
      ['createdAt', 'ASC'],
      ['id', 'ASC'],
    ],
  });
  const people = await peopleByIds(events.map((event) => event.actorId));
  return events.map((event) => ({
    id: event.id,
    kind: event.kind as CaseEventView['kind'],
    actor: event.actorId ? (people.get(event.actorId) ?? null) : null,
    body: event.body,
    createdAt: event.createdAt.toISOString(),
  }));
}

/** A case with everything that a person needs to judge it. */
export async function caseDetail(actor: Actor, access: Access, row: Case): Promise<CaseDetail> {
  const evidence = evidenceSchema.parse(row.evidence);
  const [[view], neighbourhood, history, others, events] = await Promise.all([
    presentCases(actor, access, [row]),
    neighbourhoodOf(actor, access, row),
    historyOf(row, evidence.attribute),
    othersOf(row, evidence.attribute),
    eventsOf(row),
  ]);
  return {
    ...view!,
    evidence,
    neighbourhood,
    history,
    others,
    events,
    abilities: { work: access.can('cases.work') },
  };
}

/** @throws ProblemError 404 for outsiders, 403 for roles that do not read cases */
export async function getCase(actor: Actor, id: string): Promise<CaseDetail> {
  const { row, access } = await caseFor(actor, id, 'cases.read');
  return caseDetail(actor, access, row);
}
