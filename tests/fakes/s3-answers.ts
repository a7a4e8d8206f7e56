import { createReadStream, statSync } from 'node:fs';
import type { IncomingMessage, ServerResponse } from 'node:http';

export const escapeXml = (text: string): string =>
  text.replaceAll('&', '&amp;').replaceAll('<', '&lt;').replaceAll('>', '&gt;');

export const unescapeXml = (text: string): string =>
  text
    .replaceAll('&lt;', '<')
    .replaceAll('&gt;', '>')
    .replaceAll('&quot;', '"')
    .replaceAll('&apos;', "'")
    .replaceAll('&amp;', '&');

/** Answers with a document. */
export function xml(response: ServerResponse, body: string, status = 200): void {
  response.writeHead(status, { 'content-type': 'application/xml' });
  response.end(`<?xml version="1.0" encoding="UTF-8"?>${body}`);
}

/** Answers with one of S3's error codes. */
export const refuse = (response: ServerResponse, code: string, status = 404): void =>
  xml(response, `<Error><Code>${code}</Code></Error>`, status);

/** First and last byte that a Range header asks for; null for the whole, 'outside' for none. */
function rangeOf(header: string | undefined, size: number): [number, number] | null | 'outside' {
  const range = /^bytes=(\d*)-(\d*)$/.exec(header ?? '');
  if (!range || (!range[1] && !range[2])) return null;
  const last = size - 1;
  const [start, end] = range[1]
    ? [Number(range[1]), range[2] ? Math.min(Number(range[2]), last) : last]
    : [Math.max(0, size - Number(range[2])), last];
  return start > end ? 'outside' : [start, end];
}

/** Answers GET and HEAD of an object, or a part of it. */
export function sendObject(request: IncomingMessage, response: ServerResponse, file: string): void {
  const { size, mtime, mtimeMs } = statSync(file);
  const range = rangeOf(request.headers.range, size);
  if (range === 'outside') {
    refuse(response, 'InvalidRange', 416);
    return;
  }
  const [start, end] = range ?? [0, size - 1];
  response.writeHead(range ? 206 : 200, {
    'content-length': end - start + 1,
    'last-modified': mtime.toUTCString(),
    'accept-ranges': 'bytes',
    etag: `"${size.toString(16)}-${Math.round(mtimeMs).toString(16)}"`,
    ...(range ? { 'content-range': `bytes ${start}-${end}/${size}` } : {}),
  });
  if (request.method === 'HEAD' || size === 0) response.end();
  else createReadStream(file, { start, end }).pipe(response);
}
