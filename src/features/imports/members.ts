import type { RowSink } from '@/features/files';
import { buildAttribute, type AttributeColumn, type ColumnCells } from './attributes';
import { cellsThatFit } from './cells';
import { importErrors } from './errors';
import { guessMemberColumns } from './guess';
import { float64, Growing, int32 } from './growing';
import type { IdTable } from './id-table';
import type { AttributeOption, ImportLimits, ImportOptions } from './imports';
import { normaliseId, whyNotId } from './numbers';
import { storable, type Problems } from './problems';

interface Wanted extends AttributeOption {
  readonly index: number;
  /** Name of the attribute that counts what this one was made of. */
  readonly countOf: string | null;
}

/** Takes the rows of a members file and turns its columns into attributes. */
export class MembersReader implements RowSink {
  read = 0;
  refused = 0;
  blankCells = 0;
  refusedCells = 0;
  readonly names: (string | null)[] = [];
  readonly notes: string[] = [];
  private headers: string[] = [];
  private idIndex = -1;
  private nameIndex = -1;
  private cutNames = 0;
  private wanted: Wanted[] = [];
  private readonly lines = new Growing(float64(1024), float64);
  private readonly placeOfRow = new Growing(int32(1024), int32);
  private readonly seen = new Set<number>();
  private readonly cells: string[][] = [];
  private readonly takenOn: number;

  constructor(
    private readonly table: IdTable,
    private readonly options: ImportOptions,
    private readonly problems: Problems,
    takenOn: string,
    private readonly limits: ImportLimits,
  ) {
    this.takenOn = Date.parse(`${takenOn}T00:00:00Z`);
  }

  header(headers: string[]): void {
    if (headers.length > this.limits.columns)
      throw importErrors.tooManyColumns('members', this.limits.columns);
    const twice = headers.find((header, index) => header !== '' && headers.indexOf(header) !== index);
    if (twice !== undefined) throw importErrors.duplicateHeader('members', twice);
    this.headers = headers;
    const guess = guessMemberColumns(headers);
    const { members } = this.options;
    const index = (column: string | undefined, what: string): number => {
      if (column === undefined) return -1;
      const at = headers.indexOf(column);
      if (at < 0) throw importErrors.noColumn('members', `${what} (“${column.slice(0, 60)}”)`, headers);
      return at;
    };
    this.idIndex = index(members.id ?? guess.id, 'the member id');
    if (this.idIndex < 0) throw importErrors.noColumn('members', 'the member id', headers);
    this.nameIndex = index(members.id ? members.name : (members.name ?? guess.name), 'the name');
    const attributes =
      members.attributes ??
      guess.attributes.map((one): AttributeOption => ({ ...one, direction: 'neither', sensitive: false }));
    const own = attributes.filter((one) => one.column !== headers[this.idIndex]);
    // A count that weighs a score is kept as an attribute, also where nobody asked for it by itself.
    for (const { countColumn } of [...own])
      if (countColumn !== undefined && !own.some((one) => one.column === countColumn))
        own.push({ column: countColumn, name: countColumn, direction: 'neither', sensitive: false });
    const nameOf = (column: string | undefined): string | null =>
      own.find((one) => one.column === column)?.name ?? null;
    this.wanted = own.map((one) => ({
      ...one,
      index: index(one.column, one.name),
      countOf: nameOf(one.countColumn),
    }));
    const name = own.find((one, at) => own.findIndex((other) => other.name === one.name) !== at)?.name;
    if (name !== undefined) throw importErrors.duplicateHeader('members', name);
    for (const _ of this.wanted) this.cells.push([]);
  }

  broken(line: number, value: string, reason: string): void {
    this.count();
    this.refused++;
    this.problems.add('members', line, null, value, reason);
  }

  private count(): void {
    const { memberRows, cells } = this.limits;
    if (++this.read > memberRows) throw importErrors.tooManyRows('members', memberRows);
    if (this.read * this.headers.length > cells)
      throw importErrors.tooManyRows('members', Math.floor(cells / this.headers.length));
  }

  row(given: string[], line: number): void {
    const cells = cellsThatFit(given, this.headers.length);
    if (typeof cells === 'string') return this.broken(line, given.join(' | '), cells);
    this.count();
    const refuse = (column: string, value: string, reason: string): void => {
      this.refused++;
      this.problems.add('members', line, column, value, reason);
    };
    const raw = cells[this.idIndex]!;
    const id = normaliseId(raw);
    const idColumn = this.headers[this.idIndex]!;
    const wrong = whyNotId(id, this.limits.idLength);
    if (wrong) return refuse(idColumn, raw, wrong);
    const long = this.wanted.find((one) => cells[one.index]!.length > this.limits.cellLength);
    if (long)
      return refuse(
        long.column,
        cells[long.index]!,
        `This cell is longer than ${this.limits.cellLength} characters.`,
      );
    const known = this.table.find(id);
    if (known !== undefined && this.seen.has(known))
      return refuse(idColumn, raw, 'This member stands in an earlier row already.');
    if (raw !== raw.trim()) this.table.spaced++;
    const place = this.table.place(id);
    this.seen.add(place);
    this.placeOfRow.push(place);
    this.names.push(this.nameOf(cells));
    this.lines.push(line);
    this.wanted.forEach((one, i) => this.cells[i]!.push(cells[one.index]!));
  }

  private nameOf(cells: readonly string[]): string | null {
    const name = this.nameIndex < 0 ? '' : cells[this.nameIndex]!.trim();
    if (name.length > this.limits.labelLength) this.cutNames++;
    return name === '' ? null : storable(name.slice(0, this.limits.labelLength));
  }

  get kept(): number {
    return this.placeOfRow.length;
  }

  /** Places of the rows that were kept, in the order of the file. */
  get places(): Int32Array {
    return this.placeOfRow.view();
  }

  /**
   * Decides the type of each column and reads its values, one a kept row. Cells that do not fit are refused one by
   * one. Frees the cells: call it once.
   */
  finish(): AttributeColumn[] {
    if (this.cutNames > 0)
      this.notes.push(`${this.cutNames} names were cut after ${this.limits.labelLength} characters.`);
    const columns: AttributeColumn[] = [];
    const lines = this.lines.view();
    for (const [i, wanted] of this.wanted.entries()) {
      const cells = this.cells[i]!;
      this.cells[i] = [];
      const column = this.finishColumn({ wanted, cells, lines });
      if (column) columns.push(column);
    }
    return columns;
  }

  private finishColumn({ wanted, cells, lines }: ColumnCells & { wanted: Wanted }): AttributeColumn | null {
    const { decimal, dates } = this.options.reading.members ?? {};
    const built = buildAttribute(
      { wanted, cells, lines },
      { decimal, dates, takenOn: this.takenOn, longest: this.limits.labelLength },
      (line, cell, reason) => {
        this.refusedCells++;
        this.problems.add('members', line, wanted.column, cell, reason);
      },
    );
    this.blankCells += built.blank;
    this.notes.push(...built.notes);
    return built.column && { ...built.column, countOf: wanted.countOf };
  }
}
