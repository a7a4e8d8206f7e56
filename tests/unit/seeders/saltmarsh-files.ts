/** Reads the plain files of the scenario (no quotation marks in them) without the product's own reader. */
const table = (csv: string): { header: string[]; rows: Record<string, string>[] } => {
  const [first, ...lines] = csv.trimEnd().split('\n');
  const header = first!.split(',');
  const rows = lines.map((line) => {
    const cells = line.split(',');
    if (cells.length !== header.length) throw new Error(`ragged row: ${line}`);
    return Object.fromEntries(header.map((name, i) => [name, cells[i]!]));
  });
  return { header, rows };
};

export const membersIn = table;

export function tiesIn(csv: string) {
  const { header, rows } = table(csv);
  const pairs = new Set<string>();
  const neighbours = new Map<string, Set<string>>();
  for (const row of rows) {
    const [a, b] = [row['source']!, row['target']!].sort() as [string, string];
    pairs.add(`${a} ${b}`);
    neighbours.set(a, (neighbours.get(a) ?? new Set()).add(b));
    neighbours.set(b, (neighbours.get(b) ?? new Set()).add(a));
  }
  const components = (members: readonly string[]): string[][] => {
    const seen = new Set<string>();
    return members.flatMap((start) => {
      if (seen.has(start)) return [];
      seen.add(start);
      const part = [start];
      for (const id of part)
        for (const next of neighbours.get(id) ?? [])
          if (!seen.has(next)) {
            seen.add(next);
            part.push(next);
          }
      return [part];
    });
  };
  return { header, rows, pairs, neighbours, components };
}
