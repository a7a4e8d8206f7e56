import type { APIRoute } from 'astro';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { ROLES, type Actor, type Role } from '@/lib/actor';
import { can } from '@/features/workspaces';
import { ensureBucket } from '@/server/storage';
import { actorOf, call } from './call';
import { createTestDatabase, type TestDatabase } from './database';
import { ENDPOINTS, PUBLIC } from './permissions.table';
import { makeWalkFixture, type WalkFixture } from './permissions.fixture';

type Module = Partial<Record<'GET' | 'POST' | 'PATCH' | 'DELETE', APIRoute>>;
const files = import.meta.glob<Module>('/src/pages/api/v1/**/*.ts');

/** `/src/pages/api/v1/jobs/[job]/index.ts` → `/jobs/{job}` */
const pathOf = (file: string): string =>
  file
    .replace('/src/pages/api/v1', '')
    .replace(/\.ts$/, '')
    .replace(/\/index$/, '')
    .replaceAll('[', '{')
    .replaceAll(']', '}');

let database: TestDatabase;
let fixture: WalkFixture;
const routes = new Map<string, APIRoute>();

beforeAll(async () => {
  database = await createTestDatabase();
  for (const [file, load] of Object.entries(files)) {
    const module = await load();
    for (const method of ['GET', 'POST', 'PATCH', 'DELETE'] as const) {
      const route = module[method];
      if (route) routes.set(`${method} ${pathOf(file)}`, route);
    }
  }
  await ensureBucket();
  fixture = await makeWalkFixture();
});

afterAll(async () => {
  const { sequelize } = await import('@/server/models');
  await sequelize.close();
  await database.drop();
});

test('every endpoint of the API stands in the table, and nothing else does', () => {
  const listed = [...Object.keys(ENDPOINTS), ...PUBLIC].sort();
  expect([...routes.keys()].sort()).toEqual(listed);
});

const visit = async (key: string, actor: Actor | null): Promise<Response> => {
  await fixture.restore();
  const endpoint = ENDPOINTS[key]!;
  return call(routes.get(key)!, {
    actor,
    method: key.split(' ')[0]!,
    params: fixture.params,
    ...(endpoint.query ? { query: endpoint.query(fixture) } : {}),
    ...(endpoint.body ? { body: endpoint.body(fixture) } : {}),
  });
};

/** What leaks if it appears in a refused answer. */
const expectNoData = async (response: Response): Promise<void> => {
  const text = await response.text();
  expect(response.headers.get('content-type')).toContain('problem+json');
  for (const secret of fixture.secrets) expect(text).not.toContain(secret);
};

describe.each(Object.keys(ENDPOINTS))('%s', (key) => {
  test('nobody signed in: 401', async () => {
    const response = await visit(key, null);
    expect(response.status).toBe(401);
    await expectNoData(response);
  });

  // What belongs to the person alone has no strangers; everything else does.
  const strangers = (): Actor[] => [
    { ...actorOf('user-stranger', fixture.otherWorkspaceId, 'owner'), memberships: [] },
    actorOf('user-foreign-owner', fixture.otherWorkspaceId, 'owner'),
  ];
  if (ENDPOINTS[key]!.needs !== null)
    test('a stranger and an owner of another workspace: 404', async () => {
      for (const stranger of strangers()) {
        const response = await visit(key, stranger);
        expect(response.status).toBe(404);
        await expectNoData(response);
      }
    });

  test.each(ROLES.filter((role) => !allowed(key, role)))('%s: 403', async (role) => {
    const response = await visit(key, fixture.actors[role]);
    expect(response.status).toBe(403);
    await expectNoData(response);
  });

  test.each(ROLES.filter((role) => allowed(key, role)))('%s may', async (role) => {
    const response = await visit(key, fixture.actors[role]);
    await response.body?.cancel();
    if (ENDPOINTS[key]!.notTheirs?.includes(role)) return expect(response.status).toBe(404);
    // The body may be wrong for the state of the fixture (409, 422), never refused for the role.
    expect([200, 201, 202, 204, 400, 409, 415, 422]).toContain(response.status);
  });
});

function allowed(key: string, role: Role): boolean {
  const { needs, only } = ENDPOINTS[key]!;
  return only ? only.includes(role) : needs === null || can(role, needs);
}
