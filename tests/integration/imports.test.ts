import { readFileSync } from 'node:fs';
import { gzipSync } from 'node:zlib';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import type { ImportView } from '@/features/imports';
import type { JobView } from '@/features/jobs';
import type { Actor } from '@/lib/actor';
import { listObjects } from '@/server/storage';
import { makeCommunityWorld, type CommunityWorld } from '../factories/community-world';
import { runQueued, upload, type UploadFiles } from '../factories/imports';
import { call } from './call';

let world: CommunityWorld;
let actor: Actor;
let communityId: string;

beforeAll(async () => {
  world = await makeCommunityWorld();
  ({ actor, communityId } = world);
});
afterAll(() => world.close());

interface Outcome {
  readonly status: number;
  readonly job: JobView | null;
  readonly report: ImportView | null;
  readonly detail: string;
}

const getImport = async (id: string): Promise<ImportView> => {
  const { GET } = await import('@/pages/api/v1/imports/[import]/index');
  return (await (await call(GET, { actor, params: { import: id } })).json()) as ImportView;
};

/** Uploads, runs the job, and answers with what a person would see. */
async function importing(files: UploadFiles): Promise<Outcome> {
  const response = await upload(actor, communityId, files);
  const body = (await response.json()) as { job?: JobView; import?: ImportView; detail?: string };
  if (response.status !== 202)
    return { status: response.status, job: null, report: null, detail: body.detail ?? '' };
  const job = await runQueued(body.job!.id);
  const report = await getImport(body.import!.id);
  return { status: 202, job, report, detail: job.error?.detail ?? '' };
}

const expectNothingKept = async (outcome: Outcome): Promise<void> => {
  const { Snapshot } = await import('@/server/models');
  if (outcome.report) expect(await Snapshot.count({ where: { importId: outcome.report.id } })).toBe(0);
  expect(await listObjects('imports/')).toEqual([]);
};

const karate = (file: string): string => readFileSync(`tests/reference/data/karate/${file}`, 'utf8');

test('the karate club of Zachary (1977) lands with its 34 members and 78 ties', async () => {
  const { job, report } = await importing({ ties: karate('edges.csv'), members: karate('members.csv') });
  expect(job).toMatchObject({ state: 'succeeded', progress: 1, result: { kind: 'snapshot' } });
  expect(report!.counts).toEqual({
    tieRows: { read: 78, kept: 78, merged: 0, refused: 0, selfTies: 0, leftOut: 0 },
    memberRows: {
      read: 34,
      kept: 34,
      refused: 0,
      leftOut: 0,
      blankCells: expect.any(Number) as number,
      refusedCells: 0,
    },
    membersFromTies: 0,
  });
  const { GET } = await import('@/pages/api/v1/snapshots/[snapshot]/index');
  const snapshot: unknown = await (await call(GET, { actor, params: { snapshot: job!.result!.id } })).json();
  expect(snapshot).toMatchObject({
    members: 34,
    ties: 78,
    totalWeight: 78,
    components: 1,
    largestComponent: 34,
    isolated: 0,
  });
  const { decodeNetwork } = await import('@/features/network');
  const { GET: getNetwork } = await import('@/pages/api/v1/snapshots/[snapshot]/network');
  const network = decodeNetwork(
    await (await call(getNetwork, { actor, params: { snapshot: job!.result!.id } })).arrayBuffer(),
  );
  expect([network.n, network.ties, network.degree[0], network.degree[33]]).toEqual([34, 78, 16, 17]);
  expect(network.x.every(Number.isFinite)).toBe(true);
  expect(await listObjects('imports/')).toEqual([]);
});

test('the same upload twice is one import', async () => {
  const files = { ties: 'source,target\na,b\nb,c\n' };
  const first = (await (await upload(actor, communityId, files)).json()) as {
    job: JobView;
    repeated: boolean;
  };
  const second = (await (await upload(actor, communityId, files)).json()) as {
    job: JobView;
    repeated: boolean;
  };
  expect([first.repeated, second.repeated, second.job.id]).toEqual([false, true, first.job.id]);
  await runQueued(first.job.id);
  await runQueued(first.job.id);
  const { Snapshot } = await import('@/server/models');
  expect(await Snapshot.count({ where: { ties: 2, communityId } })).toBe(1);
});

describe('what an upload must not be', () => {
  const cases: Record<string, { files: UploadFiles; status: number; says: RegExp }> = {
    'no ties file': { files: { members: 'id\na\n' }, status: 400, says: /ties/ },
    'options that are not JSON': { files: { ties: 'a,b\n1,2\n', options: '{' }, status: 400, says: /JSON/ },
    'options of the wrong kind': {
      files: { ties: 'a,b\n1,2\n', options: { directions: 'both' } },
      status: 400,
      says: /directions/,
    },
    'an empty file': { files: { ties: '' }, status: 202, says: /empty/ },
    'a picture': {
      files: { ties: Uint8Array.of(0x89, 0x50, 0x4e, 0x47, 0, 0, 0, 1, 2, 3, 0, 0) },
      status: 202,
      says: /not a text file/,
    },
    'a header alone': { files: { ties: 'source,target\n' }, status: 202, says: /no rows/ },
    'a missing column': {
      files: { ties: 'who,whom,when\na,b,c\n' },
      status: 202,
      says: /no column for the source.*who, whom, when/,
    },
    'a column that was matched but is not there': {
      files: { ties: 'source,target\na,b\n', options: { ties: { weight: 'w8' } } },
      status: 202,
      says: /weight/,
    },
    'an unclosed quotation mark': {
      files: { ties: 'source,target\n"a,b\nc,d\n' },
      status: 202,
      says: /quotation mark/,
    },
    'only self-ties': { files: { ties: 'source,target\na,a\nb,b\n' }, status: 202, says: /No usable tie/ },
    'damaged gzip': {
      files: { ties: new Uint8Array(gzipSync('source,target\na,b\n'.repeat(999)).subarray(0, 40)) },
      status: 202,
      says: /damaged/,
    },
    'two columns of one name': {
      files: { ties: 'a,b\n1,2\n', members: 'id,score,score\n1,2,3\n' },
      status: 202,
      says: /two columns named/,
    },
  };
  test.each(Object.entries(cases))('%s', async (_name, { files, status, says }) => {
    const outcome = await importing(files);
    expect(outcome.status).toBe(status);
    expect(outcome.detail).toMatch(says);
    if (status === 202) expect(outcome.job!.state).toBe('failed');
    await expectNothingKept(outcome);
  });
});

test('every row that cannot be a tie is refused with its line, column, value and reason', async () => {
  const rows = [
    'source,target,weight',
    'a,b,1',
    'a,b,2',
    'b,a,4',
    'c,c,1',
    'c,d,-1',
    'c,d,inf',
    'c,d,zero',
    'c,d,0',
    'c,d,',
    ' c ,d,1',
    ',d,1',
    'e,f',
    '"x',
    'y",f,3',
  ];
  const { report, job } = await importing({ ties: `${rows.join('\r\n')}\r\n` });
  expect(job!.state).toBe('succeeded');
  expect(report!.counts!.tieRows).toEqual({
    read: 13,
    kept: 3,
    merged: 2,
    refused: 7,
    selfTies: 1,
    leftOut: 0,
  });
  expect(report!.problems).toEqual([
    { file: 'ties', line: 6, column: 'weight', value: '-1', reason: 'Weights cannot be negative.' },
    { file: 'ties', line: 7, column: 'weight', value: 'inf', reason: 'Infinite values are not accepted.' },
    { file: 'ties', line: 8, column: 'weight', value: 'zero', reason: 'This is not a number.' },
    { file: 'ties', line: 9, column: 'weight', value: '0', reason: 'A tie of weight 0 is no tie.' },
    { file: 'ties', line: 10, column: 'weight', value: '', reason: 'The weight is blank.' },
    { file: 'ties', line: 12, column: 'source', value: '', reason: 'The member id is blank.' },
    {
      file: 'ties',
      line: 13,
      column: null,
      value: 'e | f',
      reason: 'This row has 2 cells; the header has 3.',
    },
  ]);
  expect(report!.warnings.map((one) => one.code)).toContain('spaces');
  const { GET } = await import('@/pages/api/v1/imports/[import]/problems.csv');
  const csv = await (await call(GET, { actor, params: { import: report!.id } })).text();
  expect(csv.split('\r\n')[1]).toBe("ties,6,weight,'-1,Weights cannot be negative.");
});

test('a members file keeps blanks, refuses cells that are no numbers, and is told when it names nobody', async () => {
  const members = [
    'id;name;score;circle',
    'a;Ann;3,5;North',
    'b;;;South',
    'c;Cy;1,25;',
    'a;Again;1;North',
    ...Array.from({ length: 40 }, (_, i) => `z${i};Z;2,0;West`),
    'q;Q;many;West',
  ];
  const { report, job } = await importing({ ties: 'source\ttarget\nk\tl\n', members: members.join('\n') });
  expect(job).toMatchObject({ state: 'succeeded', error: null });
  expect(report!.counts!.memberRows).toMatchObject({ read: 45, kept: 44, refused: 1, refusedCells: 1 });
  expect(report!.problems.map((one) => [one.line, one.column])).toEqual([
    [5, 'id'],
    [46, 'score'],
  ]);
  expect(report!.warnings.map((one) => one.code)).toContain('nobody-named');
  const { GET } = await import('@/pages/api/v1/snapshots/[snapshot]/index');
  const snapshot = (await (await call(GET, { actor, params: { snapshot: job!.result!.id } })).json()) as {
    members: number;
    isolated: number;
    attributes: { name: string; type: string; observed: number; summary: { max?: number } }[];
  };
  expect([snapshot.members, snapshot.isolated]).toEqual([46, 44]);
  expect(snapshot.attributes).toMatchObject([
    { name: 'score', type: 'number', observed: 42, summary: { max: 3.5 } },
    { name: 'circle', type: 'label', observed: 43 },
  ]);
});

test.each([
  ['UTF-8 with a byte-order mark', Buffer.from('\ufeffsource,target\nÅsa,Łuk\n', 'utf8'), 'Åsa'],
  ['UTF-16 with a byte-order mark', Buffer.from('\ufeffsource,target\nÅsa,Ola\n', 'utf16le'), 'Åsa'],
  ['Windows-1252', Buffer.from('source,target\n\xc5sa,Ola\n', 'latin1'), 'Åsa'],
  ['gzip', gzipSync('source,target\nÅsa,Eva\n'), 'Åsa'],
])('%s is read as it was meant', async (_name, bytes, id) => {
  const { job } = await importing({ ties: new Uint8Array(bytes) });
  expect(job!.state).toBe('succeeded');
  const { SnapshotMember } = await import('@/server/models');
  expect(
    (await SnapshotMember.findOne({ where: { snapshotId: job!.result!.id, ordinal: 0 } }))!.externalId,
  ).toBe(id);
});

test('checked for review, then accepted or discarded', async () => {
  const review = { accept: 'review' as const };
  const { Snapshot } = await import('@/server/models');
  const { POST: accept } = await import('@/pages/api/v1/imports/[import]/accept');
  const { POST: discard } = await import('@/pages/api/v1/imports/[import]/discard');
  const first = await importing({ ties: 'source,target\nr,s\n', options: { ...review, label: 'one' } });
  expect([first.job!.result!.kind, first.report!.state]).toEqual(['import', 'review']);
  expect((await Snapshot.findOne({ where: { importId: first.report!.id } }))!.state).toBe('pending');
  expect((await call(accept, { actor, method: 'POST', params: { import: first.report!.id } })).status).toBe(
    200,
  );
  expect((await Snapshot.findOne({ where: { importId: first.report!.id } }))!.state).toBe('ready');
  expect((await call(accept, { actor, method: 'POST', params: { import: first.report!.id } })).status).toBe(
    409,
  );
  const second = await importing({ ties: 'source,target\nr,s\n', options: { ...review, label: 'two' } });
  expect((await call(discard, { actor, method: 'POST', params: { import: second.report!.id } })).status).toBe(
    200,
  );
  expect(await Snapshot.count({ where: { importId: second.report!.id } })).toBe(0);
});
