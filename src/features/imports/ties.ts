import type { RowSink } from '@/features/files';
import { cellsThatFit } from './cells';
import { importErrors } from './errors';
import { float64, Growing, int32, uint16 } from './growing';
import { guessTieColumns } from './guess';
import type { IdTable } from './id-table';
import type { ImportLimits, ImportOptions } from './imports';
import { isAmbiguous, normaliseId, parseCell, parseTime, whyNotId, whyNotNumber } from './numbers';
import { storable, type Problems } from './problems';

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
export class TiesReader implements RowSink {
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
  /** Weights that were read with a decimal comma that nobody had set. */
  commas = 0;

  constructor(
    private readonly table: IdTable,
    private readonly options: ImportOptions,
    private readonly problems: Problems,
    takenOn: string,
    private readonly limits: ImportLimits,
  ) {
    this.now = Date.parse(`${takenOn}T00:00:00Z`);
  }

  header(headers: string[]): void {
    if (headers.length > this.limits.columns) throw importErrors.tooManyColumns('ties', this.limits.columns);
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

  broken(line: number, value: string, reason: string): void {
    this.count();
    this.refused++;
    this.problems.add('ties', line, null, value, reason);
  }

  private count(): void {
    if (++this.read > this.limits.tieRows) throw importErrors.tooManyRows('ties', this.limits.tieRows);
  }

  row(given: string[], line: number): void {
    const cells = cellsThatFit(given, this.headers.length);
    if (typeof cells === 'string') return this.broken(line, given.join(' | '), cells);
    this.count();
    const refuse = (at: number, reason: string): void => {
      this.refused++;
      this.problems.add('ties', line, this.headers[at]!, cells[at]!, reason);
    };
    const { at } = this;
    const source = normaliseId(cells[at.source]!);
    const target = normaliseId(cells[at.target]!);
    const sourceWrong = whyNotId(source, this.limits.idLength);
    if (sourceWrong) return refuse(at.source, sourceWrong);
    const targetWrong = whyNotId(target, this.limits.idLength);
    if (targetWrong) return refuse(at.target, targetWrong);
    const weight = this.weightOf(cells, refuse);
    if (weight === null) return;
    if (source === target) {
      this.selfTies++;
      return;
    }
    for (const end of [at.source, at.target]) if (cells[end] !== cells[end]!.trim()) this.table.spaced++;
    this.sources.push(this.table.place(source));
    this.targets.push(this.table.place(target));
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
      const { decimal } = this.options.reading.ties ?? {};
      weight = parseCell(cell, decimal);
      if (Number.isNaN(weight)) return (refuse(at, whyNotNumber(cell, decimal)), null);
      if (decimal === undefined && cell.includes(',') && !isAmbiguous(cell)) this.commas++;
      if (weight < 0) return (refuse(at, 'Weights cannot be negative.'), null);
      if (weight === 0) return (refuse(at, 'A tie of weight 0 is no tie.'), null);
    }
    if (this.options.halfLifeDays === null) return weight;
    const when = parseTime(cells[time]!, this.options.reading.ties?.dates);
    if (Number.isNaN(when))
      return (refuse(time, 'This is not a date such as 2026-11-28, or the form of dates is not set.'), null);
    const age = Math.max(0, (this.now - when) / DAY);
    return weight * 0.5 ** (age / this.options.halfLifeDays);
  }

  private kind(text: string): number {
    if (text === '') return 0;
    const known = this.placeOfKind.get(text);
    if (known !== undefined) return known;
    if (this.kinds.length >= MOST_KINDS) return 0;
    this.kinds.push(storable(text).slice(0, 60));
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
