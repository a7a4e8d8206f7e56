import type { MemberRow } from '../members';

/** A table on its way out: named, typed columns and rows that come in chunks. */
export interface Table {
  readonly columns: readonly { readonly name: string; readonly type: 'number' | 'text' }[];
  readonly chunks: AsyncIterable<readonly MemberRow[]>;
  /** The cells of one row, in the order of the columns. */
  readonly cells: (row: MemberRow) => (string | number | null)[];
}

/** One way to write a table; yields pieces that are sent as they come. */
export type Encoder = (table: Table) => AsyncGenerator<string | Uint8Array>;

/** Rows of one turn: a web process that writes a long file must answer others in between. */
export const TURN = 250;

/** Lets everything else that waits have its turn. */
export const breathe = (): Promise<void> => new Promise((resolve) => setImmediate(resolve));

/** Names made different where they are not, as readers take the later column for the earlier one. */
export function distinct(names: readonly string[]): string[] {
  const seen = new Map<string, number>();
  return names.map((name) => {
    const before = seen.get(name) ?? 0;
    seen.set(name, before + 1);
    return before === 0 ? name : `${name} (${before + 1})`;
  });
}
