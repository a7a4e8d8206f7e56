import type { APIContext, APIRoute } from 'astro';
import type { Actor, Role } from '@/lib/actor';

/** An actor of a role in one workspace, without a session: what the middleware would have found. */
export const actorOf = (userId: string, workspaceId: string, role: Role): Actor => ({
  userId,
  name: `${role} of the test`,
  email: `${userId}@test.example`,
  memberships: [{ workspaceId, role }],
  via: 'session',
  readOnly: false,
});

export interface CallOptions {
  readonly actor: Actor | null;
  readonly method?: string;
  readonly params?: Record<string, string>;
  readonly query?: Record<string, string>;
  readonly body?: unknown;
  /** In place of one made from method and body, for multipart. */
  readonly request?: Request;
}

/** Calls an endpoint as the server would, after the middleware. */
export async function call(route: APIRoute, options: CallOptions): Promise<Response> {
  const url = new URL('http://thrum.test/api');
  for (const [key, value] of Object.entries(options.query ?? {})) url.searchParams.set(key, value);
  const method = options.method ?? (options.body === undefined ? 'GET' : 'POST');
  const request =
    options.request ??
    new Request(url, {
      method,
      ...(options.body === undefined
        ? {}
        : { headers: { 'content-type': 'application/json' }, body: JSON.stringify(options.body) }),
    });
  // Endpoints use only these parts of the context; the rest of it is Astro's.
  const context = {
    url,
    request,
    params: options.params ?? {},
    locals: { actor: options.actor, requestId: 'test' },
  } as unknown as APIContext;
  return (await route(context)) as Response;
}
