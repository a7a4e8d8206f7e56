import { readdirSync, readFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
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

/** dependency-cruiser does not read .astro files, so the same rules are kept for them here. */
const ASTRO_RULES: readonly { name: string; from: RegExp; never: RegExp }[] = [
  {
    name: 'controls and charts have no domain knowledge',
    from: /^src\/components\/(?!gallery)/,
    never: /^src\/(features|server|pages|layouts|numerics)\//,
  },
  {
    name: 'shells draw what they are given',
    from: /^src\/layouts\//,
    never: /^src\/(features|server|pages|numerics)\//,
  },
  {
    name: 'a page enters a feature by its doors or draws one of its parts',
    from: /^src\/pages\//,
    never: /^src\/(numerics\/|features\/[^/]+\/(?!ui(\/|$)|index$|index\.server$))/,
  },
  { name: 'rows are for the server', from: /./, never: /^(sequelize|pg)$/ },
  { name: 'the product does not need its tests', from: /./, never: /^tests\// },
];

/** What a file imports, as paths from the top where they are ours. */
function importsOf(file: string): string[] {
  const source = readFileSync(file, 'utf8');
  return [...source.matchAll(/^\s*(?:import|export)\b[^'"]*?['"]([^'"]+)['"]/gm)].map(([, to = '']) => {
    if (to.startsWith('@/')) return join('src', to.slice(2));
    return to.startsWith('.') ? join(dirname(file), to) : to;
  });
}

test('imports of .astro files keep to the rules', () => {
  const pages = files.filter((file) => file.endsWith('.astro'));
  expect(pages.flatMap(importsOf).length).toBeGreaterThan(pages.length);
  const broken = pages.flatMap((file) =>
    importsOf(file).flatMap((to) =>
      ASTRO_RULES.filter((rule) => rule.from.test(file) && rule.never.test(to)).map(
        (rule) => `${rule.name}: ${file} → ${to}`,
      ),
    ),
  );
  expect(broken).toEqual([]);
});

test('a feature enters another by its doors in .astro files too', () => {
  const own = /^src\/features\/([^/]+)\//;
  const broken = files
    .filter((file) => file.endsWith('.astro') && own.test(file))
    .flatMap((file) =>
      importsOf(file)
        .filter((to) => own.test(`${to}/`) && own.exec(`${to}/`)?.[1] !== own.exec(file)?.[1])
        .filter((to) => !/^src\/features\/[^/]+(\/(index|index\.server|ui|ui\/index))?$/.test(to))
        .map((to) => `${file} → ${to}`),
    );
  expect(broken).toEqual([]);
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
