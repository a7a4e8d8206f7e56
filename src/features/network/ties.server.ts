import { QueryTypes } from 'sequelize';
import { csvLine } from '@/lib/csv';
import { sequelize, type Snapshot } from '@/server/models';

const CHUNK = 10_000;
interface Row {
  source: number;
  target: number;
  from: string;
  to: string;
  weight: number;
  kind: string | null;
  count: number;
}

/** Every tie as CSV, streamed; walked by key, so that the last page is as quick as the first. */
export function tiesCsv(snapshot: Snapshot): Response {
  const encoder = new TextEncoder();
  let last: [number, number] = [-1, -1];
  let first = true;
  const body = new ReadableStream<Uint8Array>({
    async pull(controller) {
      const rows = await sequelize.query<Row>(
        `SELECT t.source, t.target, a.external_id AS "from", b.external_id AS "to", t.weight, t.kind, t.count FROM ties t
         JOIN snapshot_members a ON a.snapshot_id = t.snapshot_id AND a.ordinal = t.source
         JOIN snapshot_members b ON b.snapshot_id = t.snapshot_id AND b.ordinal = t.target
         WHERE t.snapshot_id = $1 AND (t.source, t.target) > ($2, $3) ORDER BY t.source, t.target LIMIT $4`,
        { bind: [snapshot.id, ...last, CHUNK], type: QueryTypes.SELECT },
      );
      const head = first ? csvLine(['source', 'target', 'weight', 'kind', 'rows']) : '';
      first = false;
      controller.enqueue(
        encoder.encode(
          head + rows.map((row) => csvLine([row.from, row.to, row.weight, row.kind, row.count])).join(''),
        ),
      );
      const end = rows.at(-1);
      if (end) last = [end.source, end.target];
      if (rows.length < CHUNK) controller.close();
    },
  });
  return new Response(body, {
    headers: {
      'content-type': 'text/csv; charset=utf-8',
      'content-disposition': `attachment; filename="ties-${snapshot.takenOn}.csv"`,
      'cache-control': 'no-store',
    },
  });
}
