import { contours } from 'd3-contour';

/** The ground that one group covers, in graph coordinates: rings of points, outer and holes alike. */
export interface Region {
  readonly group: number;
  readonly rings: readonly (readonly (readonly [number, number])[])[];
  /** Where the group's name stands: its densest spot. */
  readonly label: readonly [number, number];
}

const CELLS = 110;
const MARGIN = 0.06;
const BLUR = 3;

/** Box blur along rows and columns, three times: close to a Gaussian. */
function blur(grid: Float64Array, width: number, height: number): void {
  const line = new Float64Array(Math.max(width, height));
  const pass = (start: number, stride: number, length: number): void => {
    for (let i = 0; i < length; i++) line[i] = grid[start + i * stride]!;
    let sum = 0;
    for (let i = -BLUR; i < length; i++) {
      if (i + BLUR < length) sum += line[i + BLUR]!;
      if (i - BLUR - 1 >= 0) sum -= line[i - BLUR - 1]!;
      if (i >= 0) grid[start + i * stride] = sum / (2 * BLUR + 1);
    }
  };
  for (let times = 0; times < 3; times++) {
    for (let y = 0; y < height; y++) pass(y * width, 1, width);
    for (let x = 0; x < width; x++) pass(x, width, height);
  }
}

/**
 * Density outlines of groups on a coarse grid. Every cell belongs to the group that is densest there, so that
 * neighbouring regions share their border instead of overlapping.
 * @param smallest groups with fewer members get no region
 */
export function regionsOf(
  x: ArrayLike<number>,
  y: ArrayLike<number>,
  groups: Float64Array,
  smallest = 5,
): Region[] {
  const n = groups.length;
  const members = new Map<number, number[]>();
  let [left, right, top, bottom] = [Infinity, -Infinity, Infinity, -Infinity];
  for (let i = 0; i < n; i++) {
    const group = groups[i]!;
    if (!Number.isFinite(group)) continue;
    const list = members.get(group);
    if (list) list.push(i);
    else members.set(group, [i]);
    left = Math.min(left, x[i]!);
    right = Math.max(right, x[i]!);
    top = Math.min(top, y[i]!);
    bottom = Math.max(bottom, y[i]!);
  }
  const padX = (right - left) * MARGIN || 1;
  const padY = (bottom - top) * MARGIN || 1;
  const stepX = (right - left + 2 * padX) / CELLS;
  const stepY = (bottom - top + 2 * padY) / CELLS;
  const place = (i: number): number =>
    Math.min(CELLS - 1, Math.floor((y[i]! - top + padY) / stepY)) * CELLS +
    Math.min(CELLS - 1, Math.floor((x[i]! - left + padX) / stepX));
  const drawn = [...members.entries()].filter(([, list]) => list.length >= smallest);
  const densities = drawn.map(([, list]) => {
    const grid = new Float64Array(CELLS * CELLS);
    for (const i of list) grid[place(i)]!++;
    blur(grid, CELLS, CELLS);
    return grid;
  });
  const best = new Float64Array(CELLS * CELLS);
  for (const grid of densities) for (let i = 0; i < best.length; i++) best[i] = Math.max(best[i]!, grid[i]!);
  return drawn.map(([group], index) => {
    const grid = densities[index]!;
    const peak = grid.reduce((most, value) => Math.max(most, value), 0);
    const floor = Math.max(peak * 0.045, 0.012);
    const own = Array.from(grid, (value, i) =>
      value >= floor && value >= best[i]! ? 1 : value >= floor ? value / best[i]! / 2 : 0,
    );
    const [shape] = contours().size([CELLS, CELLS]).smooth(true).thresholds([0.55])(own);
    const point = ([px, py]: number[]): [number, number] => [
      left - padX + px! * stepX,
      top - padY + py! * stepY,
    ];
    const rings = (shape?.coordinates ?? []).flatMap((polygon) => polygon).filter((ring) => ring.length > 8);
    const densest = grid.indexOf(peak);
    return {
      group,
      rings: rings.map((ring) => ring.map(point)),
      label: point([(densest % CELLS) + 0.5, Math.floor(densest / CELLS) + 0.5]),
    };
  });
}
