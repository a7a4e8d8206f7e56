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

/** Every tie in pages; walked by key, so that the last page is as quick as the first. */
export async function* tiePages(snapshot: Snapshot, size = CHUNK): AsyncGenerator<Row[]> {
  let last: [number, number] = [-1, -1];
  for (;;) {
    const rows = await sequelize.query<Row>(
      `SELECT t.source, t.target, a.external_id AS "from", b.external_id AS "to", t.weight, t.kind, t.count FROM ties t
       JOIN snapshot_members a ON a.snapshot_id = t.snapshot_id AND a.ordinal = t.source
       JOIN snapshot_members b ON b.snapshot_id = t.snapshot_id AND b.ordinal = t.target
       WHERE t.snapshot_id = $1 AND (t.source, t.target) > ($2, $3) ORDER BY t.source, t.target LIMIT $4`,
      { bind: [snapshot.id, ...last, size], type: QueryTypes.SELECT },
    );
    if (rows.length > 0) yield rows;
    const end = rows.at(-1);
    if (!end || rows.length < size) return;
    last = [end.source, end.target];
  }
}

/** Every tie as CSV, streamed. */
export function tiesCsv(snapshot: Snapshot): Response {
  const encoder = new TextEncoder();
  const pages = tiePages(snapshot);
  const body = new ReadableStream<Uint8Array>({
    start: (controller) =>
      controller.enqueue(encoder.encode(csvLine(['source', 'target', 'weight', 'kind', 'rows']))),
    async pull(controller) {
      const { value, done } = await pages.next();
      if (done) return controller.close();
      const lines = value.map((row) => csvLine([row.from, row.to, row.weight, row.kind, row.count]));
      controller.enqueue(encoder.encode(lines.join('')));
    },
    cancel: async () => void (await pages.return(undefined)),
  });
  return new Response(body, {
    headers: {
      'content-type': 'text/csv; charset=utf-8',
      'content-disposition': `attachment; filename="ties-${snapshot.takenOn}.csv"`,
      'cache-control': 'no-store',
    },
  });
}
