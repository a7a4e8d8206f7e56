const ROUNDS = 80;
/** Share of the disc that members fill once they stand apart. */
const FILL = 0.4;

/**
 * Pushes members apart until most stand at a least distance of each other, so that a dense group becomes a patch
 * of cloth instead of a knot. Deterministic; neighbours are found on a grid.
 * @param members places in `x` and `y` to be moved
 * @param radius radius of the disc they live in
 */
export function spreadApart(members: Int32Array, x: Float64Array, y: Float64Array, radius: number): void {
  const least = 2 * radius * Math.sqrt(FILL / members.length);
  for (let round = 0; round < ROUNDS; round++) {
    const cells = new Map<number, number[]>();
    const cellOf = (i: number): number =>
      Math.floor((x[i]! + 4 * radius) / least) * 65_536 + Math.floor((y[i]! + 4 * radius) / least);
    for (const i of members) {
      const cell = cellOf(i);
      const list = cells.get(cell);
      if (list) list.push(i);
      else cells.set(cell, [i]);
    }
    let moved = 0;
    for (const i of members) {
      const cell = cellOf(i);
      for (const step of [0, 1, 65_535, 65_536, 65_537])
        for (const j of cells.get(cell + step) ?? []) {
          if (step === 0 && j <= i) continue;
          moved += push(i, j, x, y, least) ? 1 : 0;
        }
    }
    if (moved === 0) return;
  }
}

/** Moves two members half of what they lack, away from each other. */
function push(i: number, j: number, x: Float64Array, y: Float64Array, least: number): boolean {
  let dx = x[j]! - x[i]!;
  let dy = y[j]! - y[i]!;
  let distance = Math.hypot(dx, dy);
  if (distance >= least) return false;
  if (distance < 1e-9) {
    // Members at one spot part in a direction of their own, the same every time.
    dx = Math.cos(i * 2.399963);
    dy = Math.sin(i * 2.399963);
    distance = 1;
  }
  const by = (0.5 * (least - Math.min(distance, least)) * 0.5) / distance;
  x[i]! -= dx * by;
  y[i]! -= dy * by;
  x[j]! += dx * by;
  y[j]! += dy * by;
  return true;
}
