import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { cruise } from 'dependency-cruiser';
import extractTSConfig from 'dependency-cruiser/config-utl/extract-ts-config';
import { expect, test } from 'vitest';
import rules from './dependency-cruiser.mjs';

const SOURCES = /\.(ts|tsx|astro|mjs)$/;

function filesUnder(folder: string): string[] {
  return readdirSync(folder, { withFileTypes: true }).flatMap((entry) => {
    const path = join(folder, entry.name);
    if (entry.isDirectory())
      return entry.name === 'data' || entry.name === 'fixtures' ? [] : filesUnder(path);
    return SOURCES.test(entry.name) ? [path] : [];
  });
}

const files = ['src', 'db', 'tests'].flatMap(filesUnder);

test('imports keep to the rules', async () => {
  const { options, forbidden } = rules;
  const result = await cruise(
    ['src', 'db'],
    { ...options, ruleSet: { forbidden }, validate: true },
    undefined,
    { tsConfig: extractTSConfig('tsconfig.json') },
  );
  const { output } = result;
  if (typeof output === 'string') throw new Error(output);
  expect(output.summary.violations.map((one) => `${one.rule.name}: ${one.from} → ${one.to}`)).toEqual([]);
});

test('no file is longer than 400 lines', () => {
  const long = files.filter((file) => readFileSync(file, 'utf8').split('\n').length > 401);
  expect(long).toEqual([]);
});

test('pages hold no logic: 80 lines at most', () => {
  const long = filesUnder('src/pages').filter((file) => readFileSync(file, 'utf8').split('\n').length > 81);
  expect(long.filter((file) => !file.startsWith('src/pages/dev'))).toEqual([]);
});

test('a migration never changes the order of the ones before it', () => {
  const names = readdirSync('db/migrations').filter((name) => /^\d{4}-/.test(name));
  expect(names).toEqual([...names].sort());
  expect(new Set(names.map((name) => name.slice(0, 4))).size).toBe(names.length);
});
