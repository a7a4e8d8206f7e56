/**
 * Readings through endpoint, queue and thread. Expected values: tests/reference/data/karate/reference.json
 * (numpy/SciPy and R's spdep), keys `signals.score.` and `missing.score_missing.`.
 */
import type { APIRoute } from 'astro';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import type { JobView } from '@/features/jobs';
import type { ReadingMemberView, ReadingView } from '@/features/readings';
import { makeReferenceWorld, type ReferenceWorld } from '../factories/reference-world';
import { compare, near } from '../reference/compare';
import { call } from './call';
import { createTestDatabase, type TestDatabase } from './database';

let database: TestDatabase;
let models: typeof import('@/server/models');
let world: ReferenceWorld;
let make: APIRoute;
let list: APIRoute;
let get: APIRoute;
let members: APIRoute;
let membersCsv: APIRoute;

beforeAll(async () => {
  database = await createTestDatabase();
  models = await import('@/server/models');
  world = await makeReferenceWorld();
  ({ GET: list, POST: make } = await import('@/pages/api/v1/snapshots/[snapshot]/readings'));
  ({ GET: get } = await import('@/pages/api/v1/readings/[reading]/index'));
  ({ GET: members } = await import('@/pages/api/v1/readings/[reading]/members'));
  ({ GET: membersCsv } = await import('@/pages/api/v1/readings/[reading]/members.csv'));
});

afterAll(async () => {
  await models.sequelize.close();
  await database.drop();
});

async function run(jobId: string): Promise<InstanceType<typeof models.Job>> {
  const { runJob } = await import('@/server/queue');
  const { readingJob, readingEnded } = await import('@/features/readings/index.server');
  const registry = {
    reading: { load: () => Promise.resolve(readingJob), ended: () => Promise.resolve(readingEnded) },
  };
  await runJob(registry, jobId, 'test-worker', new AbortController().signal);
  return (await models.Job.findByPk(jobId))!;
}

const ask = (body: unknown, actor = world.analyst): Promise<Response> =>
  call(make, { actor, params: { snapshot: world.snapshotId }, body });

/** Takes a reading as a person would and waits for its job. */
async function reading(body: unknown): Promise<ReadingView> {
  const response = await ask(body);
  expect(response.status).toBe(202);
  const { job } = (await response.json()) as { job: JobView };
  const done = await run(job.id);
  expect(done.error).toBeNull();
  expect(done.result).toMatchObject({ kind: 'reading', href: `/api/v1/readings/${done.result!.id}` });
  return (await (
    await call(get, { actor: world.analyst, params: { reading: done.result!.id } })
  ).json()) as ReadingView;
}

const membersOf = async (id: string, query: Record<string, string> = {}): Promise<ReadingMemberView[]> => {
  const response = await call(members, {
    actor: world.analyst,
    params: { reading: id },
    query: { limit: '10000', ...query },
  });
  expect(response.status).toBe(200);
  return ((await response.json()) as { items: ReadingMemberView[] }).items;
};

const PLAIN = {
  attribute: 'score',
  filter: { kind: 'tikhonov', alpha: 1 },
  laplacian: 'combinatorial',
  permutations: 199,
  seed: 1,
};

describe('Tikhonov with α = 1 on the karate club', () => {
  let found: ReadingView;
  let items: ReadingMemberView[];
  const expected = (key: string) => world.reference.expected[`signals.score.${key}`]!;

  beforeAll(async () => {
    found = await reading(PLAIN);
    items = await membersOf(found.id);
  });

  test('smoothed scores, leverages and left-out departures', () => {
    expect(items.map((one) => one.externalId)).toEqual(world.reference.ids);
    compare(
      items.map((one) => one.smoothed!),
      expected('filters.tikhonov_L_alpha1'),
      'smoothed',
    );
    compare(
      items.map((one) => one.leverage!),
      expected('outliers.leverage'),
      'leverage',
    );
    compare(
      items.map((one) => one.departure!),
      expected('outliers.loo_residual'),
      'departure',
    );
    expect(found).toMatchObject({ alpha: 1, observed: 34, missing: 0, seed: 1, attribute: 'score' });
  });

  test('Moran’s I and Geary’s C under randomisation, row-standardised and raw', () => {
    for (const [ours, theirs] of [
      ['row', 'W'],
      ['raw', 'B'],
    ] as const) {
      const moran = found.moran![ours];
      compare(moran.value, expected(`moran_${theirs}.I`), 'I');
      compare(moran.expectation, expected(`moran_${theirs}.E_I`), 'E(I)');
      compare(moran.variance, expected(`moran_${theirs}.var_rand`), 'V(I)');
      compare(moran.z, expected(`moran_${theirs}.z_rand`), 'z(I)');
      compare(moran.p, expected(`moran_${theirs}.p_two_sided_rand`), 'p(I)');
      const geary = found.geary![ours];
      compare(geary.value, expected(`geary_${theirs}.C`), 'C');
      compare(geary.variance, expected(`geary_${theirs}.var_rand`), 'V(C)');
      // 199 shuffles and a very shared score: none of them comes near, so p = 1/200.
      expect(moran.permutationP).toBeCloseTo(1 / 200, 12);
    }
  });

  test('local Moran: the quadrants', () => {
    expect(items.map((one) => one.localMoran.quadrant)).toEqual(expected('local_W.quadrant').value);
    compare(
      items.map((one) => one.localMoran.I!),
      expected('local_W.I'),
      'I_i',
    );
    // Beside the p of the moments one by 199 shuffles, a whole number of two-hundredths (+1 rule).
    for (const { localMoran } of items) {
      expect(localMoran.permutationP).toBeGreaterThanOrEqual(1 / 200);
      const count = 200 * localMoran.permutationP!;
      expect(count).toBeCloseTo(Math.round(count), 9);
      expect(localMoran.permutationP).toBeLessThanOrEqual(1);
    }
  });

  test('the same inputs and seed give the same bytes', async () => {
    const again = await reading(PLAIN);
    expect(JSON.stringify(await membersOf(again.id))).toBe(JSON.stringify(items));
    const strip = ({
      id: _,
      createdAt: __,
      finishedAt: ___,
      seconds: ____,
      href: _____,
      ...rest
    }: ReadingView) => rest;
    expect(JSON.stringify(strip(again))).toBe(JSON.stringify(strip(found)));
  });

  test('the picture of the warp holds all the variation', () => {
    expect(found.warp!.frequencies).toBe(34);
    expect(found.warp!.bands.reduce((sum, band) => sum + band.energy, 0)).toBeCloseTo(1, 8);
    // Tikhonov answers 1 / (1 + αλ) at λ; about the mean the constant (λ = 0) carries nothing.
    const carrying = found.warp!.bands.filter((band) => band.energy > 1e-9);
    expect(carrying.length).toBeGreaterThan(20);
    for (const band of carrying) expect(band.kept / band.energy).toBeCloseTo(1 / (1 + band.from) ** 2, 4);
  });
});

test('missing scores are filled in, marked, and never tested', async () => {
  const found = await reading({ ...PLAIN, attribute: 'score_missing' });
  const items = await membersOf(found.id);
  const gaps = world.reference.expected['missing.score_missing.missing']!.value as number[];
  near(
    gaps.map((i) => items[i]!.smoothed!),
    world.reference.expected['missing.score_missing.regularised_alpha1']!.value as number[],
    world.reference.expected['missing.score_missing.regularised_alpha1']!.tolerance!,
    'filled in',
  );
  for (const i of gaps)
    expect(items[i]).toMatchObject({ value: null, departure: null, q: null, observed: false, tested: false });
  expect(found).toMatchObject({ observed: 28, missing: 6 });
  const moran = found.moran!.row;
  compare(moran.value, world.reference.expected['missing.score_missing.complete_case_moran_W.I']!, 'I');
  expect(moran.n).toBe(28);
});

test('the default smoother answers for every member, and keeps its groups with the snapshot', async () => {
  const found = await reading({ attribute: 'score' });
  const items = await membersOf(found.id);
  expect(found.filter).toEqual({ kind: 'two-level' });
  expect(found.sigma!).toBeGreaterThan(0);
  for (const one of items) {
    expect(Number.isFinite(one.smoothed)).toBe(true);
    expect(one.standardError!).toBeGreaterThan(0);
    // The floor of five scored neighbours: nobody below it is tested or flagged.
    expect(one.tested).toBe(one.neighbours >= 5);
    expect(one.q === null).toBe(!one.tested);
  }
  expect(found.tested).toBe(items.filter((one) => one.tested).length);
  const arrays = { snapshotId: world.snapshotId, name: 'smoother-groups' };
  expect(await models.SnapshotArray.count({ where: arrays })).toBe(1);
});

test('members are sorted and cut on request, paged, and exported', async () => {
  const found = await reading({ ...PLAIN, seed: 2 });
  const byDeparture = await membersOf(found.id, { sort: 'departure' });
  const sizes = byDeparture.map((one) => Math.abs(one.departure!));
  expect(sizes).toEqual([...sizes].sort((a, b) => b - a));
  const byQ = await membersOf(found.id, { sort: 'q', maximumQ: '0.9' });
  expect(byQ.every((one) => one.tested && one.q! <= 0.9)).toBe(true);
  const first = await call(members, {
    actor: world.analyst,
    params: { reading: found.id },
    query: { limit: '20', sort: 'departure' },
  });
  const page = (await first.json()) as { items: ReadingMemberView[]; nextCursor: string };
  const rest = await membersOf(found.id, { sort: 'departure', cursor: page.nextCursor });
  expect([...page.items, ...rest]).toEqual(byDeparture);
  const csv = await (await call(membersCsv, { actor: world.analyst, params: { reading: found.id } })).text();
  const lines = csv.trim().split('\r\n');
  expect(lines).toHaveLength(35);
  expect(lines[0]).toMatch(/^id,name,value,observed,smoothed/);
});

test('running the job again leaves the same rows once; stopping it leaves nothing', async () => {
  const found = await reading(PLAIN);
  const before = await membersOf(found.id);
  const { readingJob } = await import('@/features/readings/index.server');
  const context = {
    jobId: 'again',
    targetId: found.id,
    workspaceId: null,
    createdBy: null,
    attempt: 2,
    signal: new AbortController().signal,
    progress: () => undefined,
  };
  await readingJob(context);
  expect(await membersOf(found.id)).toEqual(before);

  const { job } = (await (await ask(PLAIN)).json()) as { job: JobView };
  const row = (await models.Job.findByPk(job.id))!;
  await row.update({ cancelRequested: true });
  expect((await run(job.id)).state).toBe('cancelled');
  expect(await models.Reading.findByPk(row.targetId)).toBeNull();
});

test('a score that never varies fails with a plain sentence, not with a number', async () => {
  const { saveArray } = await import('@/features/network/index.server');
  const flat = await models.Attribute.create({
    snapshotId: world.snapshotId,
    ordinal: 9,
    name: 'flat',
    type: 'number',
    observed: 34,
    summary: {},
  });
  await models.sequelize.transaction((transaction) =>
    saveArray(world.snapshotId, `attribute:${flat.id}`, new Float64Array(34).fill(3), transaction),
  );
  const { job } = (await (await ask({ ...PLAIN, attribute: 'flat' })).json()) as { job: JobView };
  const ended = await run(job.id);
  expect(ended.state).toBe('failed');
  expect(ended.error).toMatchObject({ status: 422 });
  expect(ended.error!.detail).toMatch(/same|equal|vary/i);
  const shown = (await (
    await call(list, { actor: world.analyst, params: { snapshot: world.snapshotId } })
  ).json()) as { items: { id: string; state: string }[] };
  expect(shown.items.find((one) => one.id === ended.targetId)?.state).toBe('failed');
});

test('what is asked wrongly is refused, and so are viewers and strangers', async () => {
  expect((await ask({ attribute: 'nothing of the kind' })).status).toBe(422);
  expect((await ask({ attribute: 'club' })).status).toBe(422);
  for (const filter of [
    { kind: 'tikhonov' },
    { kind: 'tikhonov', alpha: -1 },
    { kind: 'band-pass', from: 2, to: 1 },
  ])
    expect((await ask({ attribute: 'score', filter })).status).toBe(400);
  expect((await ask(PLAIN, world.viewer)).status).toBe(403);
  expect((await ask(PLAIN, world.stranger)).status).toBe(404);
});
