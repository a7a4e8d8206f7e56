import { UndirectedGraph } from 'graphology';
import forceAtlas2 from 'graphology-layout-forceatlas2';
import {
  buildNetwork,
  components,
  spectralLayout,
  spectrum,
  type LaplacianKind,
  type Network,
  type Watch,
} from '@/numerics';

export interface ShapeInput {
  readonly n: number;
  readonly sources: Int32Array;
  readonly targets: Int32Array;
  readonly weights: Float64Array;
}

export interface Shape {
  readonly network: Network;
  readonly component: Int32Array;
  readonly components: number;
  readonly largestComponent: number;
  readonly isolated: number;
  readonly x: Float32Array;
  readonly y: Float32Array;
}

/** Fixed by size alone, so that the same network always gets the same picture. */
function iterationsFor(n: number, ties: number): number {
  if (n > 300_000 || ties > 3_000_000) return 0;
  if (n > 20_000) return 8;
  return n > 2_000 ? 60 : 240;
}

/** Unfolds the spectral start by forces: members of one group part, groups stay where they are. */
function settle(network: Network, x: Float64Array, y: Float64Array, watch: Watch): void {
  const iterations = iterationsFor(network.n, network.targets.length / 2);
  if (iterations === 0) return;
  const graph = new UndirectedGraph();
  for (let i = 0; i < network.n; i++) graph.addNode(i, { x: x[i]!, y: y[i]! });
  for (let i = 0; i < network.n; i++)
    for (let k = network.offsets[i]!; k < network.offsets[i + 1]!; k++)
      if (network.targets[k]! > i) graph.addEdge(i, network.targets[k]!, { weight: network.weights[k]! });
  const settings = {
    barnesHutOptimize: network.n > 500,
    gravity: 0.6,
    scalingRatio: 24,
    strongGravityMode: false,
    slowDown: 3,
    edgeWeightInfluence: 0.5,
    linLogMode: false,
  };
  const ROUND = 8;
  for (let done = 0; done < iterations; done += ROUND) {
    if (watch.cancelled?.()) break;
    watch.progress?.(0.4 + (0.6 * done) / iterations, 'Placing members');
    forceAtlas2.assign(graph, { iterations: Math.min(ROUND, iterations - done), settings });
  }
  graph.forEachNode((key, place) => {
    x[Number(key)] = place.x as number;
    y[Number(key)] = place.y as number;
  });
}

/** Scales places to about ±1000 and to 32 bits; something not finite becomes the middle. */
function fitted(values: Float64Array): Float32Array {
  let most = 0;
  for (const value of values) if (Number.isFinite(value)) most = Math.max(most, Math.abs(value));
  return Float32Array.from(values, (value) =>
    Number.isFinite(value) && most > 0 ? (1000 * value) / most : 0,
  );
}

/** The thread task of an import: network, components and places of members. */
export function computeShape(input: ShapeInput, watch: Watch): Shape {
  watch.progress?.(0, 'Tying members together');
  const network = buildNetwork(input.n, input.sources, input.targets, input.weights);
  const parts = components(network);
  watch.progress?.(0.1, 'Finding the shape');
  const layout = spectralLayout(network, { seed: 1 }, watch);
  const x = Float64Array.from(layout.x);
  const y = Float64Array.from(layout.y);
  settle(network, x, y, watch);
  return {
    network,
    component: parts.labels,
    components: parts.count,
    largestComponent: parts.largest < 0 ? 0 : parts.sizes[parts.largest]!,
    isolated: parts.isolated,
    x: fitted(x),
    y: fitted(y),
  };
}

export interface SpectrumResult {
  readonly values: Float64Array;
  readonly residuals: Float64Array;
  readonly complete: boolean;
}

/** The thread task behind a spectrum: values and residuals, without the vectors. */
export function computeSpectrum(
  input: { network: Network; laplacian: LaplacianKind; count: number },
  watch: Watch,
): SpectrumResult {
  const { values, residuals, complete } = spectrum(
    input.network,
    { laplacian: input.laplacian, count: input.count, seed: 1 },
    watch,
  );
  return { values, residuals, complete };
}
