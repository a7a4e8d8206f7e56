import type * as z from 'zod';
import { ProblemError } from '@/lib/problem';

/** Largest JSON body; files go by multipart and are streamed. */
const JSON_LIMIT = 1_048_576;

/** @throws ProblemError 400 with one message per field. */
export function validate<S extends z.ZodType>(schema: S, value: unknown, part: string): z.output<S> {
  const parsed = schema.safeParse(value);
  if (parsed.success) return parsed.data;
  const errors = parsed.error.issues.map((issue) => ({
    path: issue.path.join('.') || part,
    message: issue.message,
  }));
  throw new ProblemError(
    400,
    'malformed',
    'Please check what was sent.',
    errors.map((e) => `${e.path}: ${e.message}`).join('; '),
    errors,
  );
}

/** @throws ProblemError 413, 415 or 400. */
export async function readJson(request: Request): Promise<unknown> {
  const type = request.headers.get('content-type') ?? '';
  const reader = request.body?.getReader();
  const chunks: Uint8Array[] = [];
  let size = 0;
  for (;;) {
    const part = await reader?.read();
    if (!part || part.done) break;
    size += part.value.byteLength;
    if (size > JSON_LIMIT)
      throw new ProblemError(413, 'too-large', 'That is too large.', 'A request may hold 1 MB.');
    chunks.push(part.value);
  }
  if (size === 0) return {};
  if (!/^application\/(json|.*\+json)/.test(type))
    throw new ProblemError(415, 'wrong-type', 'Wrong content type.', 'Send application/json.');
  try {
    return JSON.parse(Buffer.concat(chunks).toString('utf8'));
  } catch {
    throw new ProblemError(400, 'malformed', 'Please check what was sent.', 'The body is not JSON.');
  }
}
