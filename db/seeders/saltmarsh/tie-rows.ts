import type { Random } from '../../../src/numerics/random';
import { chance } from './draws';
import type { LivedTie } from './evolution';
import { LAST, SNAPSHOTS } from './plan';

/** One row of the tie file through time: a kind of contact in one direction. */
export interface ContactRow {
  readonly tie: LivedTie;
  readonly source: number;
  readonly target: number;
  readonly kind: string;
  /** Contacts by the last snapshot of the tie. */
  readonly contacts: number;
  /** Last snapshot that saw a contact. */
  readonly active: number;
  /** Days before a snapshot on which the last contact was. */
  readonly days: number;
}

const DAY = 86_400_000;

const kindOf = (random: Random): string => {
  const draw = random.next();
  return draw < 0.6 ? 'reply' : draw < 0.87 ? 'trade' : 'endorse';
};

/**
 * Rows of each tie: one, and sometimes another kind or the way back.
 * @param close whether a member has few but close contacts, as those in thin branches have
 */
export function contactRows(
  random: Random,
  ties: readonly LivedTie[],
  close: (member: number) => boolean,
): ContactRow[] {
  const rows: ContactRow[] = [];
  for (const tie of ties) {
    const row = (source: number, target: number, kind: string): void => {
      const usual = Math.min(9, Math.floor(1 / Math.sqrt(1 - random.next())));
      const contacts = close(source) || close(target) ? 3 + random.int(2) : usual;
      const until = Math.min(LAST, tie.ended - 1);
      const active = chance(random, 0.8) ? until : tie.formed + random.int(until - tie.formed + 1);
      rows.push({ tie, source, target, kind, contacts, active, days: 1 + random.int(88) });
    };
    const [source, target] = chance(random, 0.5) ? [tie.a, tie.b] : [tie.b, tie.a];
    const kind = kindOf(random);
    row(source, target, kind);
    if (chance(random, 0.1)) row(target, source, kind);
    if (chance(random, 0.12)) {
      const other = kindOf(random);
      if (other !== kind) row(source, target, other);
    }
  }
  return rows;
}

/** What a row says in one snapshot. */
export function rowAt(row: ContactRow, snapshot: number): { count: number; lastDate: string } {
  const seen = Math.min(snapshot, row.active);
  const share = (seen - row.tie.formed + 1) / (row.active - row.tie.formed + 1);
  const time = Date.parse(`${SNAPSHOTS[seen]!.takenOn}T00:00:00Z`) - row.days * DAY;
  return {
    count: Math.max(1, Math.ceil(row.contacts * share)),
    lastDate: new Date(time).toISOString().slice(0, 10),
  };
}
