import { computeSmootherGroups } from '@/features/groupings/compute';
import {
  benjaminiHochberg,
  median,
  takeReading,
  twoSidedP,
  type Network,
  type ReadingFilter,
} from '@/numerics';
import { plant, type Planted, type PlantOptions } from '../unit/numerics/planted';

/**
 * The planted benchmark: invented communities with a known truth, Thrum's default smoother and four rivals on the
 * same members. `npm run bench:truth -- [seeds] [exact|large] [members]`; large is above 2,000 members.
 */
const [seedsText = '10', path = 'exact', membersText] = process.argv.slice(2);
const seeds = Number(seedsText);
const n = Number(membersText ?? (path === 'large' ? 2_500 : 500));
const RATE = 0.1;
const FLOOR = 5;

const SETTINGS: Readonly<Record<string, Partial<PlantOptions>>> = {
  default: {},
  'mixing 0.25': { mixing: 0.25 },
  'between 3': { between: 3 },
  'between 1, within 1': { between: 1, within: 1 },
  'no signal': { between: 0, within: 0 },
  'mean degree 6': { degree: 6 },
  '8 % planted': { shifted: 0.08 },
  'none planted': { shifted: 0 },
};

/** What one method says of each member; scores and errors only where the method has them. */
interface Answer {
  readonly flagged: Uint8Array;
  readonly smoothed?: Float64Array;
  readonly standardError?: Float64Array;
}

const flagsOf = (q: Float64Array): Uint8Array => Uint8Array.from(q, (one) => (one <= RATE ? 1 : 0));

/** Robust z of the tested entries, two-sided normal p, Benjamini–Hochberg. */
function robust(values: Float64Array, tested: Uint8Array): Answer {
  const kept = values.map((one, i) => (tested[i] === 1 ? one : NaN));
  const centre = median(kept);
  const spread = 1.4826 * median(kept.map((one) => Math.abs(one - centre)));
  return { flagged: flagsOf(benjaminiHochberg(kept.map((one) => twoSidedP((one - centre) / spread)))) };
}

/** Score minus the mean of the neighbours who have one. */
function lessNeighbours(network: Network, values: Float64Array): Float64Array {
  return values.map((own, i) => {
    let sum = 0;
    let weight = 0;
    for (let k = network.offsets[i]!; k < network.offsets[i + 1]!; k++) {
      const other = values[network.targets[k]!]!;
      if (Number.isNaN(other)) continue;
      sum += network.weights[k]! * other;
      weight += network.weights[k]!;
    }
    return own - sum / weight;
  });
}

function answers(
  { network, values }: Planted,
  seed: number,
): { tested: Uint8Array; by: Map<string, Answer> } {
  const groups = computeSmootherGroups({ net: network, k: null, seed });
  const read = (filter: ReadingFilter) =>
    takeReading(network, {
      values,
      precision: null,
      groups,
      filter,
      laplacian: 'combinatorial',
      neighbourFloor: FLOOR,
      permutations: 0,
      seed,
    }).columns;
  const own = read({ kind: 'two-level' });
  const plain = read({ kind: 'tikhonov', alpha: 'gcv' });
  const { tested, local } = own;
  // Only members unlike their neighbours can count as departures for local Moran; over all quadrants it does far worse.
  const unlike = benjaminiHochberg(local.p.map((one, i) => (tested[i] === 1 ? one : NaN))).map((q, i) =>
    local.quadrant[i]! >= 3 ? q : NaN,
  );
  return {
    tested,
    by: new Map<string, Answer>([
      ['two levels (Thrum)', { ...own, flagged: flagsOf(own.q) }],
      ['z of raw score', robust(values, tested)],
      ['z less neighbours', robust(lessNeighbours(network, values), tested)],
      ['Tikhonov, GCV', { ...plain, flagged: flagsOf(plain.q) }],
      ['local Moran', { flagged: flagsOf(unlike) }],
    ]),
  };
}

class Tally {
  private readonly proportions: number[] = [];
  private hits = 0;
  private planted = 0;
  private readonly error = { seen: 0, missing: 0 };
  private readonly count = { seen: 0, missing: 0 };
  private covered = 0;
  private bounded = 0;

  add({ truth, planted, values }: Planted, tested: Uint8Array, answer: Answer): void {
    let right = 0;
    let wrong = 0;
    truth.forEach((one, i) => {
      if (tested[i] === 1) {
        this.planted += planted[i]!;
        if (answer.flagged[i] === 1 && planted[i] === 1) right++;
        else if (answer.flagged[i] === 1) wrong++;
      }
      const estimate = answer.smoothed?.[i] ?? NaN;
      if (Number.isNaN(estimate)) return;
      const at = Number.isNaN(values[i]!) ? 'missing' : 'seen';
      this.error[at] += (estimate - one) ** 2;
      this.count[at]++;
      const error = answer.standardError?.[i] ?? NaN;
      if (Number.isNaN(error)) return;
      this.bounded++;
      if (Math.abs(estimate - one) <= 1.959964 * error) this.covered++;
    });
    this.hits += right;
    this.proportions.push(wrong / Math.max(1, right + wrong));
  }

  row(): string[] {
    const share = (part: number, whole: number): string =>
      whole > 0 ? `${((100 * part) / whole).toFixed(1)} %` : '–';
    const mean = (at: 'seen' | 'missing'): string =>
      this.count[at] > 0 ? (this.error[at] / this.count[at]).toFixed(3) : '–';
    return [
      share(
        this.proportions.reduce((sum, one) => sum + one, 0),
        this.proportions.length,
      ),
      this.planted > 0 ? (this.hits / this.planted).toFixed(3) : '–',
      mean('seen'),
      mean('missing'),
      share(this.covered, this.bounded),
    ];
  }
}

const line = (cells: readonly string[]): void => {
  process.stdout.write(`| ${cells.join(' | ')} |\n`);
};

const started = performance.now();
const overall = new Map<string, Tally>();
const tallyOf = (tallies: Map<string, Tally>, method: string): Tally => {
  const found = tallies.get(method) ?? new Tally();
  tallies.set(method, found);
  return found;
};
process.stdout.write(
  `${n} members, ${seeds} seeds a setting, ${path} path; nominal rate ${100 * RATE} %\n\n`,
);
line(['setting', 'method', 'realised rate', 'power', 'error, observed', 'error, missing', '95 % cover']);
line(['---', '---', '---:', '---:', '---:', '---:', '---:']);
for (const [setting, options] of Object.entries(SETTINGS)) {
  const here = new Map<string, Tally>();
  for (let seed = 1; seed <= seeds; seed++) {
    const planted = plant({ n, seed, branches: 0.08, islets: Math.round(n / 100), ...options });
    const { tested, by } = answers(planted, seed);
    for (const [method, answer] of by)
      for (const tallies of [here, overall]) tallyOf(tallies, method).add(planted, tested, answer);
  }
  for (const [method, tally] of here) line([setting, method, ...tally.row()]);
}
for (const [method, tally] of overall) line(['**all**', method, ...tally.row()]);
process.stdout.write(`\n${((performance.now() - started) / 1000).toFixed(0)} s\n`);
