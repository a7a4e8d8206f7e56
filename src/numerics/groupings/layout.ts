import { spectrum } from '../eigen';
import { componentMembers, components, subnetwork } from '../network';
import { laplacianOperator } from '../operators';
import type { Network, Watch } from '../types';

export interface Layout {
  readonly x: Float64Array;
  readonly y: Float64Array;
}

const golden = Math.PI * (3 - Math.sqrt(5));

/**
 * A deterministic first layout: the largest component by the second and third eigenvector of 𝓛_τ mapped back by
 * D_τ^{-1/2} (Koren 2005), the other components as small discs on rings around it, members without ties in an
 * outer band. Coordinates lie within about ±1000.
 */
export function spectralLayout(
  net: Network,
  options: { readonly seed?: number; readonly tolerance?: number } = {},
  watch?: Watch,
): Layout {
  const x = new Float64Array(net.n);
  const y = new Float64Array(net.n);
  if (net.n === 0) return { x, y };
  const parts = components(net);
  const members = componentMembers(parts);
  const main = members[parts.largest]!;
  const alone = [...members.keys()]
    .filter((c) => members[c]!.length === 1 && c !== parts.largest)
    .map((c) => members[c]![0]!);
  const others = [...members.keys()].filter((c) => members[c]!.length > 1 && c !== parts.largest);
  others.sort((a, b) => members[b]!.length - members[a]!.length || a - b);
  // Radii by the share of members, so that dots are about equally dense everywhere.
  const tied = net.n - alone.length;
  const inner =
    (alone.length > 0 ? 850 : 1000) *
    (others.length > 0 ? Math.max(0.55, Math.sqrt(main.length / tied) * 0.95) : 1);
  placeMain(net, main, inner, x, y, options, watch);
  placeOthers(
    others.map((c) => members[c]!),
    inner,
    alone.length > 0 ? 850 : 1000,
    x,
    y,
  );
  alone.forEach((i, at) => {
    const radius = 900 + 100 * Math.sqrt((at + 0.5) / alone.length);
    x[i] = radius * Math.cos(at * golden);
    y[i] = radius * Math.sin(at * golden);
  });
  return { x, y };
}

function placeMain(
  net: Network,
  main: Int32Array,
  radius: number,
  x: Float64Array,
  y: Float64Array,
  options: { readonly seed?: number; readonly tolerance?: number },
  watch?: Watch,
): void {
  if (main.length === 1) return;
  if (main.length === 2) {
    x[main[0]!] = -radius / 2;
    x[main[1]!] = radius / 2;
    return;
  }
  const part = main.length === net.n ? net : subnetwork(net, main);
  const { seed = 1, tolerance = 1e-6 } = options;
  const { vectors } = spectrum(part, { laplacian: 'regularised', count: 3, seed, tolerance }, watch);
  const { scale } = laplacianOperator(part, 'regularised');
  const across = spread(vectors[1]!.map((u, i) => u * scale[i]!));
  const up = spread(vectors[2]!.map((u, i) => u * scale[i]!));
  main.forEach((i, a) => {
    // A disc is filled evenly when the square of ranks is mapped by concentric squares.
    const size = Math.max(Math.abs(across[a]!), Math.abs(up[a]!));
    const length = Math.hypot(across[a]!, up[a]!);
    const shrink = length > 0 ? (radius * size) / length : 0;
    x[i] = across[a]! * shrink;
    y[i] = up[a]! * shrink;
  });
}

/**
 * Half value, half rank: eigenvectors bunch most members near 0, which would put them on one spot.
 * Result within −1…1; equal values stay equal.
 */
function spread(values: Float64Array): Float64Array {
  const n = values.length;
  const order = Int32Array.from({ length: n }, (_, i) => i).sort((a, b) => values[a]! - values[b]! || a - b);
  const low = values[order[0]!]!;
  const range = values[order[n - 1]!]! - low || 1;
  const out = new Float64Array(n);
  for (let from = 0; from < n;) {
    let to = from;
    while (to + 1 < n && values[order[to + 1]!]! - values[order[from]!]! <= 1e-9 * range) to++;
    const rank = (from + to) / 2 / Math.max(1, n - 1);
    for (let r = from; r <= to; r++) {
      const share = (values[order[r]!]! - low) / range;
      out[order[r]!] = share + rank - 1;
    }
    from = to + 1;
  }
  return out;
}

/** Components as sunflower discs, packed one after the other on rings outside the main one. */
function placeOthers(
  groups: Int32Array[],
  inner: number,
  outer: number,
  x: Float64Array,
  y: Float64Array,
): void {
  if (groups.length === 0) return;
  const tied = groups.reduce((sum, group) => sum + group.length, 0);
  const band = Math.max(20, outer - inner);
  const unit = Math.min(
    band / 2.2 / Math.sqrt(groups[0]!.length),
    Math.sqrt((0.6 * (outer * outer - inner * inner)) / tied),
  );
  let ring = inner;
  let depth = 0;
  let angle = 0;
  for (const group of groups) {
    const radius = Math.max(0.5, unit * Math.sqrt(group.length));
    if (depth === 0) depth = 2 * radius;
    const middle = ring + depth / 2;
    const width = 2 * Math.asin(Math.min(1, (1.1 * radius) / middle));
    if (angle + width > 2 * Math.PI + 1e-9 && angle > 0) {
      ring = ring + depth > outer ? inner + (ring - inner) / 2 : ring + depth;
      depth = 2 * radius;
      angle = 0;
    }
    const centre = angle + width / 2;
    angle += width;
    group.forEach((i, at) => {
      const r = 0.9 * radius * Math.sqrt((at + 0.5) / group.length);
      x[i] = (ring + depth / 2) * Math.cos(centre) + r * Math.cos(at * golden);
      y[i] = (ring + depth / 2) * Math.sin(centre) + r * Math.sin(at * golden);
    });
  }
}
