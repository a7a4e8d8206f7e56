import { QueryTypes } from 'sequelize';
import { sequelize, type Snapshot } from '@/server/models';
import { attributesOf } from './arrays.server';
import { graphWriters, type GraphAttribute, type GraphFormat, type GraphMember } from './graph-files';
import { tiePages } from './ties.server';

const CHUNK = 2_000;
const TYPES: Readonly<Record<GraphFormat, string>> = {
  gexf: 'application/gexf+xml',
  graphml: 'application/graphml+xml',
};

interface Cell {
  attribute_id: string;
  ordinal: number;
  value: number | null;
  label: string | null;
}

/** Members in their order with the values of some attributes, in pages. */
async function* memberPages(
  snapshot: Snapshot,
  attributes: readonly { id: string }[],
): AsyncGenerator<GraphMember[]> {
  const place = new Map(attributes.map(({ id }, at) => [id, at]));
  for (let from = 0; ; from += CHUNK) {
    const bind = [snapshot.id, from, from + CHUNK];
    const members = await sequelize.query<{ ordinal: number; external_id: string; name: string | null }>(
      `SELECT ordinal, external_id, name FROM snapshot_members
       WHERE snapshot_id = $1 AND ordinal >= $2 AND ordinal < $3 ORDER BY ordinal`,
      { bind, type: QueryTypes.SELECT },
    );
    if (members.length === 0) return;
    const cells = await sequelize.query<Cell>(
      `SELECT attribute_id, ordinal, value, label FROM attribute_values
       WHERE attribute_id = ANY($1::uuid[]) AND ordinal >= $2 AND ordinal < $3`,
      { bind: [[...place.keys()], from, from + CHUNK], type: QueryTypes.SELECT },
    );
    const rows = members.map(({ external_id, name }) => ({
      id: external_id,
      name,
      values: Array<number | string | null>(attributes.length).fill(null),
    }));
    const first = members[0]!.ordinal;
    for (const cell of cells)
      rows[cell.ordinal - first]!.values[place.get(cell.attribute_id)!] = cell.label ?? cell.value;
    yield rows;
  }
}

async function* pieces(snapshot: Snapshot, format: GraphFormat): AsyncGenerator<string> {
  const attributes = await attributesOf(snapshot.id);
  const described: GraphAttribute[] = attributes.map(({ name, type }) => ({
    name,
    type: type === 'label' ? 'label' : 'number',
  }));
  const writer = graphWriters[format](described);
  yield writer.head(snapshot.takenOn);
  for await (const page of memberPages(snapshot, attributes)) yield page.map(writer.member).join('');
  yield writer.middle;
  let number = 0;
  for await (const page of tiePages(snapshot, CHUNK))
    yield page.map((tie) => writer.tie(tie, number++)).join('');
  yield writer.foot;
}

/** The whole network of a snapshot with every attribute, streamed in an open format. */
export function graphFile(snapshot: Snapshot, format: GraphFormat): Response {
  const source = pieces(snapshot, format);
  const encoder = new TextEncoder();
  const body = new ReadableStream<Uint8Array>({
    async pull(controller) {
      const { value, done } = await source.next();
      if (done) controller.close();
      else controller.enqueue(encoder.encode(value));
    },
    cancel: async () => void (await source.return(undefined)),
  });
  return new Response(body, {
    headers: {
      'content-type': `${TYPES[format]}; charset=utf-8`,
      'content-disposition': `attachment; filename="network-${snapshot.takenOn}.${format}"`,
      'cache-control': 'no-store',
    },
  });
}
