import { UndirectedGraph } from 'graphology';
import louvain from 'graphology-communities-louvain';
import { createRandom } from '@/numerics/random';
import type { Network } from '@/numerics/types';

/**
 * Louvain communities (Blondel, Guillaume, Lambiotte & Lefebvre 2008) at resolution 1, by graphology; seeded.
 * @returns label of each member
 */
export function louvainLabels(net: Network, seed: number): Int32Array {
  const graph = new UndirectedGraph<object, { weight: number }>();
  for (let i = 0; i < net.n; i++) graph.addNode(i);
  for (let i = 0; i < net.n; i++)
    for (let e = net.offsets[i]!; e < net.offsets[i + 1]!; e++) {
      const j = net.targets[e]!;
      if (j > i) graph.addUndirectedEdge(i, j, { weight: net.weights[e]! });
    }
  const { next } = createRandom(seed);
  const found = louvain(graph, { getEdgeWeight: 'weight', rng: next, resolution: 1 });
  return Int32Array.from({ length: net.n }, (_, i) => found[i]!);
}
