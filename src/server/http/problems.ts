import { ProblemError, type ProblemDocument } from '@/lib/problem';
import { log } from '../log';

/** The one place that turns an error into a problem document and decides what is logged. */
export function problemResponse(error: unknown, requestId = ''): Response {
  if (error instanceof ProblemError) return respond(error.toDocument(), error.headers);
  log.error({ requestId, err: error }, 'request failed');
  return respond({
    type: 'urn:thrum:problem:internal',
    title: 'Something went wrong on our side.',
    status: 500,
    detail: `Nothing was changed. Try again; if it happens again, quote ${requestId}.`,
  });
}

function respond(document: ProblemDocument, headers: Readonly<Record<string, string>> = {}): Response {
  return new Response(JSON.stringify(document), {
    status: document.status,
    headers: { 'content-type': 'application/problem+json', 'cache-control': 'no-store', ...headers },
  });
}
