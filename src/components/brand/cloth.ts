/**
 * The cloth on the sign-in page, drawn from a formula: threads whose lengths follow a slow wave,
 * a plain weave over the longer ones, and one thread that is cut where its neighbours are not.
 */

export const CLOTH = { width: 960, height: 900, gap: 12.02, threads: 80, apart: 53 } as const;

const thread = (i: number) => 6 + i * CLOTH.gap;
/** Length of thread i: a slow wave on a slope, and a small fixed irregularity. */
const length = (i: number) => {
  const x = thread(i);
  const wave = 145 * Math.cos((2 * Math.PI * (x - 285)) / 976);
  const tilt = 68 * ((480 - x) / 474);
  return 501 - wave + tilt + 7 * Math.sin(i * 2.7);
};

/** The thread's path: straight from the beam, then leaning a little where it hangs free. */
function hang(x: number, end: number, lean: number): string {
  const f = (n: number) => n.toFixed(1);
  return `M${f(x)} -4V${f(end - 130)}C${f(x)} ${f(end - 70)} ${f(x + lean * 0.6)} ${f(end - 40)} ${f(x + lean)} ${f(end)}`;
}

/** Paths of all threads that hang with the wave, as one path each way, and of the one that departs. */
export function warpPaths(): { shared: string[]; apart: string } {
  const shared: string[] = [];
  for (let i = 0; i < CLOTH.threads; i++) {
    if (i !== CLOTH.apart) shared.push(hang(thread(i), length(i), 2.3 * Math.sin(i * 1.9)));
  }
  return { shared, apart: hang(thread(CLOTH.apart), 388, 1) };
}

export interface Weft {
  d: string;
  dye: 'sheet' | 'madder' | 'gold';
}

/** Rows of a plain weave: each passes over every other thread, as far as the cloth reaches at that row. */
export function weftRows(): Weft[] {
  const rows: Weft[] = [];
  for (let row = 0; row < 22; row++) {
    const y = 18 + row * 9.4;
    const dye = row % 7 === 3 ? 'madder' : row % 7 === 5 ? 'gold' : 'sheet';
    let d = '';
    for (let i = row % 2; i < CLOTH.threads; i += 2) {
      if (length(i) > 393 + row * 7.5) d += `M${(thread(i) - 6).toFixed(1)} ${y.toFixed(1)}h12`;
    }
    if (d) rows.push({ d, dye });
  }
  return rows;
}
