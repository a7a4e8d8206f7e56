import { UndirectedGraph } from 'graphology';
import forceAtlas2 from 'graphology-layout-forceatlas2';
import {
  buildNetwork,
  CancelledError,
  componentMembers,
  components,
  spectralLayout,
  spectrum,
  type LaplacianKind,
  type Network,
  type Watch,
} from '@/numerics';
import { spreadApart } from './spread';

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

const SPREAD_UP_TO = 20_000;
/** Share of its disc that the largest component is fitted into, so that it stays clear of the small ones around. */
const FITTED = 0.7;
const FORCES = {
  barnesHutOptimize: true,
  gravity: 1,
  scalingRatio: 40,
  edgeWeightInfluence: 0,
  outboundAttractionDistribution: true,
  slowDown: 2,
};

/**
 * Unfolds the spectral start of the largest component by forces, then fits it back into the disc that it had:
 * the other components stand around that disc and would only be blown away.
 */
function settle(network: Network, main: Int32Array, x: Float64Array, y: Float64Array, watch: Watch): void {
  const iterations = iterationsFor(network.n, network.targets.length / 2);
  if (iterations === 0 || main.length < 5) return;
  const radius = discOf(main, x, y, 1).radius;
  const graph = new UndirectedGraph();
  for (const i of main) graph.addNode(i, { x: x[i]!, y: y[i]! });
  for (const i of main)
    for (let k = network.offsets[i]!; k < network.offsets[i + 1]!; k++)
      if (network.targets[k]! > i) graph.addEdge(i, network.targets[k]!);
  const ROUND = 8;
  for (let done = 0; done < iterations; done += ROUND) {
    if (watch.cancelled?.()) throw new CancelledError();
    watch.progress?.(0.4 + (0.6 * done) / iterations, 'Placing members');
    forceAtlas2.assign(graph, { iterations: Math.min(ROUND, iterations - done), settings: FORCES });
  }
  graph.forEachNode((key, place) => {
    x[Number(key)] = place.x as number;
    y[Number(key)] = place.y as number;
  });
  fitDisc(main, x, y, radius);
  if (main.length <= SPREAD_UP_TO) spreadApart(main, x, y, radius * FITTED);
}

/** Centre of some members, and the radius within which a share of them lies. */
function discOf(
  members: Int32Array,
  x: Float64Array,
  y: Float64Array,
  share: number,
): { cx: number; cy: number; radius: number } {
  let cx = 0;
  let cy = 0;
  for (const i of members) {
    cx += x[i]! / members.length;
    cy += y[i]! / members.length;
  }
  const far = Float64Array.from(members, (i) => Math.hypot(x[i]! - cx, y[i]! - cy)).sort();
  return { cx, cy, radius: far[Math.round(share * (far.length - 1))]! || 1 };
}

/** Scales members into a disc; the thin branches that reach far out are drawn in, so that they do not set the scale. */
function fitDisc(members: Int32Array, x: Float64Array, y: Float64Array, radius: number): void {
  const { cx, cy, radius: most } = discOf(members, x, y, 0.96);
  for (const i of members) {
    const dx = (x[i]! - cx) / most;
    const dy = (y[i]! - cy) / most;
    const far = Math.hypot(dx, dy);
    const drawn = far > 1 ? (1 + 0.25 * Math.log(far)) / far : 1;
    x[i] = dx * drawn * radius * FITTED;
    y[i] = dy * drawn * radius * FITTED;
  }
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
  const layout = spectralLayout(
    network,
    { seed: 1 },
    { ...watch, progress: (done, step) => watch.progress?.(0.1 + 0.3 * done, step) },
  );
  const x = Float64Array.from(layout.x);
  const y = Float64Array.from(layout.y);
  if (parts.largest >= 0) settle(network, componentMembers(parts)[parts.largest]!, x, y, watch);
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
