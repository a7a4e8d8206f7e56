import type { Random } from '../../../src/numerics/random';
import { between, chance, pick, skewed } from './draws';
import { GROUPS, JOINS, LAST, LEAVES, NEW_ARRIVALS, NEWCOMERS, SEAM } from './plan';
import { type Member, Ties, tieMaker } from './structure';

/** A tie and the snapshots that have it: formed ≤ snapshot < ended. */
export interface LivedTie {
  readonly a: number;
  readonly b: number;
  readonly formed: number;
  readonly ended: number;
}

/** A member and the snapshots that have it: joined ≤ snapshot < left. */
export interface LivedMember extends Member {
  readonly joined: number;
  readonly left: number;
  /** Months since joining at the last snapshot. */
  readonly months: number;
}

const STAYS = LAST + 1;

/** First snapshot of a member who joined so many whole months before the last one. */
const firstSnapshot = (months: number): number => Math.max(0, LAST - Math.floor(months / 3));

/** Months since joining: exactly as many joined in each quarter as planned, half of them New Arrivals. */
export function growMembers(random: Random, members: readonly Member[], ties: Ties): LivedMember[] {
  const months = new Int32Array(members.length).fill(-1);
  // Those with few ties joined late; a well-tied member has been there from the first snapshot.
  const late = (newcomers: boolean): number[] => {
    const some = [...members.keys()].filter(
      (i) =>
        (members[i]!.group === NEW_ARRIVALS) === newcomers &&
        members[i]!.role !== 'islet' &&
        (newcomers || ties.degree(i) <= 8),
    );
    return random.shuffle(some);
  };
  const pools = [late(true), late(false)] as const;
  for (let quarter = LAST; quarter > 0; quarter--) {
    const joins = JOINS[quarter]!;
    const newcomers = Math.round(joins * NEWCOMERS);
    for (let i = 0; i < joins; i++) {
      const member = pools[i < newcomers ? 0 : 1].pop()!;
      months[member] = 3 * (LAST - quarter) + random.int(3);
    }
  }
  return members.map((member, i) => {
    if (months[i]! < 0)
      months[i] =
        15 +
        (member.group === NEW_ARRIVALS
          ? random.int(6)
          : Math.floor(between(random, 0, 30) + 5 * skewed(random)));
    return { ...member, joined: firstSnapshot(months[i]!), left: STAYS, months: months[i]! };
  });
}

/** Members who are gone by the last snapshot, appended to those who are there. */
export function addLeavers(random: Random, members: LivedMember[]): void {
  LEAVES.forEach((count, left) => {
    for (let i = 0; i < count; i++) {
      const like = members[random.int(members.length)]!;
      const joined = left > 1 && chance(random, 0.2) ? random.int(left) : 0;
      const group = like.group < 0 ? 0 : like.group;
      const months = 3 * (LAST - joined) + (joined > 0 ? random.int(3) : random.int(40));
      const place = random.next();
      members.push({ group, role: 'core', part: -1, pull: 1, place, joined, left, months });
    }
  });
}

/** When each tie of the last snapshot formed; every member has a tie from the first moment that allows one. */
export function growTies(random: Random, members: readonly LivedMember[], last: Ties): LivedTie[] {
  const earliest = last.pairs.map(([a, b]) => Math.max(members[a]!.joined, members[b]!.joined));
  const first = new Map<number, number>();
  last.pairs.forEach((pair, tie) => {
    for (const end of pair) {
      const known = first.get(end);
      if (known === undefined || earliest[tie]! < earliest[known]!) first.set(end, tie);
    }
  });
  const kept = new Set(first.values());
  return last.pairs.map(([a, b], tie) => {
    const from = earliest[tie]!;
    const atOnce = kept.has(tie) || chance(random, from === 0 ? 0.82 : 0.66);
    const formed = atOnce || from === LAST ? from : from + 1 + random.int(LAST - from);
    return { a, b, formed, ended: STAYS };
  });
}

/** Ties that ended before the last snapshot: those of members who left, those that faded, and those of the seam. */
export function endedTies(random: Random, members: readonly LivedMember[], last: Ties): LivedTie[] {
  const gone: LivedTie[] = [];
  const ties = new Ties();
  for (const [a, b] of last.pairs) ties.add(a, b);
  const note = (end: number): void => {
    const [a, b] = ties.pairs.at(-1)!;
    const formed = Math.max(members[a]!.joined, members[b]!.joined);
    const ended = Math.min(end, members[a]!.left, members[b]!.left);
    if (formed < ended) gone.push({ a, b, formed, ended });
  };
  const tie = tieMaker(random, members, ties);
  members.forEach((member, i) => {
    if (member.left === STAYS) return;
    const there = 3 + random.int(6);
    for (let t = 0; t < there; t++) {
      tie(member.group, member.group, i);
      note(STAYS);
    }
  });
  for (let quarter = 1; quarter <= LAST; quarter++)
    for (let faded = 75 + random.int(20); faded > 0; faded--) {
      const group = pick(random, [...GROUPS.keys()]);
      tie(group, group);
      note(quarter);
    }
  for (let lost = 0; lost < SEAM.lostTies; lost++) {
    tie(SEAM.from, SEAM.to);
    note(1 + (lost % LAST));
  }
  return gone;
}
