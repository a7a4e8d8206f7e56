import { QueryTypes, type Transaction } from 'sequelize';
import { sequelize } from '@/server/models';
import { saveArray } from './arrays.server';
import { encodeNetwork } from './binary';
import type { Shape } from './compute';

const NAME = 'picture';
/** Bytes read at a time: a whole large network in one piece would hold up the web process while it is unpacked. */
const PIECE = 1_048_576;

/** Keeps the network in the Map's binary form with the snapshot, so that opening the Map computes nothing. */
export async function savePicture(
  snapshotId: string,
  shape: Pick<Shape, 'network' | 'component' | 'x' | 'y'>,
  ties: { sources: Int32Array; targets: Int32Array; weights: Float64Array },
  transaction: Transaction,
): Promise<void> {
  const { n, offsets, strength } = shape.network;
  const bytes = encodeNetwork({
    n,
    ties: ties.sources.length,
    x: shape.x,
    y: shape.y,
    degree: Int32Array.from({ length: n }, (_, i) => offsets[i + 1]! - offsets[i]!),
    strength: Float32Array.from(strength),
    component: shape.component,
    sources: ties.sources,
    targets: ties.targets,
    weights: Float32Array.from(ties.weights),
  });
  await saveArray(snapshotId, NAME, new Int32Array(bytes), transaction);
}

/** The kept binary form, streamed piece by piece. @returns its length in bytes and the stream */
export async function networkPicture(
  snapshotId: string,
): Promise<{ length: number; body: ReadableStream<Uint8Array> }> {
  const [row] = await sequelize.query<{ length: number }>(
    'SELECT octet_length(bytes) AS length FROM snapshot_arrays WHERE snapshot_id = $1 AND name = $2',
    { bind: [snapshotId, NAME], type: QueryTypes.SELECT },
  );
  if (!row) throw new Error(`snapshot ${snapshotId} has no picture`);
  let at = 0;
  const body = new ReadableStream<Uint8Array>({
    async pull(controller) {
      const [piece] = await sequelize.query<{ bytes: Buffer }>(
        'SELECT substring(bytes FROM $3 FOR $4) AS bytes FROM snapshot_arrays WHERE snapshot_id = $1 AND name = $2',
        { bind: [snapshotId, NAME, at + 1, PIECE], type: QueryTypes.SELECT },
      );
      if (piece) controller.enqueue(new Uint8Array(piece.bytes));
      at += PIECE;
      if (!piece || at >= row.length) controller.close();
    },
  });
  return { length: row.length, body };
}
