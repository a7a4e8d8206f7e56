import type { Actor } from '@/lib/actor';
import { csvLine } from '@/lib/csv';
import { notFound } from '@/lib/problem';
import { sequelize } from '@/server/models';
import { audit } from '@/features/workspaces/index.server';
import { memberLines, type MemberLine } from './members.server';
import { readingFor } from './scope.server';

const CHUNK = 5_000;
const HEAD = [
  ['id', (line: MemberLine) => line.external_id],
  ['name', (line: MemberLine) => line.name],
  ['value', (line: MemberLine) => line.value],
  ['observed', (line: MemberLine) => line.observed],
  ['smoothed', (line: MemberLine) => line.smoothed],
  ['standard_error', (line: MemberLine) => line.standard_error],
  ['departure', (line: MemberLine) => line.departure],
  ['leverage', (line: MemberLine) => line.leverage],
  ['z', (line: MemberLine) => line.z],
  ['p', (line: MemberLine) => line.p],
  ['q', (line: MemberLine) => line.q],
  ['tested', (line: MemberLine) => line.tested],
  ['neighbours', (line: MemberLine) => line.neighbours],
  ['local_moran', (line: MemberLine) => line.local_i],
  ['local_moran_z', (line: MemberLine) => line.local_z],
  ['local_moran_p', (line: MemberLine) => line.local_p],
  ['local_moran_q', (line: MemberLine) => line.local_q],
  ['quadrant', (line: MemberLine) => line.quadrant],
  ['local_moran_permutation_p', (line: MemberLine) => line.local_permutation_p],
] as const;

/** Streams every member of a reading as CSV; written to the audit log before the first byte leaves. */
export async function exportReading(actor: Actor, id: string): Promise<Response> {
  const { reading } = await readingFor(actor, id, 'export.tables');
  if (reading.state !== 'ready') throw notFound();
  await sequelize.transaction((transaction) =>
    audit(
      {
        workspaceId: reading.workspaceId,
        actorId: actor.userId,
        action: 'export.reading',
        targetKind: 'reading',
        targetId: id,
        detail: { format: 'csv' },
      },
      transaction,
    ),
  );
  const encoder = new TextEncoder();
  let offset = 0;
  const body = new ReadableStream<Uint8Array>({
    start: (controller) => controller.enqueue(encoder.encode(csvLine(HEAD.map(([title]) => title)))),
    async pull(controller) {
      const lines = await memberLines(reading, null, { sort: 'order' }, offset, CHUNK);
      if (lines.length === 0) return controller.close();
      offset += lines.length;
      controller.enqueue(
        encoder.encode(lines.map((line) => csvLine(HEAD.map(([, cell]) => cell(line)))).join('')),
      );
    },
  });
  const file = `${reading.attribute.replaceAll(/[^\p{L}\p{N}]+/gu, '-').toLowerCase() || 'reading'}.csv`;
  return new Response(body, {
    headers: {
      'content-type': 'text/csv; charset=utf-8',
      // RFC 5987, so that any attribute name makes a valid header.
      'content-disposition': `attachment; filename="reading.csv"; filename*=UTF-8''${encodeURIComponent(file)}`,
      'cache-control': 'no-store',
    },
  });
}
