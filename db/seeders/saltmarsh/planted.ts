import type { Random } from '../../../src/numerics/random';
import { between, chance } from './draws';
import type { LivedMember } from './evolution';
import { DEPARTURE_TIES, DEPARTURES, GROUPS, LAST, NAMED, NEW_ARRIVALS, QUIET_FERN } from './plan';
import type { Ties } from './structure';

/** Something planted on one member; the shift is the one in the last snapshot. */
export interface Planted {
  readonly member: number;
  readonly attribute: 'helpfulness' | 'complaints_per_100';
  readonly shift: number;
  /** Share of the shift that is there in each snapshot. */
  readonly ramp: readonly number[];
  /** Scores that are given, one a snapshot. */
  readonly scores?: readonly number[];
}

/** A member who looks odd for a harmless reason. */
export interface Surprise extends Planted {
  readonly reason: string;
  /** Group whose level the member still has, for one who moved. */
  readonly from?: number;
}

export interface PlantedAll {
  /** Handles that are given; the others are drawn. */
  readonly handles: ReadonlyMap<number, string>;
  readonly months: ReadonlyMap<number, number>;
  readonly departures: readonly Planted[];
  readonly surprises: readonly Surprise[];
}

const SUDDEN = [0, 0, 0, 0, 0, 1] as const;

/** Comes up over one to three snapshots and is whole in the last one. */
function rampFrom(random: Random): number[] {
  const start = 2 + random.int(3);
  return Array.from({ length: LAST + 1 }, (_, s) =>
    s < start ? 0 : Math.round((100 * (s - start + 1)) / (LAST - start + 1)) / 100,
  );
}

/** Chooses who departs and who only looks odd. */
export function plantDepartures(random: Random, members: readonly LivedMember[], ties: Ties): PlantedAll {
  const handles = new Map<number, string>();
  const months = new Map<number, number>();
  const taken = new Set<number>();
  const departures: Planted[] = [];
  const stays = ({ role, months: m, group }: LivedMember): boolean =>
    role === 'core' && (group === NEW_ARRIVALS ? m >= 6 : m >= 15);
  const here = [...members.keys()].filter((i) => members[i]!.left > LAST && stays(members[i]!));

  for (const plan of NAMED) {
    const fits = here.filter(
      (i) => members[i]!.group === plan.group && !taken.has(i) && ties.degree(i) >= DEPARTURE_TIES,
    );
    const off = (i: number): number =>
      Math.abs(ties.degree(i) - plan.ties) * 100 +
      Math.abs(members[i]!.months - (plan.months ?? members[i]!.months));
    const member = fits.reduce((best, i) => (off(i) < off(best) ? i : best));
    taken.add(member);
    handles.set(member, plan.handle);
    if (plan.months !== undefined && plan.group !== NEW_ARRIVALS) months.set(member, plan.months);
    const scores = plan.handle === 'quiet-fern' ? QUIET_FERN : undefined;
    departures.push({ member, attribute: 'helpfulness', shift: plan.shift, ramp: rampFrom(random), scores });
  }

  const core = random.shuffle(here.filter((i) => ties.degree(i) >= DEPARTURE_TIES && !taken.has(i)));
  const apart = (i: number): boolean => !ties.neighbours[i]!.some((j) => taken.has(j));
  while (departures.length < DEPARTURES) {
    const member = core.pop()!;
    if (!apart(member)) continue;
    const level = GROUPS[members[member]!.group]!.helpfulness;
    const size = Math.round(100 * between(random, 1.2, 1.9)) / 100;
    // Up only where the scale has room for it.
    const up = level + size <= 4.95 && (level - size < 1.2 || chance(random, 0.6));
    const shift = up ? size : -Math.min(size, Math.round(100 * (level - 1.2)) / 100);
    taken.add(member);
    departures.push({ member, attribute: 'helpfulness', shift, ramp: rampFrom(random) });
  }
  return { handles, months, departures, surprises: plantSurprises(random, members, ties, taken, handles) };
}

function plantSurprises(
  random: Random,
  members: readonly LivedMember[],
  ties: Ties,
  taken: Set<number>,
  handles: Map<number, string>,
): Surprise[] {
  const candidates = random.shuffle(
    [...members.keys()].filter((i) => {
      const { role, left, months } = members[i]!;
      return role === 'core' && left > LAST && months >= 15 && !taken.has(i);
    }),
  );
  const choose = (fits: (member: LivedMember, degree: number) => boolean): number => {
    const member = candidates.find((i) => !taken.has(i) && fits(members[i]!, ties.degree(i)))!;
    taken.add(member);
    return member;
  };
  const few = (group: number, shift: number, reason: string): Surprise => ({
    member: choose((one, degree) => one.group === group && degree <= 5),
    attribute: 'helpfulness',
    shift,
    ramp: SUDDEN,
    reason,
  });
  const moved = (from: number, to: number): Surprise => ({
    member: choose((one, degree) => one.group === to && degree >= 6 && degree <= 14),
    attribute: 'helpfulness',
    shift: Math.round(100 * (GROUPS[from]!.helpfulness - GROUPS[to]!.helpfulness)) / 100,
    ramp: SUDDEN.map(() => 1),
    reason: `Just moved from ${GROUPS[from]!.name} to ${GROUPS[to]!.name}; most ratings are from before.`,
    from,
  });
  const blight: Surprise = {
    member: choose((one, degree) => one.group === 3 && degree >= 14 && degree <= 18),
    attribute: 'complaints_per_100',
    shift: 9.6,
    ramp: SUDDEN,
    reason: 'One mislabelled batch of scions; everyone who got one reported it, and all were replaced.',
  };
  handles.set(blight.member, 'thorny-medlar');
  return [
    few(1, -1.1, 'Few raters: two ratings in all, both about one late parcel.'),
    few(5, -1.05, 'Few raters: a stall-holder who posts twice a year.'),
    few(6, 1.1, 'Few raters: lent out one tool, and was thanked for it twice.'),
    moved(NEW_ARRIVALS, 2),
    moved(7, 3),
    blight,
  ];
}
