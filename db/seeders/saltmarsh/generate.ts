import { createRandom } from '../../../src/numerics/random';
import { attributeCells } from './attributes';
import { membersCsv, tiesCsv } from './csv';
import { addLeavers, endedTies, growMembers, growTies } from './evolution';
import { makeHandles } from './handles';
import { GROUPS, SNAPSHOTS } from './plan';
import { plantDepartures } from './planted';
import { plantMembers, plantTies } from './structure';
import { contactRows } from './tie-rows';
import { type SaltmarshTruth, truthOf } from './truth';

export interface SaltmarshSnapshot {
  /** Date of the form 2026-11-28. */
  readonly takenOn: string;
  readonly label: string;
  readonly tiesCsv: string;
  readonly membersCsv: string;
}

export interface Saltmarsh {
  /** Six, a quarter apart, the newest last. */
  readonly snapshots: readonly SaltmarshSnapshot[];
  readonly truth: SaltmarshTruth;
}

export const SALTMARSH_GROUPS: readonly string[] = GROUPS.map((group) => group.name);

/**
 * The Saltmarsh scenario: an invented community of 1,264 members and 6,978 ties, with all that is planted in it.
 * The same seed gives the same bytes on any machine.
 */
export function generateSaltmarsh(seed = 1264): Saltmarsh {
  const random = createRandom(seed);
  const planted = plantMembers(random);
  const ties = plantTies(random, planted);
  const members = growMembers(random, planted, ties);
  const odd = plantDepartures(random, members, ties);
  const now = members.length;
  addLeavers(random, members);
  const lived = [...growTies(random, members, ties), ...endedTies(random, members, ties)];
  const rows = contactRows(random, lived, (i) => members[i]!.role === 'branch');
  const handles = makeHandles(random, members.length, odd.handles);
  const cellsAt = attributeCells(seed + 1, members, odd);
  return {
    snapshots: SNAPSHOTS.map(({ takenOn, label }, snapshot) => ({
      takenOn,
      label,
      tiesCsv: tiesCsv(rows, snapshot, handles),
      membersCsv: membersCsv(cellsAt(snapshot), handles),
    })),
    truth: truthOf(members.slice(0, now), ties, odd, handles),
  };
}
