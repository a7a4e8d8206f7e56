/** Direction of each arrow key on the screen, y downwards. */
const ARROWS: Readonly<Record<string, readonly [number, number]>> = {
  ArrowLeft: [-1, 0],
  ArrowRight: [1, 0],
  ArrowUp: [0, -1],
  ArrowDown: [0, 1],
};

/**
 * The tied member that an arrow key walks to: the one whose direction fits the key best, nearer ones first.
 * Null when no tie leads that way.
 */
export function walkTo(
  key: string,
  from: { x: number; y: number },
  neighbours: readonly { ordinal: number; x: number; y: number }[],
): number | null {
  const arrow = ARROWS[key];
  if (!arrow) return null;
  let best: number | null = null;
  let lowest = Infinity;
  for (const one of neighbours) {
    const dx = one.x - from.x;
    const dy = one.y - from.y;
    const distance = Math.hypot(dx, dy) || 1;
    const along = (dx * arrow[0] + dy * arrow[1]) / distance;
    if (along < 0.35) continue;
    const cost = distance * (2 - along);
    if (cost < lowest) {
      lowest = cost;
      best = one.ordinal;
    }
  }
  return best;
}
