import { QueryTypes } from 'sequelize';
import type { Actor } from '@/lib/actor';
import { csvLine } from '@/lib/csv';
import { notFound } from '@/lib/problem';
import { sequelize } from '@/server/models';
import { audit } from '@/features/workspaces/index.server';
import { groupingFor, groupsOf } from './scope.server';

const CHUNK = 5_000;

interface Row {
  ordinal: number;
  external_id: string;
  name: string | null;
  group_index: number | null;
  vector: number | null;
}

/** Streams the group of every member as CSV; written to the audit log before the first byte leaves. */
export async function exportGrouping(actor: Actor, id: string): Promise<Response> {
  const { grouping } = await groupingFor(actor, id, 'export.tables');
  if (grouping.state !== 'ready') throw notFound();
  await sequelize.transaction((transaction) =>
    audit(
      {
        workspaceId: grouping.workspaceId,
        actorId: actor.userId,
        action: 'export.grouping',
        targetKind: 'grouping',
        targetId: id,
        detail: { format: 'csv' },
      },
      transaction,
    ),
  );
  const groups = groupsOf(grouping);
  const encoder = new TextEncoder();
  let after = -1;
  const body = new ReadableStream<Uint8Array>({
    start: (controller) =>
      controller.enqueue(encoder.encode(csvLine(['id', 'name', 'group', 'group_name', 'vector']))),
    async pull(controller) {
      const rows = await sequelize.query<Row>(
        `SELECT g.ordinal, m.external_id, m.name, g.group_index, g.vector
         FROM grouping_members g JOIN snapshot_members m ON m.snapshot_id = $2 AND m.ordinal = g.ordinal
         WHERE g.grouping_id = $1 AND g.ordinal > $3 ORDER BY g.ordinal LIMIT $4`,
        { bind: [id, grouping.snapshotId, after, CHUNK], type: QueryTypes.SELECT },
      );
      if (rows.length === 0) return controller.close();
      after = rows.at(-1)!.ordinal;
      const lines = rows.map((row) => {
        const group = row.group_index === null ? undefined : groups[row.group_index];
        return csvLine([row.external_id, row.name, group?.letter ?? null, group?.name ?? null, row.vector]);
      });
      controller.enqueue(encoder.encode(lines.join('')));
    },
  });
  return new Response(body, {
    headers: {
      'content-type': 'text/csv; charset=utf-8',
      'content-disposition': `attachment; filename="groups-${id.slice(-8)}.csv"`,
      'cache-control': 'no-store',
    },
  });
}
