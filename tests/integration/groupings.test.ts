/**
 * Groupings through endpoint, queue and thread. Expected values: tests/reference/data/karate/reference.json
 * (Zachary 1977; partitions by networkx, igraph and R), keys `partition.` and `given_partitions.club`.
 */
import type { APIRoute } from 'astro';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import type { Comparison, GroupingMemberView, GroupingView } from '@/features/groupings';
import type { JobView } from '@/features/jobs';
import { makeReferenceWorld, type ReferenceWorld } from '../factories/reference-world';
import { compare } from '../reference/compare';
import { call } from './call';
import { createTestDatabase, type TestDatabase } from './database';

let database: TestDatabase;
let models: typeof import('@/server/models');
let world: ReferenceWorld;
let make: APIRoute;
let list: APIRoute;
let get: APIRoute;
let patch: APIRoute;
let members: APIRoute;
let membersCsv: APIRoute;
let compareRoute: APIRoute;

beforeAll(async () => {
  database = await createTestDatabase();
  models = await import('@/server/models');
  world = await makeReferenceWorld();
  ({ GET: list, POST: make } = await import('@/pages/api/v1/snapshots/[snapshot]/groupings'));
  ({ GET: get, PATCH: patch } = await import('@/pages/api/v1/groupings/[grouping]/index'));
  ({ GET: members } = await import('@/pages/api/v1/groupings/[grouping]/members'));
  ({ GET: membersCsv } = await import('@/pages/api/v1/groupings/[grouping]/members.csv'));
  ({ GET: compareRoute } = await import('@/pages/api/v1/groupings/[grouping]/compare'));
});

afterAll(async () => {
  await models.sequelize.close();
  await database.drop();
});

async function run(jobId: string): Promise<InstanceType<typeof models.Job>> {
  const { runJob } = await import('@/server/queue');
  const { groupingJob, groupingEnded } = await import('@/features/groupings/index.server');
  const registry = {
    grouping: { load: () => Promise.resolve(groupingJob), ended: () => Promise.resolve(groupingEnded) },
  };
  await runJob(registry, jobId, 'test-worker', new AbortController().signal);
  return (await models.Job.findByPk(jobId))!;
}

const ask = (body: unknown, actor = world.analyst): Promise<Response> =>
  call(make, { actor, params: { snapshot: world.snapshotId }, body });

/** Makes a grouping as a person would and waits for its job. */
async function grouping(body: unknown): Promise<GroupingView> {
  const response = await ask(body);
  expect(response.status).toBe(202);
  const { job } = (await response.json()) as { job: JobView };
  expect(response.headers.get('location')).toBe(`/api/v1/jobs/${job.id}`);
  const done = await run(job.id);
  expect(done.error).toBeNull();
  expect(done.state).toBe('succeeded');
  expect(done.result).toMatchObject({ kind: 'grouping', href: `/api/v1/groupings/${done.result!.id}` });
  return view(done.result!.id);
}

const view = async (id: string): Promise<GroupingView> =>
  (await (await call(get, { actor: world.analyst, params: { grouping: id } })).json()) as GroupingView;

const membersOf = async (id: string): Promise<GroupingMemberView[]> => {
  const response = await call(members, {
    actor: world.analyst,
    params: { grouping: id },
    query: { limit: '10000' },
  });
  return ((await response.json()) as { items: GroupingMemberView[] }).items;
};

describe('the karate club, split in two', () => {
  test('by the sign of the Fiedler vector: 19 and 15, conductance 0.1515', async () => {
    const found = await grouping({ method: 'fiedler', laplacian: 'combinatorial', cut: 'sign' });
    const { expected } = world.reference;
    const items = await membersOf(found.id);
    expect(items.map((one) => one.externalId)).toEqual(world.reference.ids);
    const labels = items.map((one) => one.group!);
    compare(labels, expected['partition.sign_cut_L.partition']!, 'partition');
    compare(
      items.map((one) => one.vector!),
      expected['partition.fiedler_L']!,
      'fiedler vector',
    );
    compare(found.eigenvalues[1], expected['partition.lambda2_L']!, 'λ₂');
    compare(found.modularity, expected['partition.sign_cut_L.modularity']!, 'modularity');
    compare(found.normalisedCut, expected['partition.sign_cut_L.ncut']!, 'normalised cut');
    expect(found.groups.map((group) => group.size)).toEqual([19, 15]);
    for (const group of found.groups) {
      compare(group.conductance, expected['partition.sign_cut_L.conductance']!, 'conductance');
      compare(group.cut, expected['partition.sign_cut_L.cut']!, 'cut');
    }
    // Published: 32 of 34 members go with the faction that they joined.
    const first = labels.map((label) => label === 1);
    const club = world.reference.signals.club!.map((name) => name === 'Mr. Hi');
    const agree = first.filter((one, i) => one === club[i]).length;
    compare(Math.max(agree, 34 - agree), expected['published.sign_fiedler_agreement']!, 'agreement');
    expect(found.groups.map((group) => [group.letter, group.name])).toEqual([
      ['A', 'Officer'],
      ['B', 'Mr. Hi'],
    ]);
    expect(found.scope).toEqual({ members: 34, component: 0 });
  });

  test('along the sweep: 18 and 16, conductance 0.1316', async () => {
    const found = await grouping({ laplacian: 'combinatorial', cut: 'sweep', minimumSize: 1 });
    const { expected } = world.reference;
    compare(
      (await membersOf(found.id)).map((one) => one.group!),
      expected['partition.sweep_L.partition']!,
      'partition',
    );
    compare(found.groups[0]!.conductance, expected['partition.sweep_L.conductance']!, 'conductance');
    expect(found.groups.map((group) => group.size)).toEqual([18, 16]);
    const { lower, upper } = found.cheeger!;
    expect(found.groups[0]!.conductance).toBeGreaterThanOrEqual(lower);
    expect(found.groups[0]!.conductance).toBeLessThanOrEqual(upper);
  });

  test('several at once, Louvain, and a split of one group', async () => {
    const spectral = await grouping({ method: 'spectral', k: 2, seed: 5 });
    expect(spectral.k).toBe(2);
    expect(spectral.gaps!.map((gap) => gap.k)).toContain(2);
    expect(spectral.groups.reduce((sum, group) => sum + group.size, 0)).toBe(34);
    const louvain = await grouping({ method: 'louvain', seed: 3 });
    const again = await grouping({ method: 'louvain', seed: 3 });
    expect(again.groups).toEqual(louvain.groups);
    // Louvain is greedy: at most the best known modularity of this network (Brandes et al. 2008), and near it.
    expect(louvain.modularity!).toBeGreaterThan(0.38);
    expect(louvain.modularity!).toBeLessThanOrEqual(0.4199);
    const split = await grouping({ within: { grouping: spectral.id, group: 0 } });
    expect(split.groups).toHaveLength(3);
    const before = await membersOf(spectral.id);
    const after = await membersOf(split.id);
    const rest = before.map((one, i) => [one.group, after[i]!.group]).filter(([group]) => group === 1);
    expect(new Set(rest.map(([, group]) => group)).size).toBe(1);
  });
});

test('ties between groups and boundary members are counted from the ties', async () => {
  const found = await grouping({ laplacian: 'combinatorial', cut: 'sign' });
  const labels = (await membersOf(found.id)).map((one) => one.group!);
  const crossing = world.reference.edges.filter(([a, b]) => labels[a] !== labels[b]);
  expect(found.between.weights[0]![1]).toBe(crossing.length);
  expect(found.between.perThousand[0]![1]).toBeCloseTo((1000 * crossing.length) / (19 * 15), 10);
  const [first] = found.boundary;
  const at = world.reference.ids.indexOf(first!.externalId!);
  const own = crossing.filter(([a, b]) => a === at || b === at).length;
  expect(first!.across).toBe(own);
  expect(own).toBeGreaterThan(0);
});

test('two groupings are compared, and a grouping with a label attribute', async () => {
  const sign = await grouping({ laplacian: 'combinatorial', cut: 'sign' });
  const against = async (id: string): Promise<Comparison> =>
    (await (
      await call(compareRoute, { actor: world.analyst, params: { grouping: sign.id }, query: { with: id } })
    ).json()) as Comparison;
  const itself = await against(sign.id);
  expect(itself.adjustedRand).toBe(1);
  expect(itself.normalisedMutualInformation).toBeCloseTo(1, 12);
  expect(itself.table).toEqual({
    rows: ['A', 'B'],
    columns: ['A', 'B'],
    counts: [
      [19, 0],
      [0, 15],
    ],
  });
  const club = await against(world.attributes.club!);
  expect(club.table.columns).toEqual(['Mr. Hi', 'Officer']);
  // 32 of 34 agree; both that do not sit with the larger group: 2 + 17 and 15 + 0.
  expect(club.table.counts).toEqual([
    [2, 17],
    [15, 0],
  ]);
  const missing = await call(compareRoute, {
    actor: world.analyst,
    params: { grouping: sign.id },
    query: { with: world.attributes.score! },
  });
  expect(missing.status).toBe(404);
});

test('names can be changed, paging is whole, the export holds every member', async () => {
  const found = await grouping({ name: 'Two halves', laplacian: 'combinatorial', cut: 'sign' });
  expect(found.name).toBe('Two halves');
  const response = await call(patch, {
    actor: world.analyst,
    method: 'PATCH',
    params: { grouping: found.id },
    body: {
      name: 'Factions',
      groups: [
        { index: 0, name: 'Office' },
        { index: 1, name: '' },
      ],
    },
  });
  const changed = (await response.json()) as GroupingView;
  expect([changed.name, changed.groups[0]!.name, changed.groups[1]!.name]).toEqual([
    'Factions',
    'Office',
    null,
  ]);
  const pages: GroupingMemberView[] = [];
  let cursor: string | null = null;
  do {
    const page: Response = await call(members, {
      actor: world.analyst,
      params: { grouping: found.id },
      query: { limit: '10', ...(cursor === null ? {} : { cursor }) },
    });
    const { items, nextCursor } = (await page.json()) as {
      items: GroupingMemberView[];
      nextCursor: string | null;
    };
    pages.push(...items);
    cursor = nextCursor;
  } while (cursor !== null);
  expect(pages).toEqual(await membersOf(found.id));
  const csv = await (await call(membersCsv, { actor: world.analyst, params: { grouping: found.id } })).text();
  expect(csv.trim().split('\r\n')).toHaveLength(35);
  expect(csv).toContain('Office');
});

test('a rerun of the job leaves the same rows once; a stopped one leaves nothing', async () => {
  const found = await grouping({ laplacian: 'combinatorial', cut: 'sign' });
  const before = await membersOf(found.id);
  const { groupingJob } = await import('@/features/groupings/index.server');
  await groupingJob({
    jobId: 'again',
    targetId: found.id,
    workspaceId: null,
    createdBy: null,
    attempt: 2,
    signal: new AbortController().signal,
    progress: () => undefined,
  });
  expect(await membersOf(found.id)).toEqual(before);

  const { job } = (await (await ask({ cut: 'median' })).json()) as { job: JobView };
  const row = (await models.Job.findByPk(job.id))!;
  await row.update({ cancelRequested: true });
  expect((await run(job.id)).state).toBe('cancelled');
  expect(await models.Grouping.findByPk(row.targetId)).toBeNull();
});

test('a stop in mid-work ends as cancelled, and no row is kept', async () => {
  const { job } = (await (await ask({ cut: 'median' })).json()) as { job: JobView };
  const row = (await models.Job.findByPk(job.id))!;
  const { groupingJob } = await import('@/features/groupings/index.server');
  const stop = new AbortController();
  const working = groupingJob({
    jobId: job.id,
    targetId: row.targetId,
    workspaceId: null,
    createdBy: null,
    attempt: 1,
    signal: stop.signal,
    progress: (_, step) => step === 'Saving' && stop.abort('cancelled'),
  });
  await expect(working).rejects.toBeDefined();
  expect(await models.GroupingMember.count({ where: { groupingId: row.targetId } })).toBe(0);
  expect((await models.Grouping.findByPk(row.targetId))!.state).toBe('queued');
});

test('what cannot be split fails with a plain sentence; what is malformed is refused', async () => {
  const response = await ask({ cut: 'sweep', minimumSize: 30 });
  const { job } = (await response.json()) as { job: JobView };
  const ended = await run(job.id);
  expect(ended.state).toBe('failed');
  expect(ended.error).toMatchObject({ status: 422 });
  expect(ended.error!.detail).toMatch(/30 members on both sides/);
  const shown = (await (
    await call(list, { actor: world.analyst, params: { snapshot: world.snapshotId } })
  ).json()) as { items: { id: string; state: string }[] };
  expect(shown.items.find((one) => one.id === ended.targetId)?.state).toBe('failed');
  for (const body of [{ method: 'voodoo' }, { method: 'spectral', k: 1 }, { tau: -1 }, { seed: 1.5 }])
    expect((await ask(body)).status).toBe(400);
});

test('viewers are refused, strangers find nothing', async () => {
  expect((await ask({}, world.viewer)).status).toBe(403);
  expect((await ask({}, world.stranger)).status).toBe(404);
});

test('a viewer reads a grouping only through a view that shows it, without small groups', async () => {
  const found = await grouping({ within: undefined, laplacian: 'combinatorial', cut: 'sign' });
  await models.Workspace.update({ smallestGroup: 16 }, { where: { id: world.workspaceId } });
  const shared = await models.View.create({
    workspaceId: world.workspaceId,
    communityId: world.communityId,
    snapshotId: world.snapshotId,
    name: 'Shown',
    place: 'map',
    state: { colour: { by: 'group', of: found.id } },
    visibility: 'workspace',
    ownerId: world.analyst.userId,
  });
  const params = { grouping: found.id };
  expect((await call(get, { actor: world.viewer, params })).status).toBe(403);
  const through = await call(get, { actor: world.viewer, params, query: { view: shared.id } });
  const seen = (await through.json()) as GroupingView;
  expect(seen.groups.map((group) => group.size)).toEqual([19]);
  expect(JSON.stringify(seen)).not.toContain('"m1"');
  const rows = await call(members, { actor: world.viewer, params, query: { view: shared.id, limit: '100' } });
  const { items } = (await rows.json()) as { items: GroupingMemberView[] };
  expect(items.filter((one) => one.group === 1)).toHaveLength(0);
  expect(items.every((one) => one.externalId === null && one.name === null && one.code)).toBe(true);
  const other = await grouping({ cut: 'median' });
  const hidden = await call(get, {
    actor: world.viewer,
    params: { grouping: other.id },
    query: { view: shared.id },
  });
  expect(hidden.status).toBe(404);
  await models.Workspace.update({ smallestGroup: 5 }, { where: { id: world.workspaceId } });
});
