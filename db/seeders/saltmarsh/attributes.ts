import { createRandom, type Random } from '../../../src/numerics/random';
import { bell, between, chance, clamp, pick, skewed, wave } from './draws';
import type { LivedMember } from './evolution';
import { GROUPS, LAST, SNAPSHOTS, SURVEYED, UNSCORED } from './plan';
import type { Planted, PlantedAll } from './planted';

/** Cells of one member in one snapshot, as they are written; blank for missing. */
export interface Cells {
  readonly helpfulness: string;
  readonly complaints: string;
  readonly belonging: string;
  readonly posts: string;
  readonly months: string;
  readonly circle: string;
}

/** What stays with a member from one snapshot to the next. */
interface Nature {
  readonly group: (typeof GROUPS)[number];
  readonly shared: number;
  readonly own: number;
  readonly warmth: number;
  readonly grumbles: number;
  readonly talk: number;
  readonly surveyRank: number;
  readonly unscored: boolean;
  readonly circle: string;
}

/** Spread of what is shared along ties within a group, and of what is a member's own, on the helpfulness scale. */
const SHARED = 0.3;
const OWN = 0.2;

function natureOf(random: Random, member: LivedMember): Nature {
  // Islets have a middling level of their own.
  const group = GROUPS[member.group] ?? GROUPS[6]!;
  const circles = [group.name, group.name, '', 'Visitors', pick(random, GROUPS).name];
  const draw = random.next();
  const circle = circles[draw < 0.89 ? 0 : draw < 0.95 ? 2 : draw < 0.97 ? 3 : 4]!;
  return {
    group,
    shared: wave(member.place + (member.group + 1) * 0.13),
    own: bell(random),
    warmth: bell(random),
    grumbles: skewed(random),
    talk: skewed(random),
    surveyRank: random.next(),
    unscored: chance(random, UNSCORED),
    circle: member.group < 0 && chance(random, 0.6) ? '' : circle,
  };
}

/** Attributes of every member in every snapshot: group level, what is shared along ties, what is a member's own. */
export function attributeCells(
  seed: number,
  members: readonly LivedMember[],
  planted: PlantedAll,
): (snapshot: number) => ReadonlyMap<number, Cells> {
  const random = createRandom(seed);
  const natures = members.map((member) => natureOf(random, member));
  const odd: readonly Planted[] = [...planted.departures, ...planted.surprises];
  const departs = new Map(odd.map((one) => [one.member, one]));
  const movedFrom = new Map(planted.surprises.map((one) => [one.member, one.from]));
  const scarce = new Set(
    planted.surprises.filter((one) => one.reason.startsWith('Few')).map((one) => one.member),
  );

  return (snapshot) => {
    const fresh = createRandom(seed + 7919 * (snapshot + 1));
    const back = LAST - snapshot;
    const there = [...members.keys()].filter(
      (i) => members[i]!.joined <= snapshot && snapshot < members[i]!.left,
    );
    const surveyed = chooseSurveyed(there, (i) => natures[i]!.surveyRank + between(fresh, 0, 0.3));
    const cells = new Map<number, Cells>();
    for (const i of there) {
      const { group, shared, own, warmth, grumbles, talk, unscored, circle } = natures[i]!;
      const special = departs.get(i);
      const shift = special ? special.shift * special.ramp[snapshot]! : 0;
      const on = (attribute: string): number => (special?.attribute === attribute ? shift : 0);
      // Planted members keep a quiet difference of their own, so that what is planted is what is found.
      const noise = (special ? 0.35 : 1) * OWN * (0.85 * own + 0.53 * bell(fresh));
      const level = group.helpfulness - group.rise * back;
      const helpfulness = special?.scores?.[snapshot] ?? level + SHARED * shared + noise + on('helpfulness');
      const rate = group.complaints * (1 + 0.25 * shared) * (0.45 + 0.35 * grumbles + 0.2 * skewed(fresh));
      const answer = group.belonging - group.belongingRise * back + 9 * shared + 5 * warmth + 3 * bell(fresh);
      const pace = scarce.has(i) ? 0.3 : special ? 1.2 : 2.6;
      const posts = 0.1 + pace * (0.8 * talk + 0.2 * skewed(fresh));
      const months = (planted.months.get(i) ?? members[i]!.months) - monthsBetween(snapshot, LAST);
      const from = movedFrom.get(i);
      cells.set(i, {
        helpfulness: unscored && !special ? '' : clamp(helpfulness, 1, 5).toFixed(2),
        complaints: Math.max(0, rate + on('complaints_per_100')).toFixed(1),
        belonging: surveyed.has(i) ? clamp(Math.round(answer), 0, 100).toFixed(0) : '',
        posts: posts.toFixed(1),
        months: months.toFixed(0),
        circle: special ? (GROUPS[from ?? -1] ?? group).name : circle,
      });
    }
    return cells;
  };
}

/** Months between two snapshots: one a quarter is three. */
const monthsBetween = (from: number, to: number): number => {
  const month = (at: number): number => {
    const [year, part] = SNAPSHOTS[at]!.takenOn.split('-').map(Number);
    return 12 * year! + part!;
  };
  return month(to) - month(from);
};

/** Exactly the planned share of those who are there. */
function chooseSurveyed(there: readonly number[], rank: (member: number) => number): Set<number> {
  const ranked = there.map((member) => ({ member, rank: rank(member) }));
  ranked.sort((a, b) => a.rank - b.rank || a.member - b.member);
  return new Set(ranked.slice(0, Math.round(SURVEYED * there.length)).map((one) => one.member));
}
