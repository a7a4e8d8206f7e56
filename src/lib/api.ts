import type { ProblemDocument } from './problem';

/** A failed call of our API: what the problem document says is what a person reads. */
export class ApiError extends Error {
  override readonly name = 'ApiError';
  constructor(readonly problem: ProblemDocument) {
    super(`${problem.title} ${problem.detail}`);
  }
}

const OFFLINE: ProblemDocument = {
  type: 'urn:thrum:problem:offline',
  title: 'You’re offline.',
  status: 0,
  detail: 'The server could not be reached. Nothing was lost; try again in a moment.',
};

async function call(url: string, init: RequestInit): Promise<Response> {
  let response: Response;
  try {
    response = await fetch(url, { credentials: 'same-origin', ...init });
  } catch (error) {
    if (init.signal?.aborted) throw error;
    throw new ApiError(OFFLINE);
  }
  if (response.ok) return response;
  const isProblem = response.headers.get('content-type')?.includes('problem+json');
  throw new ApiError(
    isProblem
      ? ((await response.json()) as ProblemDocument)
      : {
          type: 'about:blank',
          title: 'That did not work.',
          status: response.status,
          detail: 'Please try again.',
        },
  );
}

export const getJson = async <T>(url: string, signal?: AbortSignal): Promise<T> =>
  (await (await call(url, signal ? { signal } : {})).json()) as T;

export async function getBytes(
  url: string,
  signal?: AbortSignal,
): Promise<{ buffer: ArrayBuffer; headers: Headers }> {
  const response = await call(url, signal ? { signal } : {});
  return { buffer: await response.arrayBuffer(), headers: response.headers };
}

/** Sends JSON; answers with what came back, or undefined for 204. */
export async function sendJson<T>(
  method: 'POST' | 'PATCH' | 'DELETE',
  url: string,
  body?: unknown,
): Promise<T> {
  const response = await call(url, {
    method,
    ...(body === undefined
      ? {}
      : { headers: { 'content-type': 'application/json' }, body: JSON.stringify(body) }),
  });
  return (response.status === 204 ? undefined : await response.json()) as T;
}
