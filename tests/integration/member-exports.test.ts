import Excel from 'exceljs';
import { parquetReadObjects } from 'hyparquet';
import Papa from 'papaparse';
import { afterAll, beforeAll, expect, test } from 'vitest';
import type { APIRoute } from 'astro';
import type { Actor } from '@/lib/actor';
import { makeCommunityWorld, type CommunityWorld } from '../factories/community-world';
import { runQueued, upload } from '../factories/imports';
import { call } from './call';

/** Every format read back by an independent reader: papaparse, JSON.parse, exceljs, hyparquet. */
let world: CommunityWorld;
let actor: Actor;
let snapshot: string;
let columns: string;

const TIES = 'source,target\nann,bob\nbob,cat\ncat,ann\n';
const MEMBERS = 'id,name,score,town\nann,Ann,0.1,"=1+1"\nbob,"Bob ""B"" <é>",,Ely\ncat,,-1e-300,\n';
const EXPECTED = [
  { external_id: 'ann', name: 'Ann', score: 0.1, town: '=1+1' },
  { external_id: 'bob', name: 'Bob "B" <é>', score: null, town: 'Ely' },
  { external_id: 'cat', name: 'cat', score: -1e-300, town: null },
];

beforeAll(async () => {
  world = await makeCommunityWorld();
  actor = world.actor;
  const response = await upload(actor, world.communityId, { ties: TIES, members: MEMBERS });
  const { job } = (await response.json()) as { job: { id: string } };
  snapshot = (await runQueued(job.id)).result!.id;
  const { Attribute } = await import('@/server/models');
  const attributes = await Attribute.findAll({
    where: { snapshotId: snapshot },
    order: [['ordinal', 'ASC']],
  });
  columns = attributes.map(({ id }) => `attribute:${id}`).join(',');
});
afterAll(() => world.close());

async function exported(route: Promise<{ GET: APIRoute }>): Promise<ArrayBuffer> {
  const { GET } = await route;
  const response = await call(GET, { actor, params: { snapshot }, query: { columns } });
  expect(response.status).toBe(200);
  return response.arrayBuffer();
}
const text = (bytes: ArrayBuffer): string => new TextDecoder().decode(bytes);

test('CSV: a formula is made harmless, blanks stay blank', async () => {
  const csv = text(await exported(import('@/pages/api/v1/snapshots/[snapshot]/members.csv')));
  const { data } = Papa.parse<Record<string, string>>(csv.trim(), { header: true });
  expect(data.map(({ external_id, name, score, town }) => [external_id, name, score, town])).toEqual([
    ['ann', 'Ann', '0.1', "'=1+1"],
    ['bob', 'Bob "B" <é>', '', 'Ely'],
    ['cat', 'cat', '-1e-300', ''],
  ]);
});

test('JSON Lines: one object a line, typed', async () => {
  const lines = text(await exported(import('@/pages/api/v1/snapshots/[snapshot]/members.jsonl')));
  const rows = lines
    .trim()
    .split('\n')
    .map((line) => JSON.parse(line) as Record<string, unknown>);
  expect(
    rows.map(({ externalId, name, score, town }) => ({ external_id: externalId, name, score, town })),
  ).toEqual(EXPECTED);
});

test('XLSX: numbers are numbers, text that looks like a formula is text', async () => {
  const workbook = new Excel.Workbook();
  await workbook.xlsx.load(await exported(import('@/pages/api/v1/snapshots/[snapshot]/members.xlsx')));
  const sheet = workbook.getWorksheet('Members')!;
  const [head, ...rows] = sheet.getSheetValues().slice(1) as unknown[][];
  expect(head!.slice(1)).toEqual(['id', 'external_id', 'name', 'score', 'town']);
  expect(
    rows.map((row) => ({ external_id: row[2], name: row[3], score: row[4] ?? null, town: row[5] ?? null })),
  ).toEqual(EXPECTED);
  expect(sheet.getCell('E2').type).toBe(Excel.ValueType.String);
  expect(sheet.getCell('D2').type).toBe(Excel.ValueType.Number);
});

test('Parquet: 64-bit floats to the last digit, UTF-8 text, nulls', async () => {
  const file = await exported(import('@/pages/api/v1/snapshots/[snapshot]/members.parquet'));
  const rows = await parquetReadObjects({ file });
  expect(rows.map(({ external_id, name, score, town }) => ({ external_id, name, score, town }))).toEqual(
    EXPECTED,
  );
});

test('two columns of one name are told apart', async () => {
  const { distinct } = await import('@/features/members/export/table');
  expect(distinct(['id', 'score', 'id', 'id'])).toEqual(['id', 'score', 'id (2)', 'id (3)']);
});
