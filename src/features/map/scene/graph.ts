import { UndirectedGraph } from 'graphology';
import type { DecodedNetwork } from '@/features/network';
import type { ViewState } from '@/features/views';

/** Ties drawn at most; beyond it the strongest stand for the rest, and the map says so. */
export const TIES_DRAWN = 40_000;

export interface NodeAttributes {
  x: number;
  y: number;
  size: number;
  color: string;
  label: string | null;
}
export interface EdgeAttributes {
  weight: number;
  size: number;
}
export type MapGraph = UndirectedGraph<NodeAttributes, EdgeAttributes>;

/** Places of the strongest ties, at most `most` of them, in the order of the network. */
export function strongestTies(weights: Float32Array, most: number): Int32Array {
  const all = Int32Array.from(weights, (_, index) => index);
  if (weights.length <= most) return all;
  const floor = Float32Array.from(weights).sort()[weights.length - most]!;
  const over = all.filter((index) => weights[index]! > floor);
  const level = all.filter((index) => weights[index] === floor).slice(0, most - over.length);
  const kept = new Int32Array(most);
  kept.set(over);
  kept.set(level, over.length);
  return kept.sort();
}

/** Radii in pixels: the square root keeps a busy member's area, not its width, in proportion. */
export function sizesOf(network: DecodedNetwork, by: ViewState['size']): Float32Array {
  const base = network.n > 20_000 ? 1.4 : network.n > 4_000 ? 2.2 : 3.2;
  if (by === 'same') return new Float32Array(network.n).fill(base);
  const measure: ArrayLike<number> = by === 'degree' ? network.degree : network.strength;
  let most = 1;
  for (let i = 0; i < network.n; i++) most = Math.max(most, measure[i]!);
  return Float32Array.from(
    { length: network.n },
    (_, i) => base * (0.7 + 1.9 * Math.sqrt(measure[i]! / most)),
  );
}

/** The network as sigma draws it: every member, and as many ties as can be drawn. Keys are member places. */
export function buildGraph(network: DecodedNetwork): MapGraph {
  const graph: MapGraph = new UndirectedGraph({ allowSelfLoops: false, multi: false });
  for (let i = 0; i < network.n; i++)
    graph.addNode(String(i), { x: network.x[i]!, y: network.y[i]!, size: 3, color: '#888888', label: null });
  const drawn = strongestTies(network.weights, TIES_DRAWN);
  for (const tie of drawn)
    graph.addUndirectedEdgeWithKey(tie, String(network.sources[tie]), String(network.targets[tie]), {
      weight: network.weights[tie]!,
      size: 0.5,
    });
  return graph;
}

/** Neighbours of every member as packed rows, over all ties, drawn or not: for walking and for the side panel. */
export function adjacencyOf(network: DecodedNetwork): { offsets: Int32Array; neighbours: Int32Array } {
  const offsets = new Int32Array(network.n + 1);
  for (let i = 0; i < network.ties; i++) {
    offsets[network.sources[i]! + 1]!++;
    offsets[network.targets[i]! + 1]!++;
  }
  for (let i = 0; i < network.n; i++) offsets[i + 1]! += offsets[i]!;
  const next = offsets.slice(0, network.n);
  const neighbours = new Int32Array(2 * network.ties);
  for (let i = 0; i < network.ties; i++) {
    const a = network.sources[i]!;
    const b = network.targets[i]!;
    neighbours[next[a]!++] = b;
    neighbours[next[b]!++] = a;
  }
  return { offsets, neighbours };
}
