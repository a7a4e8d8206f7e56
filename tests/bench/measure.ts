import { median } from '@/numerics';

/** Median seconds of some runs, after one that warms up where runs are short. */
export function seconds(runs: number, work: () => unknown): number {
  if (runs > 1) work();
  return median(
    Float64Array.from({ length: runs }, () => {
      const begin = performance.now();
      work();
      return (performance.now() - begin) / 1000;
    }),
  );
}

export const inSeconds = (value: number): string => (value < 0.1 ? value.toFixed(4) : value.toFixed(2));
export const ratio = (own: number, peer: number): string => (own / peer).toFixed(2);

/** Writes rows as a table that reads as text and as Markdown. */
export function table(head: readonly string[], rows: readonly (readonly string[])[]): void {
  const widths = head.map((title, c) => Math.max(title.length, ...rows.map((row) => row[c]!.length)));
  const line = (row: readonly string[]): string =>
    `| ${row.map((cell, c) => (c === 0 ? cell.padEnd(widths[c]!) : cell.padStart(widths[c]!))).join(' | ')} |`;
  const rule = `| ${widths.map((width, c) => (c === 0 ? '-'.repeat(width) : `${'-'.repeat(width - 1)}:`)).join(' | ')} |`;
  process.stdout.write(`\n${[line(head), rule, ...rows.map(line)].join('\n')}\n`);
}

/** Peak memory of this process so far, in MB. */
export const peakMemory = (): string => `${Math.round(process.resourceUsage().maxRSS / 1024)} MB`;
