/** Level (0 = lowest) of each dot so that dots of one level do not overlap; `places` in pixels, any order. */
export function stackLevels(places: readonly number[], size: number): number[] {
  const order = places.map((_, i) => i).sort((a, b) => (places[a] ?? 0) - (places[b] ?? 0));
  const ends: number[] = [];
  const levels = new Array<number>(places.length).fill(0);
  for (const i of order) {
    const place = places[i] ?? 0;
    let level = ends.findIndex((end) => place - end >= size);
    if (level < 0) level = ends.length;
    ends[level] = place;
    levels[i] = level;
  }
  return levels;
}
