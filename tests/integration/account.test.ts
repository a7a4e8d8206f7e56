import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { callAuth, cookieOf, makePerson, sessionCookie } from '../factories/people';
import { createTestDatabase, type TestDatabase } from './database';

let database: TestDatabase;
let models: typeof import('@/server/models');
let account: typeof import('@/features/account/index.server');

beforeAll(async () => {
  database = await createTestDatabase();
  models = await import('@/server/models');
  account = await import('@/features/account/index.server');
});

afterAll(async () => {
  await models.sequelize.close();
  await database.drop();
});

const PASSWORD = 'a-long-enough-word';
const signUp = (email: string, password = PASSWORD) =>
  callAuth('sign-up/email', { name: 'Nora New', email, password, callbackURL: '/w/new' });
const signIn = (email: string, password = PASSWORD) =>
  callAuth('sign-in/email', { email, password, callbackURL: '/w/new' });

/** The newest letter to an address that waits in the outbox, and the link in it. */
async function letterTo(email: string): Promise<{ subject: string; link: string }> {
  const mail = await models.OutgoingMail.findOne({ where: { to: email }, order: [['id', 'DESC']] });
  if (!mail) throw new Error(`no letter to ${email}`);
  const link = /https?:\/\/\S+/.exec(mail.text)?.[0] ?? '';
  // The same link stands in the HTML, its ampersands escaped.
  expect(mail.html).toContain(link.replaceAll('&', '&amp;'));
  return { subject: mail.subject, link };
}
const follow = (link: string): Promise<Response> =>
  callAuth(link.slice(link.indexOf('/api/auth/') + '/api/auth/'.length));

describe('signing up', () => {
  const email = 'nora@people.example';

  test('sends a letter, and nothing opens before its link is followed', async () => {
    const answer = await signUp(email);
    expect(answer.status).toBe(200);
    expect(cookieOf(answer)).toBe('');
    expect((await signIn(email)).status).toBe(403);
  });

  test('the link signs in and leads on; the session then opens and closes', async () => {
    const { link } = await letterTo(email);
    const answer = await follow(link);
    expect(answer.status).toBe(302);
    expect(answer.headers.get('location')).toBe('/w/new');
    expect((await models.User.findOne({ where: { email } }))?.emailVerified).toBe(true);

    const cookie = cookieOf(answer);
    const headers = new Headers({ cookie });
    expect(await account.actorOf(headers)).toMatchObject({ email, via: 'session', memberships: [] });
    expect((await callAuth('sign-out', {}, cookie)).status).toBe(200);
    expect(await account.actorOf(headers)).toBeNull();
    expect((await signIn(email)).status).toBe(200);
  });

  test('with a known address it looks the same to a stranger, and its owner is told', async () => {
    const fresh = await signUp('someone-else@people.example');
    const again = await signUp(email, 'another-long-word');
    expect(again.status).toBe(fresh.status);
    const shape = (body: unknown) => Object.keys((body as { user: object }).user).sort();
    expect(shape(await again.json())).toEqual(shape(await fresh.json()));
    expect((await letterTo(email)).subject).toContain('already have an account');
    expect((await signIn(email)).status).toBe(200);
    expect((await signIn(email, 'another-long-word')).status).toBe(401);
  });

  test('refuses a short password', async () => {
    expect((await signUp('short@people.example', 'too-short')).status).toBe(400);
  });
});

describe('signing in', () => {
  test('answers the same for a wrong password and for an unknown address', async () => {
    const person = await makePerson({ role: 'analyst' });
    const wrong = await signIn(person.email, 'not-the-password');
    const unknown = await signIn('nobody@people.example', 'not-the-password');
    expect([wrong.status, unknown.status]).toEqual([401, 401]);
    expect(await wrong.json()).toEqual(await unknown.json());
  });

  test('lasts 14 days when kept, and as long as the browser is open otherwise', async () => {
    const { email, password } = await makePerson({ role: 'analyst' });
    const kept = await callAuth('sign-in/email', { email, password, rememberMe: true });
    const brief = await callAuth('sign-in/email', { email, password, rememberMe: false });
    const session = (answer: Response) =>
      answer.headers.getSetCookie().find((one) => one.includes('session_token'))!;
    expect(session(kept)).toContain(`Max-Age=${14 * 86_400}`);
    expect(session(kept)).toMatch(/HttpOnly/i);
    expect(session(kept)).toMatch(/SameSite=Lax/i);
    expect(session(brief)).not.toMatch(/Max-Age=|Expires=/i);
  });

  test('a removed membership ends at once, in a session that goes on', async () => {
    const person = await makePerson({ role: 'analyst' });
    const headers = new Headers({ cookie: await sessionCookie(person) });
    expect((await account.actorOf(headers))?.memberships).toEqual([
      { workspaceId: person.workspaceId, role: 'analyst' },
    ]);
    await models.Membership.destroy({ where: { userId: person.id } });
    expect((await account.actorOf(headers))?.memberships).toEqual([]);
  });

  test('a forged cookie opens nothing', async () => {
    const cookie = await sessionCookie(await makePerson({ role: 'owner' }));
    const forged = cookie.replace(
      /session_token=(.)/,
      (_, first) => `session_token=${first === 'a' ? 'b' : 'a'}`,
    );
    expect(forged).not.toBe(cookie);
    expect(await account.actorOf(new Headers({ cookie: forged }))).toBeNull();
  });
});

describe('a forgotten password', () => {
  test('is replaced through the link, once; other sessions end', async () => {
    const person = await makePerson({ role: 'moderator' });
    const headers = new Headers({ cookie: await sessionCookie(person) });
    const asked = await callAuth('request-password-reset', { email: person.email, redirectTo: '/reset' });
    const landed = await follow((await letterTo(person.email)).link);
    const token = new URL(landed.headers.get('location')!, 'http://thrum.test').searchParams.get('token')!;
    expect(landed.headers.get('location')).toContain('/reset?token=');

    const reset = () => callAuth('reset-password', { newPassword: 'quite-another-word', token });
    expect((await reset()).status).toBe(200);
    expect((await reset()).status).toBe(400);
    expect((await signIn(person.email, person.password)).status).toBe(401);
    expect((await signIn(person.email, 'quite-another-word')).status).toBe(200);
    expect(await account.actorOf(headers)).toBeNull();

    // Asking for an address that nobody has answers the same and sends nothing.
    const unknown = await callAuth('request-password-reset', {
      email: 'nobody@people.example',
      redirectTo: '/reset',
    });
    expect(await unknown.json()).toEqual(await asked.json());
    expect(await models.OutgoingMail.count({ where: { to: 'nobody@people.example' } })).toBe(0);
  });
});

describe('too many tries', () => {
  test('are refused with the seconds to wait', async () => {
    const { ALL } = await import('@/pages/api/auth/[...all]');
    const attempt = () =>
      ALL({
        clientAddress: '192.0.2.99',
        request: new Request('http://thrum.test/api/auth/request-password-reset', {
          method: 'POST',
          headers: { 'content-type': 'application/json', origin: 'http://thrum.test' },
          body: JSON.stringify({ email: 'nobody@people.example', redirectTo: '/reset' }),
        }),
      } as unknown as Parameters<typeof ALL>[0]) as Promise<Response>;
    const statuses: number[] = [];
    let last: Response | undefined;
    for (let i = 0; i < 11; i++) statuses.push((last = await attempt()).status);
    expect(statuses).toEqual([...new Array<number>(10).fill(200), 429]);
    expect(Number(last!.headers.get('retry-after'))).toBeGreaterThan(0);
  });
});

describe('demo people', () => {
  test('are five, verified, able to sign in, and made once', async () => {
    const ids = await account.ensureDemoPeople();
    expect(await account.ensureDemoPeople()).toEqual(ids);
    for (const role of ['owner', 'admin', 'analyst', 'moderator', 'viewer'])
      expect((await signIn(`${role}@saltmarsh.example`, 'saltmarsh-demo-1264')).status).toBe(200);
  });
});
