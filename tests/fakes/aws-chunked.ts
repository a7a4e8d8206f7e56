import type { IncomingMessage } from 'node:http';

/** The body of a put: as it is, or with the chunk frames of `aws-chunked` taken off. */
export async function* decodeChunks(request: IncomingMessage): AsyncGenerator<Buffer> {
  const framed =
    request.headers['content-encoding']?.includes('aws-chunked') === true ||
    String(request.headers['x-amz-content-sha256'] ?? '').startsWith('STREAMING');
  if (!framed) {
    yield* request as AsyncIterable<Buffer>;
    return;
  }
  let held = Buffer.alloc(0);
  let left = -1;
  for await (const chunk of request as AsyncIterable<Buffer>) {
    held = Buffer.concat([held, chunk]);
    for (;;) {
      if (left < 0) {
        const end = held.indexOf('\r\n');
        if (end < 0) break;
        left = Number.parseInt(held.subarray(0, end).toString('latin1').split(';')[0]!, 16);
        held = held.subarray(end + 2);
        if (left === 0) return;
      }
      // A chunk is followed by a line end that is not part of it.
      if (held.length < left + 2) break;
      yield held.subarray(0, left);
      held = held.subarray(left + 2);
      left = -1;
    }
  }
}
