import { createHash } from 'node:crypto';
import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { describe, expect, test } from 'vitest';
import { generateSaltmarsh, SALTMARSH_GROUPS, writeSaltmarshFiles } from '../../../db/seeders/saltmarsh';
import { guessMemberColumns, guessTieColumns } from '@/features/imports/guess';
import { membersIn, tiesIn } from './saltmarsh-files';

const saltmarsh = generateSaltmarsh();
const { snapshots, truth } = saltmarsh;
const last = snapshots.at(-1)!;
const members = membersIn(last.membersCsv);
const ties = tiesIn(last.tiesCsv);
const hash = (text: string): string => createHash('sha256').update(text).digest('hex');

describe('sizes', () => {
  test('six snapshots, a quarter apart', () => {
    expect(snapshots.map((one) => one.takenOn)).toEqual([
      '2025-08-31',
      '2025-11-30',
      '2026-02-28',
      '2026-05-31',
      '2026-08-31',
      '2026-11-28',
    ]);
  });

  test('1,264 members and 6,978 ties in the last one', () => {
    expect(members.rows).toHaveLength(1264);
    expect(ties.pairs.size).toBe(6978);
    expect(new Set(members.rows.map((row) => row['member'])).size).toBe(1264);
  });

  test('47 joined and 18 left in the last quarter', () => {
    const now = new Set(members.rows.map((row) => row['member']));
    const before = new Set(membersIn(snapshots[4]!.membersCsv).rows.map((row) => row['member']));
    expect([...now].filter((id) => !before.has(id))).toHaveLength(47);
    expect([...before].filter((id) => !now.has(id))).toHaveLength(18);
  });

  test('the community and its ties grow with every snapshot', () => {
    const sizes = snapshots.map((one) => membersIn(one.membersCsv).rows.length);
    const counts = snapshots.map((one) => tiesIn(one.tiesCsv).pairs.size);
    expect(sizes).toEqual([...sizes].sort((a, b) => a - b));
    expect(counts).toEqual([...counts].sort((a, b) => a - b));
  });

  test('degrees are heavy-tailed: the best tied member has over three times the mean', () => {
    const degrees = [...ties.neighbours.values()].map((one) => one.size);
    expect(Math.max(...degrees)).toBeGreaterThan((3 * 2 * 6978) / 1264);
  });
});

describe('files', () => {
  test('the import guesses every column from its name', () => {
    expect(guessTieColumns(ties.header)).toEqual({
      source: 'source',
      target: 'target',
      weight: 'count',
      kind: 'kind',
      time: 'last_date',
    });
    expect(guessMemberColumns(members.header)).toMatchObject({ id: 'member', name: 'display_name' });
  });

  test('headers', () => {
    expect(ties.header).toEqual(['source', 'target', 'kind', 'count', 'last_date']);
    expect(members.header).toEqual([
      'member',
      'display_name',
      'helpfulness',
      'complaints_per_100',
      'belonging',
      'posts_per_week',
      'months_since_joining',
      'circle',
    ]);
  });

  test.each(snapshots.map((one) => [one.takenOn, one] as const))('%s is well formed', (takenOn, one) => {
    const { rows } = membersIn(one.membersCsv);
    const ids = new Set(rows.map((row) => row['member']));
    const shapes: Record<string, RegExp> = {
      member: /^[a-z]+-[a-z]+$/,
      helpfulness: /^([1-4]\.\d\d|5\.00|)$/,
      complaints_per_100: /^\d+\.\d$/,
      belonging: /^(\d\d?|100|)$/,
      posts_per_week: /^\d+\.\d$/,
      months_since_joining: /^\d+$/,
    };
    for (const [column, shape] of Object.entries(shapes))
      expect(rows.filter((row) => !shape.test(row[column]!))).toEqual([]);
    const bad = tiesIn(one.tiesCsv).rows.filter(
      (tie) =>
        !ids.has(tie['source']) ||
        !ids.has(tie['target']) ||
        tie['source'] === tie['target'] ||
        !/^(reply|trade|endorse)$/.test(tie['kind']!) ||
        !/^[1-9]$/.test(tie['count']!) ||
        !(tie['last_date']! < takenOn),
    );
    expect(bad).toEqual([]);
  });

  test('the two files of the last snapshot are written as they are', () => {
    const directory = mkdtempSync(join(tmpdir(), 'saltmarsh-'));
    try {
      const paths = writeSaltmarshFiles(directory);
      expect(paths.ties.endsWith('saltmarsh-ties.csv')).toBe(true);
      expect(paths.members.endsWith('saltmarsh-members.csv')).toBe(true);
      expect(readFileSync(paths.ties, 'utf8')).toBe(last.tiesCsv);
      expect(readFileSync(paths.members, 'utf8')).toBe(last.membersCsv);
    } finally {
      rmSync(directory, { recursive: true });
    }
  });
});

describe('seed', () => {
  const digest = (seed?: number): string => hash(JSON.stringify(generateSaltmarsh(seed)));
  test('the same seed gives the same bytes', () => {
    expect(digest(1264)).toBe(hash(JSON.stringify(saltmarsh)));
  });
  test('another seed gives another community', () => {
    expect(digest(7)).not.toBe(digest());
  });
});

describe('what is planted', () => {
  const groupOf = new Map(truth.groups.map((one) => [one.externalId, one.group]));

  test('eight groups', () => {
    expect(truth.groups).toHaveLength(1264);
    expect(new Set(truth.groups.map((one) => one.group))).toEqual(new Set([...SALTMARSH_GROUPS, null]));
  });

  test('Night Composters hang on by a weak seam, mostly to Grafters', () => {
    let inside = 0;
    const across = new Map<string | null, number>();
    for (const pair of ties.pairs) {
      const [a, b] = pair.split(' ').map((id) => groupOf.get(id)!);
      if (a === 'Night Composters' && b === a) inside++;
      else if (a === 'Night Composters') across.set(b!, (across.get(b!) ?? 0) + 1);
      else if (b === 'Night Composters') across.set(a!, (across.get(a!) ?? 0) + 1);
    }
    const leaving = [...across.values()].reduce((sum, one) => sum + one, 0);
    expect(leaving / (2 * inside + leaving)).toBeLessThan(0.06);
    expect(leaving / (2 * inside + leaving)).toBeGreaterThan(0.02);
    expect(across.get('Grafters')! / leaving).toBeGreaterThan(0.5);
    expect(truth.seam).toMatchObject({ leaving, across: across.get('Grafters') });
  });

  test('branches hang on one tie', () => {
    expect(truth.branches.length).toBeGreaterThan(5);
    for (const branch of truth.branches) {
      expect(branch.length).toBeGreaterThanOrEqual(2);
      expect(branch.length).toBeLessThanOrEqual(6);
      const out = branch.flatMap((id) =>
        [...ties.neighbours.get(id)!].filter((one) => !branch.includes(one)),
      );
      expect(out).toHaveLength(1);
    }
  });

  test('islets are tied to nobody else, and everybody else is in one piece', () => {
    const parts = ties.components(members.rows.map((row) => row['member']!));
    const sorted = (list: readonly (readonly string[])[]): string[] =>
      list.map((one) => [...one].sort().join(' ')).sort();
    const [largest, ...small] = [...parts].sort((a, b) => b.length - a.length);
    expect(sorted(small)).toEqual(sorted(truth.islets));
    expect(largest).toHaveLength(1264 - truth.islets.flat().length);
    expect(truth.islets.filter((one) => one.length === 1)).toHaveLength(2);
  });

  test('61 % answered the survey, 4 % have no helpfulness score', () => {
    const share = (column: string): number => members.rows.filter((row) => row[column] !== '').length / 1264;
    expect(Math.abs(share('belonging') - 0.61)).toBeLessThan(0.02);
    expect(Math.abs(share('helpfulness') - 0.96)).toBeLessThan(0.02);
  });

  test('thirty departures of well-tied members', () => {
    expect(truth.departures).toHaveLength(30);
    for (const { externalId, shift } of truth.departures) {
      expect(Math.abs(shift)).toBeGreaterThanOrEqual(1.2);
      expect(Math.abs(shift)).toBeLessThanOrEqual(1.9);
      expect(ties.neighbours.get(externalId)!.size).toBeGreaterThanOrEqual(8);
    }
    const where = (id: string): [boolean, string | null | undefined] => [
      truth.departures.some((one) => one.externalId === id),
      groupOf.get(id),
    ];
    expect(where('wild-dibber')).toEqual([true, 'North Plots']);
    expect(where('plum-quince')).toEqual([true, 'New Arrivals']);
    expect(where('rusty-leek')).toEqual([true, 'Grafters']);
  });

  test('quiet-fern goes down over five snapshots, from 4.0 to 2.6', () => {
    const scores = snapshots.map((one) =>
      Number(membersIn(one.membersCsv).rows.find((row) => row['member'] === 'quiet-fern')!['helpfulness']),
    );
    expect(scores[1]).toBeCloseTo(4, 1);
    expect(scores[5]).toBeCloseTo(2.6, 1);
    for (let s = 1; s < 6; s++) expect(scores[s]).toBeLessThan(scores[s - 1]!);
    expect(groupOf.get('quiet-fern')).toBe('Bean Keepers');
  });

  test('honest surprises have a reason and are no departures', () => {
    expect(truth.surprises.length).toBeGreaterThan(3);
    const departing = new Set(truth.departures.map((one) => one.externalId));
    for (const { externalId, reason } of truth.surprises) {
      expect(reason.length).toBeGreaterThan(20);
      expect(departing.has(externalId)).toBe(false);
    }
  });
});
