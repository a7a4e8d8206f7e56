/** Rows that go to the database in one statement. */
const CHUNK = 10_000;

/** Slices of at most CHUNK places. */
export function* chunks(length: number): Generator<{ from: number; count: number }> {
  for (let from = 0; from < length; from += CHUNK) yield { from, count: Math.min(CHUNK, length - from) };
}

export const slice = <T>(from: number, count: number, value: (index: number) => T): T[] =>
  Array.from({ length: count }, (_, i) => value(from + i));
