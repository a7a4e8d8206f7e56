import { UnanswerableError, type Network } from '../types';
import { strengths } from './build';

/**
 * The network of the given members and the ties among them; member `nodes[a]` becomes a.
 * With a permutation of all members it relabels the network.
 *
 * @param nodes distinct member indexes, in the wanted order
 */
export function subnetwork(net: Network, nodes: Int32Array): Network {
  const place = new Int32Array(net.n).fill(-1);
  const n = nodes.length;
  let ascending = true;
  for (let a = 0; a < n; a++) {
    const i = nodes[a]!;
    if (!(i >= 0 && i < net.n) || place[i] !== -1) {
      throw new UnanswerableError('bad-members', 'The chosen members must exist and be named once each.');
    }
    place[i] = a;
    if (a > 0 && i < nodes[a - 1]!) ascending = false;
  }
  const offsets = new Int32Array(n + 1);
  for (let a = 0; a < n; a++) {
    const i = nodes[a]!;
    let kept = 0;
    for (let p = net.offsets[i]!; p < net.offsets[i + 1]!; p++) if (place[net.targets[p]!]! >= 0) kept++;
    offsets[a + 1] = offsets[a]! + kept;
  }
  const targets = new Int32Array(offsets[n]!);
  const weights = new Float64Array(offsets[n]!);
  if (ascending) {
    let at = 0;
    for (let a = 0; a < n; a++) {
      const i = nodes[a]!;
      for (let p = net.offsets[i]!; p < net.offsets[i + 1]!; p++) {
        const b = place[net.targets[p]!]!;
        if (b < 0) continue;
        targets[at] = b;
        weights[at++] = net.weights[p]!;
      }
    }
  } else {
    // Walking columns in their new order fills every row in ascending order (W is symmetric).
    const cursor = offsets.slice();
    for (let b = 0; b < n; b++) {
      const j = nodes[b]!;
      for (let p = net.offsets[j]!; p < net.offsets[j + 1]!; p++) {
        const a = place[net.targets[p]!]!;
        if (a < 0) continue;
        const at = cursor[a]!++;
        targets[at] = b;
        weights[at] = net.weights[p]!;
      }
    }
  }
  return { n, offsets, targets, weights, strength: strengths(n, offsets, weights) };
}
