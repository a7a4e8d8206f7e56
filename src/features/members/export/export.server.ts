import type { Actor } from '@/lib/actor';
import { sequelize } from '@/server/models';
import type { SharedSnapshot } from '@/features/views/index.server';
import { audit } from '@/features/workspaces/index.server';
import type { MembersQuery } from '../members';
import { allMemberRows } from '../rows.server';
import { distinct, type Encoder, type Table } from './table';
import { csv, jsonl } from './text';

export type ExportFormat = 'csv' | 'jsonl' | 'xlsx' | 'parquet';

/** Media types, and the encoders, of which the heavy ones are loaded when first asked for. */
const FORMATS: Readonly<Record<ExportFormat, { type: string; load: () => Promise<Encoder> }>> = {
  csv: { type: 'text/csv; charset=utf-8', load: () => Promise.resolve(csv) },
  jsonl: { type: 'application/jsonl; charset=utf-8', load: () => Promise.resolve(jsonl) },
  xlsx: {
    type: 'application/vnd.openxmlformats-officedocument.spreadsheetml.sheet',
    load: async () => (await import('./xlsx.server')).xlsx,
  },
  parquet: {
    type: 'application/vnd.apache.parquet',
    load: async () => (await import('./parquet.server')).parquet,
  },
};

/** Names of the columns that say who; JSON has them as the API has them. */
const WHO = { csv: ['id', 'external_id', 'name'], jsonl: ['id', 'externalId', 'name'] } as const;

/** Streams every row of a query as a file; the export is written to the audit log before the first byte leaves. */
export async function exportMembers(
  actor: Actor,
  shared: SharedSnapshot,
  query: MembersQuery,
  format: ExportFormat,
): Promise<Response> {
  const { columns, chunks } = await allMemberRows(actor, shared, query);
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
  const who = WHO[format === 'jsonl' ? 'jsonl' : 'csv'];
  const names = distinct([...who, ...columns.map(({ title }) => title)]);
  const table: Table = {
    columns: names.map((name, at) => ({
      name,
      type: at < who.length || columns[at - who.length]!.label ? 'text' : 'number',
    })),
    chunks,
    cells: (row) => [
      row.id,
      format === 'jsonl' ? row.externalId : (row.externalId ?? row.code),
      row.name,
      ...query.columns.map((column) => row.values[column] ?? null),
    ],
  };
  const { type, load } = FORMATS[format];
  const pieces = (await load())(table);
  const encoder = new TextEncoder();
  const body = new ReadableStream<Uint8Array>({
    async pull(controller) {
      const { value, done } = await pieces.next();
      if (done) controller.close();
      else controller.enqueue(typeof value === 'string' ? encoder.encode(value) : value);
    },
    cancel: async () => {
      await pieces.return(undefined);
      await chunks.return(undefined);
    },
  });
  return new Response(body, {
    headers: {
      'content-type': type,
      'content-disposition': `attachment; filename="members-${snapshot.takenOn}.${format}"`,
      'cache-control': 'no-store',
    },
  });
}
