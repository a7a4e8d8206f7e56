/** Cases through their endpoints on real PostgreSQL: from a reading to a decision, and who may do what. */
import type { APIRoute } from 'astro';
import { afterAll, beforeAll, beforeEach, describe, expect, test } from 'vitest';
import type { CaseDetail, CasesPreview, CaseView } from '@/features/cases';
import type { Actor } from '@/lib/actor';
import type { ProblemDocument } from '@/lib/problem';
import { APART, BELOW_FLOOR, makeCaseWorld, type CaseWorld } from '../factories/cases';
import { call } from './call';
import { createTestDatabase, type TestDatabase } from './database';

let database: TestDatabase;
let models: typeof import('@/server/models');
let world: CaseWorld;
let readingId: string;
let openRoute: APIRoute;
let list: APIRoute;
let get: APIRoute;
let change: APIRoute;
let decideRoute: APIRoute;
let noteRoute: APIRoute;
let reopenRoute: APIRoute;

beforeAll(async () => {
  database = await createTestDatabase();
  models = await import('@/server/models');
  world = await makeCaseWorld();
  ({ POST: openRoute } = await import('@/pages/api/v1/readings/[reading]/cases'));
  ({ GET: list } = await import('@/pages/api/v1/workspaces/[workspace]/cases'));
  ({ GET: get, PATCH: change } = await import('@/pages/api/v1/cases/[case]/index'));
  ({ POST: decideRoute } = await import('@/pages/api/v1/cases/[case]/decisions'));
  ({ POST: noteRoute } = await import('@/pages/api/v1/cases/[case]/notes'));
  ({ POST: reopenRoute } = await import('@/pages/api/v1/cases/[case]/reopen'));
});

afterAll(async () => {
  await models.sequelize.close();
  await database.drop();
});

beforeEach(async () => {
  await models.Reading.destroy({ where: { workspaceId: world.workspaceId } });
  readingId = await world.makeReading();
});

const REASON = 'Three raters marked one thread; the ratings look mistaken.';
const open = (body: unknown, actor: Actor | null = world.first) =>
  call(openRoute, { actor, params: { reading: readingId }, body });
const post = (route: APIRoute, id: string, body: unknown, actor: Actor = world.first) =>
  call(route, { actor, params: { case: id }, body });
const patch = (id: string, body: unknown, actor: Actor = world.first) =>
  call(change, { actor, method: 'PATCH', params: { case: id }, body });
const read = async (id: string, actor: Actor = world.first): Promise<CaseDetail> =>
  (await (await call(get, { actor, params: { case: id } })).json()) as CaseDetail;

async function opened(threshold = 0.1): Promise<CaseView[]> {
  const response = await open({ threshold });
  expect(response.status).toBe(201);
  return ((await response.json()) as { items: CaseView[] }).items;
}
const one = async (): Promise<CaseView> => (await opened())[0]!;

describe('opening from a reading', () => {
  test('the preview counts, says how many are likely false, and opens nothing', async () => {
    const response = await open({ preview: true, threshold: 0.1 });
    expect(response.status).toBe(200);
    const preview = (await response.json()) as CasesPreview;
    expect(preview).toMatchObject({ preview: true, count: 3, alreadyOpen: 0, threshold: 0.1 });
    expect(preview.expectedFalse).toBeCloseTo(3 * 0.1, 12);
    const { offsets, n } = world.reference.network;
    const few = Array.from({ length: n }, (_, i) => offsets[i + 1]! - offsets[i]!).filter((d) => d < 3);
    expect(preview.leftOut).toEqual({ tooFewNeighbours: few.length, noScore: 0 });
    expect(await models.Case.count()).toBe(0);
  });

  test('one case for each member past the threshold, with the evidence of that moment', async () => {
    const items = await opened();
    expect(items.map((item) => item.member.externalId)).toEqual(
      APART.map(({ ordinal }) => world.reference.ids[ordinal]),
    );
    expect(items.map((item) => item.q)).toEqual(APART.map(({ q }) => q));
    expect(new Set(items.map((item) => item.number)).size).toBe(3);
    const detail = await read(items[0]!.id);
    const value = world.reference.signals.score![0] as number;
    expect(detail.evidence).toMatchObject({ attribute: 'score', value, departure: -2, threshold: 0.1 });
    expect(detail.evidence.predicted).toBeCloseTo(value + 2, 12);
    expect(detail.neighbourhood.items).toHaveLength(detail.evidence.neighbours);
    expect(detail.events.map((event) => event.kind)).toEqual(['opened']);
  });

  test('a lower threshold opens fewer', async () => {
    expect(await opened(0.05)).toHaveLength(2);
  });

  test('twice opens once, also when both ask at the same moment', async () => {
    const answers = await Promise.all([open({ threshold: 0.1 }), open({ threshold: 0.1 }, world.second)]);
    expect(answers.map((answer) => answer.status)).toEqual([201, 201]);
    expect(await models.Case.count()).toBe(3);
    expect(await opened()).toEqual([]);
    const preview = (await (await open({ preview: true })).json()) as CasesPreview;
    expect(preview).toMatchObject({ count: 0, alreadyOpen: 3 });
  });

  test('a member below the neighbour floor gets no case, even when named', async () => {
    const row = await models.SnapshotMember.findOne({
      where: { snapshotId: world.snapshotId, ordinal: BELOW_FLOOR },
    });
    const response = await open({ threshold: 0.5, members: [row!.memberId] });
    expect(((await response.json()) as { items: CaseView[] }).items).toEqual([]);
  });

  test('a sensitive attribute is refused', async () => {
    const where = { where: { id: world.attributes.score! } };
    await models.Attribute.update({ sensitive: true }, where);
    const response = await open({ threshold: 0.1 });
    await models.Attribute.update({ sensitive: false }, where);
    expect(response.status).toBe(422);
    expect(((await response.json()) as { type: string }).type).toContain('sensitive-attribute');
    expect(await models.Case.count()).toBe(0);
  });
});

describe('deciding', () => {
  test('needs a reason of ten characters or more', async () => {
    const { id, version } = await one();
    for (const reason of ['', 'too short', '          ']) {
      const response = await post(decideRoute, id, { version, decision: 'no-concern', reason });
      expect(response.status).toBe(400);
      const { errors } = (await response.json()) as ProblemDocument;
      expect(errors!.map((error) => error.path)).toEqual(['reason']);
    }
    expect((await read(id)).state).toBe('open');
  });

  test('closes with decision, reason and an audit line', async () => {
    const { id, version } = await one();
    const response = await post(decideRoute, id, { version, decision: 'No concern', reason: REASON });
    expect(response.status).toBe(201);
    expect(await response.json()).toMatchObject({ state: 'closed', decision: 'no-concern', reason: REASON });
    const line = await models.AuditEntry.findOne({ where: { targetId: id, action: 'case.decision' } });
    expect(line!.actorId).toBe(world.first.userId);
  });

  test('keep watching keeps a day to look again', async () => {
    const { id, version } = await one();
    const body = { version, decision: 'keep-watching', reason: REASON, lookAgainOn: '2026-12-24' };
    const detail = (await (await post(decideRoute, id, body)).json()) as CaseDetail;
    expect(detail).toMatchObject({ state: 'watching', dueOn: '2026-12-24' });
  });

  test('escalating takes a second person', async () => {
    const { id } = await one();
    const escalate = async (actor: Actor): Promise<CaseDetail> => {
      const { version } = await read(id);
      const body = { version, decision: 'escalate', reason: REASON };
      return (await (await post(decideRoute, id, body, actor)).json()) as CaseDetail;
    };
    const proposed = await escalate(world.first);
    expect(proposed).toMatchObject({ state: 'open', decision: null });
    expect(proposed.escalationBy).toEqual({ id: world.first.userId, name: 'Mara Moderator' });
    expect(await escalate(world.first)).toMatchObject({ state: 'open', decision: null });
    expect(await escalate(world.second)).toMatchObject({
      state: 'closed',
      decision: 'escalate',
      escalationBy: null,
    });
  });

  test('a stale version is a conflict and changes nothing', async () => {
    const { id, version } = await one();
    expect((await patch(id, { version, priority: 'high' }, world.second)).status).toBe(200);
    const late = await post(decideRoute, id, { version, decision: 'no-concern', reason: REASON });
    expect(late.status).toBe(409);
    expect(await read(id)).toMatchObject({ state: 'open', decision: null, version: version + 1 });
  });

  test('of two decisions at once exactly one is recorded', async () => {
    const { id, version } = await one();
    const answers = await Promise.all([
      post(decideRoute, id, { version, decision: 'no-concern', reason: REASON }),
      post(decideRoute, id, { version, decision: 'data-error', reason: REASON }, world.second),
    ]);
    expect(answers.map((answer) => answer.status).sort()).toEqual([201, 409]);
    const { events } = await read(id);
    expect(events.filter((event) => event.kind === 'decision')).toHaveLength(1);
  });

  test('a decided case can be reopened with a reason; the earlier decision stays in the log', async () => {
    const { id, version } = await one();
    await post(decideRoute, id, { version, decision: 'data-error', reason: REASON });
    expect((await post(decideRoute, id, { decision: 'no-concern', reason: REASON })).status).toBe(409);
    expect((await post(reopenRoute, id, { reason: 'short' })).status).toBe(400);
    expect((await post(reopenRoute, id, { reason: 'The score was corrected since.' })).status).toBe(200);
    const detail = await read(id);
    expect(detail).toMatchObject({ state: 'open', decision: null, reason: null });
    expect(detail.events.map((event) => event.kind)).toEqual(['opened', 'decision', 'reopened']);
    expect(detail.events[1]!.body).toMatchObject({ decision: 'data-error', reason: REASON });
  });
});

describe('the log', () => {
  test('PostgreSQL refuses to change what was written', async () => {
    const { id } = await one();
    expect((await post(noteRoute, id, { body: 'Asked the raters.' })).status).toBe(201);
    await expect(
      models.CaseEvent.update(
        { body: { text: 'Nothing was asked.' } },
        { where: { caseId: id, kind: 'note' } },
      ),
    ).rejects.toThrow(/only ever appended/);
    expect((await read(id)).events.at(-1)!.body).toEqual({ text: 'Asked the raters.' });
  });
});

describe('who may', () => {
  test('only people who work cases can be given one', async () => {
    const { id, version } = await one();
    const refused = await patch(id, { version, assigneeId: world.analyst.userId });
    expect(refused.status).toBe(422);
    const given = await patch(id, { version, assigneeId: world.second.userId });
    expect(await given.json()).toMatchObject({ assignee: { name: 'Noor Moderator' }, version: version + 1 });
    const mine = await call(list, {
      actor: world.second,
      params: { workspace: world.workspaceId },
      query: { assignee: 'me' },
    });
    expect(((await mine.json()) as { items: CaseView[] }).items.map((item) => item.id)).toEqual([id]);
  });

  test('analysts read cases but do not work them', async () => {
    const { id, version } = await one();
    const detail = await read(id, world.analyst);
    expect(detail.abilities.work).toBe(false);
    const decision = { version, decision: 'no-concern', reason: REASON };
    expect((await post(decideRoute, id, decision, world.analyst)).status).toBe(403);
    expect((await post(noteRoute, id, { body: 'A note.' }, world.analyst)).status).toBe(403);
    expect((await patch(id, { version, priority: 'high' }, world.analyst)).status).toBe(403);
    expect((await read(id)).version).toBe(version);
  });

  test.each([
    ['a viewer is refused', 'viewer', 403],
    ['a stranger learns nothing of it', 'stranger', 404],
  ] as const)('%s', async (_, who, status) => {
    const { id } = await one();
    const actor = world[who];
    const decision = { decision: 'no-concern', reason: REASON };
    const answers = await Promise.all([
      call(get, { actor, params: { case: id } }),
      call(list, { actor, params: { workspace: world.workspaceId } }),
      open({ preview: true }, actor),
      post(decideRoute, id, decision, actor),
      post(noteRoute, id, { body: 'A note.' }, actor),
      post(reopenRoute, id, { reason: REASON }, actor),
    ]);
    expect(answers.map((answer) => answer.status)).toEqual(answers.map(() => status));
  });

  test('without a session: 401', async () => {
    expect((await open({ preview: true }, null)).status).toBe(401);
  });
});
