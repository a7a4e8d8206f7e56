import { randomBytes } from 'node:crypto';
import type { Actor, Role } from '@/lib/actor';

export interface TestPerson {
  readonly id: string;
  readonly name: string;
  readonly email: string;
  readonly password: string;
  readonly role: Role;
  readonly workspaceId: string;
}

const mark = (): string => randomBytes(5).toString('hex');

/**
 * A verified person with a password and a role, in the given workspace or in one of their own.
 * Call after `createTestDatabase()`.
 */
export async function makePerson(of: {
  role: Role;
  workspaceId?: string;
  name?: string;
}): Promise<TestPerson> {
  const { Account, Membership, newId, User, Workspace } = await import('@/server/models');
  const { hashPassword } = await import('better-auth/crypto');
  const name = of.name ?? `${of.role} ${mark()}`;
  const email = `${of.role}-${mark()}@people.example`;
  const password = `pass-${mark()}${mark()}`;
  const user = await User.create({ id: newId(), name, email, emailVerified: true });
  await Account.create({
    id: newId(),
    accountId: user.id,
    providerId: 'credential',
    userId: user.id,
    password: await hashPassword(password),
  });
  const workspaceId = of.workspaceId ?? (await Workspace.create({ name: `Workspace of ${name}` })).id;
  await Membership.create({ workspaceId, userId: user.id, role: of.role });
  return { id: user.id, name, email, password, role: of.role, workspaceId };
}

/** A call of better-auth as a browser would make it. */
export async function callAuth(path: string, body?: unknown, cookie?: string): Promise<Response> {
  const { auth } = await import('@/features/account/index.server');
  const { config } = await import('@/server/config');
  return auth().handler(
    new Request(new URL(`/api/auth/${path}`, config().PUBLIC_URL), {
      method: body === undefined ? 'GET' : 'POST',
      headers: {
        origin: new URL(config().PUBLIC_URL).origin,
        'x-forwarded-for': '192.0.2.7',
        ...(body === undefined ? {} : { 'content-type': 'application/json' }),
        ...(cookie ? { cookie } : {}),
      },
      ...(body === undefined ? {} : { body: JSON.stringify(body) }),
    }),
  );
}

/** The cookies that an answer sets, as a browser would send them back. */
export const cookieOf = (response: Response): string =>
  response.headers
    .getSetCookie()
    .map((one) => one.split(';')[0]!)
    .filter((one) => !one.endsWith('='))
    .join('; ');

/** Signs the person in; answers with the `cookie` header of their session. */
export async function sessionCookie(person: Pick<TestPerson, 'email' | 'password'>): Promise<string> {
  const { email, password } = person;
  const response = await callAuth('sign-in/email', { email, password });
  if (!response.ok) throw new Error(`sign-in answered ${response.status}`);
  return cookieOf(response);
}

/** What the middleware would find for this person's session, memberships as they are now. */
export async function actorFor(person: Pick<TestPerson, 'email' | 'password'>): Promise<Actor> {
  const { actorOf } = await import('@/features/account/index.server');
  const actor = await actorOf(new Headers({ cookie: await sessionCookie(person) }));
  if (!actor) throw new Error('the session was not accepted');
  return actor;
}
