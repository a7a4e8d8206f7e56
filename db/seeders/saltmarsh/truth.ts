import { GROUPS, SEAM } from './plan';
import type { PlantedAll } from './planted';
import type { Member, Ties } from './structure';

/** What was planted in the last snapshot, for checks of what the readings find. */
export interface SaltmarshTruth {
  /** Planted group of each member; null for islets and members without ties. */
  readonly groups: readonly { readonly externalId: string; readonly group: string | null }[];
  readonly departures: readonly {
    readonly externalId: string;
    readonly attribute: string;
    readonly shift: number;
  }[];
  /** Members who look odd for a harmless reason. */
  readonly surprises: readonly {
    readonly externalId: string;
    readonly attribute: string;
    readonly shift: number;
    readonly reason: string;
  }[];
  /** Members of each thin branch. */
  readonly branches: readonly (readonly string[])[];
  /** Members of each part that is tied to nobody else, those without any tie included. */
  readonly islets: readonly (readonly string[])[];
  readonly seam: {
    readonly group: string;
    readonly towards: string;
    /** Ties that leave the group, and how many of them go towards the other. */
    readonly leaving: number;
    readonly across: number;
    /** Leaving ties over the ends of all ties in the group. */
    readonly share: number;
  };
}

export function truthOf(
  members: readonly Member[],
  ties: Ties,
  planted: PlantedAll,
  handles: readonly string[],
): SaltmarshTruth {
  const parts = (role: Member['role']): string[][] => {
    const found: string[][] = [];
    members.forEach((member, i) => {
      if (member.role === role) (found[member.part] ??= []).push(handles[i]!);
    });
    return found;
  };
  const alone = members.flatMap((member, i) => (member.role === 'isolated' ? [[handles[i]!]] : []));
  const { from, to } = SEAM;
  let leaving = 0;
  let across = 0;
  let inside = 0;
  for (const [a, b] of ties.pairs) {
    const ends = [members[a]!.group, members[b]!.group];
    if (ends[0] === from && ends[1] === from) inside++;
    else if (ends.includes(from)) {
      leaving++;
      if (ends.includes(to)) across++;
    }
  }
  return {
    groups: members.map((member, i) => ({
      externalId: handles[i]!,
      group: GROUPS[member.group]?.name ?? null,
    })),
    departures: planted.departures.map(({ member, attribute, shift }) => ({
      externalId: handles[member]!,
      attribute,
      shift,
    })),
    surprises: planted.surprises.map(({ member, attribute, shift, reason }) => ({
      externalId: handles[member]!,
      attribute,
      shift,
      reason,
    })),
    branches: parts('branch'),
    islets: [...parts('islet'), ...alone],
    seam: {
      group: GROUPS[from]!.name,
      towards: GROUPS[to]!.name,
      leaving,
      across,
      share: Math.round((10_000 * leaving) / (2 * inside + leaving)) / 10_000,
    },
  };
}
