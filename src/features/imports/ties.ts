import { importErrors } from './errors';
import { guessTieColumns } from './guess';
import { LIMITS, type ImportOptions } from './imports';
import type { IdTable } from './members';
import { normaliseId, parseNumber, parseTime, whyNotNumber } from './numbers';
import type { Problems } from './problems';

/** A typed array that grows by doubling. */
class Growing<T extends Int32Array | Float64Array | Uint16Array> {
  length = 0;
  constructor(
    private array: T,
    private readonly make: (size: number) => T,
  ) {}
  push(value: number): void {
    if (this.length === this.array.length) {
      const next = this.make(this.array.length * 2);
      next.set(this.array as never);
      this.array = next;
    }
    this.array[this.length++] = value;
  }
  view(): T {
    return this.array.subarray(0, this.length) as T;
  }
}
const int32 = (size: number): Int32Array => new Int32Array(size);
const float64 = (size: number): Float64Array => new Float64Array(size);
const uint16 = (size: number): Uint16Array => new Uint16Array(size);

/** Rows of a ties file that are well formed: places of both members, weight, kind. */
export interface TieRows {
  readonly sources: Int32Array;
  readonly targets: Int32Array;
  readonly weights: Float64Array;
  /** Place in `kinds`, plus one; 0 for none. */
  readonly kindOf: Uint16Array;
  readonly kinds: readonly string[];
}

const DAY = 86_400_000;
const MOST_KINDS = 1_000;

/** Takes the rows of a ties file and keeps those that are ties. */
export class TiesReader {
  read = 0;
  refused = 0;
  selfTies = 0;
  private headers: string[] = [];
  private at = { source: -1, target: -1, weight: -1, kind: -1, time: -1 };
  private readonly sources = new Growing(int32(1024), int32);
  private readonly targets = new Growing(int32(1024), int32);
  private readonly weights = new Growing(float64(1024), float64);
  private readonly kindOf = new Growing(uint16(1024), uint16);
  private readonly kinds: string[] = [];
  private readonly placeOfKind = new Map<string, number>();
  private readonly now: number;

  constructor(
    private readonly table: IdTable,
    private readonly options: ImportOptions,
    private readonly problems: Problems,
    takenOn: string,
  ) {
    this.now = Date.parse(`${takenOn}T00:00:00Z`);
  }

  header(headers: string[]): void {
    if (headers.length > LIMITS.columns) throw importErrors.tooManyColumns('ties', LIMITS.columns);
    this.headers = headers;
    const guess = guessTieColumns(headers);
    const asked = this.options.ties;
    const index = (key: keyof typeof this.at): number => {
      const column = asked[key] ?? guess[key];
      if (column === undefined) return -1;
      const at = headers.indexOf(column);
      if (at < 0) throw importErrors.noColumn('ties', `${key} (“${column.slice(0, 60)}”)`, headers);
      if (headers.lastIndexOf(column) !== at) throw importErrors.duplicateHeader('ties', column);
      return at;
    };
    this.at = {
      source: index('source'),
      target: index('target'),
      weight: index('weight'),
      kind: index('kind'),
      time: index('time'),
    };
    for (const key of ['source', 'target'] as const)
      if (this.at[key] < 0) throw importErrors.noColumn('ties', `the ${key}`, headers);
    if (this.options.halfLifeDays !== null && this.at.time < 0)
      throw importErrors.noColumn('ties', 'the time, which a half-life needs', headers);
  }

  row(cells: string[], line: number): void {
    if (++this.read > LIMITS.tieRows) throw importErrors.tooManyRows('ties', LIMITS.tieRows);
    const refuse = (at: number, reason: string): void => {
      this.refused++;
      const cell = at < 0 ? cells.join(' | ') : cells[at]!;
      this.problems.add('ties', line, at < 0 ? null : this.headers[at]!, cell, reason);
    };
    if (cells.length !== this.headers.length)
      return refuse(-1, `This row has ${cells.length} cells; the header has ${this.headers.length}.`);
    const { at } = this;
    const ends: string[] = [];
    for (const end of [at.source, at.target]) {
      const id = normaliseId(cells[end]!);
      if (id === '') return refuse(end, 'The member id is blank.');
      if (id.length > LIMITS.idLength)
        return refuse(end, `The member id is longer than ${LIMITS.idLength} characters.`);
      ends.push(id);
    }
    const weight = this.weightOf(cells, refuse);
    if (weight === null) return;
    if (ends[0] === ends[1]) {
      this.selfTies++;
      return;
    }
    for (const end of [at.source, at.target]) if (cells[end] !== cells[end]!.trim()) this.table.spaced++;
    this.sources.push(this.table.place(ends[0]!));
    this.targets.push(this.table.place(ends[1]!));
    this.weights.push(weight);
    this.kindOf.push(at.kind < 0 ? 0 : this.kind(cells[at.kind]!.trim()));
  }

  /** Weight of a row with its age taken into account, or null when the row was refused. */
  private weightOf(cells: string[], refuse: (at: number, reason: string) => void): number | null {
    const { weight: at, time } = this.at;
    let weight = 1;
    if (at >= 0) {
      const cell = cells[at]!;
      if (cell.trim() === '') return (refuse(at, 'The weight is blank.'), null);
      weight = parseNumber(cell, true);
      if (Number.isNaN(weight)) return (refuse(at, whyNotNumber(cell)), null);
      if (weight < 0) return (refuse(at, 'Weights cannot be negative.'), null);
      if (weight === 0) return (refuse(at, 'A tie of weight 0 is no tie.'), null);
    }
    if (this.options.halfLifeDays === null) return weight;
    const when = parseTime(cells[time]!);
    if (Number.isNaN(when)) return (refuse(time, 'This is not a date such as 2026-11-28.'), null);
    const age = Math.max(0, (this.now - when) / DAY);
    return weight * 0.5 ** (age / this.options.halfLifeDays);
  }

  private kind(text: string): number {
    if (text === '') return 0;
    const known = this.placeOfKind.get(text);
    if (known !== undefined) return known;
    if (this.kinds.length >= MOST_KINDS) return 0;
    this.kinds.push(text.slice(0, 60));
    this.placeOfKind.set(text, this.kinds.length);
    return this.kinds.length;
  }

  finish(): TieRows {
    return {
      sources: this.sources.view(),
      targets: this.targets.view(),
      weights: this.weights.view(),
      kindOf: this.kindOf.view(),
      kinds: this.kinds,
    };
  }
}
