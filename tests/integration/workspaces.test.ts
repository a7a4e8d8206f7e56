import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import type { Actor } from '@/lib/actor';
import { actorFor, makePerson, type TestPerson } from '../factories/people';
import { createTestDatabase, type TestDatabase } from './database';

let database: TestDatabase;
let models: typeof import('@/server/models');
let workspaces: typeof import('@/features/workspaces/index.server');
let account: typeof import('@/features/account/index.server');
let owner: TestPerson;
let boss: Actor;

beforeAll(async () => {
  database = await createTestDatabase();
  models = await import('@/server/models');
  workspaces = await import('@/features/workspaces/index.server');
  account = await import('@/features/account/index.server');
  owner = await makePerson({ role: 'owner' });
  boss = await actorFor(owner);
});

afterAll(async () => {
  await models.sequelize.close();
  await database.drop();
});

const member = (role: TestPerson['role']) => makePerson({ role, workspaceId: owner.workspaceId });
const refusal = (status: number) => ({ status });
const actions = async (): Promise<string[]> =>
  (await workspaces.listAudit(boss, owner.workspaceId, 100)).items.map((one) => one.action);

/** The secret at the end of the link in the newest letter to an address. */
async function invitationToken(email: string): Promise<string> {
  const mail = await models.OutgoingMail.findOne({ where: { to: email }, order: [['id', 'DESC']] });
  return /\/invitations\/([\w-]+)/.exec(mail!.text)![1]!;
}
const invite = (email: string, role: 'admin' | 'analyst' | 'moderator' | 'viewer', by = boss) =>
  workspaces.invite(by, owner.workspaceId, { email, role }, account.invitationLetter);

describe('invitations', () => {
  test('are accepted by the invited address only, and once', async () => {
    const guest = await makePerson({ role: 'owner', name: 'Guest' });
    const other = await makePerson({ role: 'owner', name: 'Other' });
    await invite(guest.email.toUpperCase(), 'analyst');
    const token = await invitationToken(guest.email);
    expect(await workspaces.invitationByToken(token)).toMatchObject({ role: 'analyst', email: guest.email });
    // What is stored is not what opens.
    expect(await models.Invitation.count({ where: { tokenHash: token } })).toBe(0);

    await expect(workspaces.acceptInvitation(await actorFor(other), token)).rejects.toMatchObject(
      refusal(403),
    );
    await workspaces.acceptInvitation(await actorFor(guest), token);
    expect((await actorFor(guest)).memberships).toContainEqual({
      workspaceId: owner.workspaceId,
      role: 'analyst',
    });
    await expect(workspaces.acceptInvitation(await actorFor(guest), token)).rejects.toMatchObject(
      refusal(404),
    );
    await expect(invite(guest.email, 'viewer')).rejects.toMatchObject(refusal(422));
    expect(await actions()).toEqual(expect.arrayContaining(['invitation.send', 'invitation.accept']));
  });

  test('sent again, taken back or too old: the earlier link is dead', async () => {
    const email = 'late@people.example';
    const first = await invite(email, 'viewer');
    const old = await invitationToken(email);
    const second = await invite(email, 'viewer');
    const token = await invitationToken(email);
    expect(await workspaces.invitationByToken(old)).toBeNull();
    expect(await workspaces.invitationByToken(token)).not.toBeNull();
    const waiting = await workspaces.listInvitations(boss, owner.workspaceId);
    expect(waiting.map((one) => one.id)).toContain(second.id);
    expect(waiting.map((one) => one.id)).not.toContain(first.id);

    await workspaces.revokeInvitation(boss, owner.workspaceId, second.id);
    expect(await workspaces.invitationByToken(token)).toBeNull();

    const third = await invite(email, 'viewer');
    expect(Date.parse(third.expiresAt) - Date.now()).toBeGreaterThan(6.9 * 86_400_000);
    expect(Date.parse(third.expiresAt) - Date.now()).toBeLessThanOrEqual(7 * 86_400_000);
    await models.Invitation.update({ expiresAt: new Date(Date.now() - 1000) }, { where: { id: third.id } });
    expect(await workspaces.invitationByToken(await invitationToken(email))).toBeNull();
  });
});

describe('roles', () => {
  test('an admin changes roles up to their own and never an owner’s', async () => {
    const admin = await actorFor(await member('admin'));
    const viewer = await member('viewer');
    const change = (userId: string, role: TestPerson['role']) =>
      workspaces.changeRole(admin, owner.workspaceId, userId, role);
    expect(await change(viewer.id, 'admin')).toMatchObject({ role: 'admin' });
    await expect(change(viewer.id, 'owner')).rejects.toMatchObject(refusal(403));
    await expect(change(owner.id, 'viewer')).rejects.toMatchObject(refusal(422));
    await expect(workspaces.removePerson(admin, owner.workspaceId, owner.id)).rejects.toMatchObject(
      refusal(422),
    );
    expect((await models.Membership.findOne({ where: { userId: owner.id } }))?.role).toBe('owner');
  });

  test.each(['analyst', 'moderator', 'viewer'] as const)('a %s changes nothing', async (role) => {
    const person = await actorFor(await member(role));
    const victim = await member('viewer');
    const { workspaceId } = owner;
    for (const attempt of [
      () => workspaces.changeRole(person, workspaceId, victim.id, 'analyst'),
      () => workspaces.removePerson(person, workspaceId, victim.id),
      () => invite('friend@people.example', 'viewer', person),
      () => workspaces.changeSettings(person, workspaceId, { viewersSeeNames: true }),
      () => workspaces.listAudit(person, workspaceId, 10),
    ])
      await expect(attempt()).rejects.toMatchObject(refusal(403));
  });

  test('the owner of another workspace finds nothing', async () => {
    const foreign = await actorFor(await makePerson({ role: 'owner' }));
    const { workspaceId } = owner;
    await expect(workspaces.listPeople(foreign, workspaceId)).rejects.toMatchObject(refusal(404));
    await expect(workspaces.getSettings(foreign, workspaceId)).rejects.toMatchObject(refusal(404));
    await expect(workspaces.removePerson(boss, workspaceId, foreign.userId)).rejects.toMatchObject(
      refusal(404),
    );
  });

  test('a removed person is out, their tokens too, and the log says so', async () => {
    const person = await member('analyst');
    const { token } = await workspaces.createToken(await actorFor(person), owner.workspaceId, {
      name: 'script',
      readOnly: false,
      days: 30,
    });
    const headers = new Headers({ authorization: `Bearer ${token}` });
    expect(await account.actorOf(headers)).not.toBeNull();
    await workspaces.removePerson(boss, owner.workspaceId, person.id);
    expect((await actorFor(person)).memberships).toEqual([]);
    expect(await account.actorOf(headers)).toBeNull();
    expect(await actions()).toContain('person.remove');
  });
});

describe('API tokens', () => {
  const make = async (person: TestPerson, readOnly: boolean) =>
    workspaces.createToken(await actorFor(person), person.workspaceId, {
      name: 'script',
      readOnly,
      days: 30,
    });
  const bearer = (token: string) => new Headers({ authorization: `Bearer ${token}` });

  test('open their own workspace only, are kept as a hash, and end', async () => {
    const person = await member('analyst');
    const second = await models.Workspace.create({ name: 'Second' });
    await models.Membership.create({ workspaceId: second.id, userId: person.id, role: 'owner' });
    const { token, id } = await make(person, false);
    expect(await models.ApiToken.count({ where: { tokenHash: token } })).toBe(0);
    expect(await account.actorOf(bearer(token))).toMatchObject({
      userId: person.id,
      via: 'token',
      readOnly: false,
      memberships: [{ workspaceId: owner.workspaceId, role: 'analyst' }],
    });
    expect(await account.actorOf(bearer(`${token}x`))).toBeNull();

    await models.ApiToken.update({ expiresAt: new Date(Date.now() - 1000) }, { where: { id } });
    expect(await account.actorOf(bearer(token))).toBeNull();
    const next = await make(person, false);
    await workspaces.revokeToken(await actorFor(person), owner.workspaceId, next.id);
    expect(await account.actorOf(bearer(next.token))).toBeNull();
  });

  test('for reading only are refused every change; none makes another token', async () => {
    const { PATCH } = await import('@/pages/api/v1/workspaces/[workspace]/index');
    const { call } = await import('./call');
    const admin = await member('admin');
    const patch = async (readOnly: boolean) =>
      call(PATCH, {
        actor: await account.actorOf(bearer((await make(admin, readOnly)).token)),
        method: 'PATCH',
        params: { workspace: owner.workspaceId },
        body: { smallestGroup: 7 },
      });
    expect((await patch(true)).status).toBe(403);
    expect((await patch(false)).status).toBe(200);
    const actor = (await account.actorOf(bearer((await make(admin, false)).token)))!;
    await expect(
      workspaces.createToken(actor, owner.workspaceId, { name: 'child', readOnly: false, days: 365 }),
    ).rejects.toMatchObject(refusal(403));
  });

  test('of others are revoked by those who manage the workspace, and by nobody else', async () => {
    const { id } = await make(await member('analyst'), true);
    const colleague = await actorFor(await member('moderator'));
    await expect(workspaces.revokeToken(colleague, owner.workspaceId, id)).rejects.toMatchObject(
      refusal(404),
    );
    await workspaces.revokeToken(boss, owner.workspaceId, id);
    expect((await models.ApiToken.findByPk(id))?.revokedAt).not.toBeNull();
  });
});

describe('workspaces', () => {
  test('belong to who makes them; settings are kept and logged', async () => {
    const made = await workspaces.createWorkspace(owner.id, 'Dunes');
    const actor = await actorFor(owner);
    expect((await workspaces.myWorkspaces(actor)).find((one) => one.id === made.id)).toMatchObject({
      name: 'Dunes',
      role: 'owner',
    });
    await workspaces.changeSettings(actor, made.id, { viewersSeeNames: true, neighbourFloor: 8 });
    expect(await workspaces.getSettings(actor, made.id)).toMatchObject({
      viewersSeeNames: true,
      neighbourFloor: 8,
    });
    const { items } = await workspaces.listAudit(actor, made.id, 10);
    expect(items.map((one) => one.action)).toEqual(['workspace.settings', 'workspace.create']);
  });

  test('the audit log is paged without gaps or repeats', async () => {
    const all = (await workspaces.listAudit(boss, owner.workspaceId, 500)).items.map((one) => one.id);
    const paged: string[] = [];
    let cursor: string | undefined;
    do {
      const page = await workspaces.listAudit(boss, owner.workspaceId, 3, cursor);
      paged.push(...page.items.map((one) => one.id));
      cursor = page.nextCursor ?? undefined;
    } while (cursor);
    expect(all.length).toBeGreaterThan(6);
    expect(paged).toEqual(all);
  });
});

describe('requests from other sites', () => {
  test.each([
    ['a form of another site', { cookie: 'c=1', origin: 'https://evil.example' }, true],
    ['a form of a sandboxed page', { cookie: 'c=1', origin: 'null' }, true],
    ['no origin, but cross-site', { cookie: 'c=1', 'sec-fetch-site': 'cross-site' }, true],
    ['no origin, but a sibling host', { cookie: 'c=1', 'sec-fetch-site': 'same-site' }, true],
    ['our own page', { cookie: 'c=1', origin: 'http://thrum.test' }, false],
    ['a script with a token', { authorization: 'Bearer t', origin: 'https://evil.example' }, false],
    ['nobody’s session', { origin: 'https://evil.example' }, false],
  ])('%s', async (_, headers, foreign) => {
    const { isForeign } = await import('@/middleware/origin');
    const url = 'http://thrum.test/api/v1/workspaces';
    expect(isForeign(new Request(url, { method: 'POST', headers }))).toBe(foreign);
    expect(isForeign(new Request(url, { headers }))).toBe(false);
  });
});
