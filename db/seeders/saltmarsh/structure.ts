import type { Random } from '../../../src/numerics/random';
import { heavy, picker } from './draws';
import { DENSITY, GROUPS, ISLETS, ISOLATED, TIES } from './plan';

export interface Member {
  /** Place in GROUPS; −1 for islets and members without ties. */
  readonly group: number;
  readonly role: 'core' | 'branch' | 'islet' | 'isolated';
  /** Number of its branch or islet; −1 for none. */
  readonly part: number;
  /** How many ties a member attracts, in proportion. */
  readonly pull: number;
  /** Where a member stands in its group, on a circle of length 1: ties prefer those who stand near. */
  readonly place: number;
}

/** Distinct ties between members. */
export class Ties {
  readonly pairs: [number, number][] = [];
  readonly neighbours: number[][] = [];
  private readonly known = new Set<number>();

  add(a: number, b: number): boolean {
    const key = Math.min(a, b) * 100_000 + Math.max(a, b);
    if (a === b || this.known.has(key)) return false;
    this.known.add(key);
    this.pairs.push([a, b]);
    (this.neighbours[a] ??= []).push(b);
    (this.neighbours[b] ??= []).push(a);
    return true;
  }
  degree(member: number): number {
    return this.neighbours[member]?.length ?? 0;
  }
}

/** Members of the last snapshot: groups in order, each with its core and then its branches; then islets. */
export function plantMembers(random: Random): Member[] {
  const members: Member[] = [];
  let branch = 0;
  GROUPS.forEach(({ size, branches }, group) => {
    const thin = branches.reduce((sum, one) => sum + one, 0);
    for (let i = 0; i < size - thin; i++)
      members.push({ group, role: 'core', part: -1, pull: heavy(random, 8), place: random.next() });
    for (const length of branches) {
      const place = random.next();
      for (let i = 0; i < length; i++) members.push({ group, role: 'branch', part: branch, pull: 0, place });
      branch++;
    }
  });
  ISLETS.forEach((size, part) => {
    for (let i = 0; i < size; i++)
      members.push({ group: -1, role: 'islet', part, pull: 0, place: random.next() });
  });
  for (let i = 0; i < ISOLATED; i++)
    members.push({ group: -1, role: 'isolated', part: -1, pull: 0, place: random.next() });
  return members;
}

/** Whether two members of one group tie, given that they met: always when they stand near, seldom otherwise. */
const FAR = 0.25;
function near(a: Member, b: Member, random: Random): boolean {
  const apart = Math.abs(a.place - b.place);
  return Math.min(apart, 1 - apart) < 0.2 || random.next() < FAR;
}

/** Grows a tie between two groups, as the planted densities and pulls have it. */
export function tieMaker(random: Random, members: readonly Member[], ties: Ties) {
  const draw = GROUPS.map((_, group) =>
    picker(
      random,
      [...members.keys()].filter((i) => members[i]!.group === group && members[i]!.role === 'core'),
      (i) => members[i]!.pull,
    ),
  );
  return (from: number, to: number, first?: number): void => {
    for (;;) {
      const a = first ?? draw[from]!();
      const b = draw[to]!();
      if (from === to && !near(members[a]!, members[b]!, random)) continue;
      if (ties.add(a, b)) return;
    }
  };
}

/** Ties of the last snapshot: exactly as many as planned. */
export function plantTies(random: Random, members: readonly Member[]): Ties {
  const ties = new Ties();
  const tie = tieMaker(random, members, ties);
  plantParts(random, members, ties);
  // Nobody in a core hangs on a single tie.
  members.forEach((member, i) => {
    if (member.role !== 'core') return;
    while (ties.degree(i) < 2) tie(member.group, member.group, i);
  });
  const expected = (g: number, h: number): number => {
    const { size } = GROUPS[g]!;
    return (DENSITY[g]![h]! / 1000) * (g === h ? (size * (size - 1)) / 2 : size * GROUPS[h]!.size);
  };
  for (let g = 0; g < GROUPS.length; g++)
    for (let h = g + 1; h < GROUPS.length; h++)
      for (let left = Math.round(expected(g, h)); left > 0; left--) tie(g, h);
  // What is left of the plan lies within groups, in proportion to the planted densities.
  const within = picker(random, [...GROUPS.keys()], (g) => expected(g, g));
  while (ties.pairs.length < TIES) {
    const group = within();
    tie(group, group);
  }
  return ties;
}

/** Thin branches (trees that hang on one member of a core) and islets (trees, closed by one more tie from three on). */
function plantParts(random: Random, members: readonly Member[], ties: Ties): void {
  const parts = new Map<string, number[]>();
  members.forEach(({ role, part }, i) => {
    if (role !== 'branch' && role !== 'islet') return;
    const key = `${role} ${part}`;
    parts.set(key, [...(parts.get(key) ?? []), i]);
  });
  for (const part of parts.values()) {
    // Mostly a path: each member is tied to one of the last two before it.
    for (let i = 1; i < part.length; i++)
      ties.add(part[i]!, part[Math.max(0, i - (random.next() < 0.25 ? 2 : 1))]!);
    const { role, group } = members[part[0]!]!;
    if (role === 'islet' && part.length > 2) ties.add(part[0]!, part.at(-1)!);
    if (role === 'islet') continue;
    const core = members.flatMap((one, i) => (one.group === group && one.role === 'core' ? [i] : []));
    ties.add(part[0]!, core[random.int(core.length)]!);
  }
}
