import { encodeNetwork } from './binary';
import { loadArray, loadNetwork } from './arrays.server';

/** The network of a snapshot in the Map's binary form. Holds both directions only while it is made. */
export async function networkPicture(snapshotId: string): Promise<ArrayBuffer> {
  const [network, x, y, component] = await Promise.all([
    loadNetwork(snapshotId),
    loadArray(snapshotId, 'x'),
    loadArray(snapshotId, 'y'),
    loadArray(snapshotId, 'component'),
  ]);
  const { n, offsets } = network;
  const ties = network.targets.length / 2;
  const sources = new Int32Array(ties);
  const targets = new Int32Array(ties);
  const weights = new Float32Array(ties);
  let at = 0;
  for (let i = 0; i < n; i++) {
    for (let k = offsets[i]!; k < offsets[i + 1]!; k++) {
      const j = network.targets[k]!;
      if (j <= i) continue;
      sources[at] = i;
      targets[at] = j;
      weights[at++] = network.weights[k]!;
    }
  }
  return encodeNetwork({
    n,
    ties,
    x: Float32Array.from(x),
    y: Float32Array.from(y),
    degree: Int32Array.from({ length: n }, (_, i) => offsets[i + 1]! - offsets[i]!),
    strength: Float32Array.from(network.strength),
    component: component as Int32Array,
    sources,
    targets,
    weights,
  });
}
