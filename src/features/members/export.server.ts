import type { Actor } from '@/lib/actor';
import { csvLine } from '@/lib/csv';
import { sequelize } from '@/server/models';
import type { SharedSnapshot } from '@/features/views/index.server';
import { audit } from '@/features/workspaces/index.server';
import type { MemberRow, MembersQuery } from './members';
import { allMemberRows } from './rows.server';

type Format = 'csv' | 'jsonl';
const TYPES: Record<Format, string> = {
  csv: 'text/csv; charset=utf-8',
  jsonl: 'application/jsonl; charset=utf-8',
};

const headOf = (format: Format, titles: readonly string[]): string =>
  format === 'csv' ? csvLine(['id', 'external_id', 'name', ...titles]) : '';

const lineOf = (format: Format, row: MemberRow, query: MembersQuery, titles: readonly string[]): string => {
  const cells = query.columns.map((column) => row.values[column] ?? null);
  if (format === 'csv') return csvLine([row.id, row.externalId ?? row.code, row.name, ...cells]);
  const named = Object.fromEntries(titles.map((title, index) => [title, cells[index]]));
  return `${JSON.stringify({ id: row.id, externalId: row.externalId, name: row.name, ...named })}\n`;
};

/** Streams every row of a query as a file; the export is written to the audit log before the first byte leaves. */
export async function exportMembers(
  actor: Actor,
  shared: SharedSnapshot,
  query: MembersQuery,
  format: Format,
): Promise<Response> {
  const { titles, chunks } = await allMemberRows(actor, shared, query);
  const { snapshot } = shared;
  await sequelize.transaction((transaction) =>
    audit(
      {
        workspaceId: snapshot.workspaceId,
        actorId: actor.userId,
        action: 'export.members',
        targetKind: 'snapshot',
        targetId: snapshot.id,
        detail: { format, columns: query.columns, filters: query.filter.length },
      },
      transaction,
    ),
  );
  const encoder = new TextEncoder();
  let first = true;
  const body = new ReadableStream<Uint8Array>({
    async pull(controller) {
      const { value, done } = await chunks.next();
      const head = first ? headOf(format, titles) : '';
      first = false;
      if (done) {
        if (head) controller.enqueue(encoder.encode(head));
        controller.close();
        return;
      }
      controller.enqueue(
        encoder.encode(head + value.map((row) => lineOf(format, row, query, titles)).join('')),
      );
    },
    cancel: async () => void (await chunks.return(undefined)),
  });
  return new Response(body, {
    headers: {
      'content-type': TYPES[format],
      'content-disposition': `attachment; filename="members-${snapshot.takenOn}.${format}"`,
      'cache-control': 'no-store',
    },
  });
}
