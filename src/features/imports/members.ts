import { importErrors } from './errors';
import { guessMemberColumns } from './guess';
import { LIMITS, type AttributeOption, type ImportOptions } from './imports';
import { normaliseId, parseNumber, whyNotNumber } from './numbers';
import type { Problems } from './problems';

/** Ids in the order met, with their place. */
export class IdTable {
  readonly ids: string[] = [];
  private readonly placeOf = new Map<string, number>();
  /** Ids that were written with outer spaces somewhere. */
  spaced = 0;

  find(id: string): number | undefined {
    return this.placeOf.get(id);
  }
  /** Place of an id, adding it when it is new. */
  place(id: string): number {
    const known = this.placeOf.get(id);
    if (known !== undefined) return known;
    const place = this.ids.length;
    this.ids.push(id);
    this.placeOf.set(id, place);
    return place;
  }
}

export interface AttributeColumn {
  readonly name: string;
  readonly type: 'number' | 'label';
  readonly direction: AttributeOption['direction'];
  readonly sensitive: boolean;
  readonly countOf: string | null;
  /** One a member of the file; NaN where missing. */
  readonly values: Float64Array;
  /** For labels; null where missing. */
  readonly labels: (string | null)[] | null;
}

interface Wanted extends AttributeOption {
  readonly index: number;
}

/** Above this share of filled cells that are no numbers, a column is taken for labels. */
const LABEL_SHARE = 0.05;

/** Takes the rows of a members file and turns its columns into attributes. */
export class MembersReader {
  read = 0;
  refused = 0;
  blankCells = 0;
  refusedCells = 0;
  readonly names: (string | null)[] = [];
  readonly notes: string[] = [];
  private headers: string[] = [];
  private idIndex = -1;
  private nameIndex = -1;
  private wanted: Wanted[] = [];
  private readonly lines: number[] = [];
  private readonly cells: string[][] = [];

  constructor(
    private readonly table: IdTable,
    private readonly options: ImportOptions,
    private readonly problems: Problems,
  ) {}

  header(headers: string[]): void {
    if (headers.length > LIMITS.columns) throw importErrors.tooManyColumns('members', LIMITS.columns);
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
    this.wanted = own.map((one) => ({ ...one, index: index(one.column, one.name) }));
    const name = own.find((one, at) => own.findIndex((other) => other.name === one.name) !== at)?.name;
    if (name !== undefined) throw importErrors.duplicateHeader('members', name);
  }

  row(cells: string[], line: number): void {
    if (++this.read > LIMITS.memberRows) throw importErrors.tooManyRows('members', LIMITS.memberRows);
    if (this.read * this.headers.length > LIMITS.cells)
      throw importErrors.tooManyRows('members', Math.floor(LIMITS.cells / this.headers.length));
    const refuse = (column: string | null, value: string | null, reason: string): void => {
      this.refused++;
      this.problems.add('members', line, column, value, reason);
    };
    if (cells.length !== this.headers.length)
      return refuse(
        null,
        cells.join(' | '),
        `This row has ${cells.length} cells; the header has ${this.headers.length}.`,
      );
    const raw = cells[this.idIndex]!;
    const id = normaliseId(raw);
    const idColumn = this.headers[this.idIndex]!;
    if (id === '') return refuse(idColumn, raw, 'The member id is blank.');
    if (id.length > LIMITS.idLength)
      return refuse(idColumn, raw, `The member id is longer than ${LIMITS.idLength} characters.`);
    if (this.table.find(id) !== undefined)
      return refuse(idColumn, raw, 'This member stands in an earlier row already.');
    if (raw !== raw.trim()) this.table.spaced++;
    this.table.place(id);
    const name = this.nameIndex < 0 ? '' : cells[this.nameIndex]!.trim();
    this.names.push(name === '' ? null : name.slice(0, 200));
    this.lines.push(line);
    this.cells.push(this.wanted.map((one) => cells[one.index]!));
  }

  get kept(): number {
    return this.cells.length;
  }

  /** Decides the type of each column and reads its values. Cells that do not fit are refused one by one. */
  finish(): AttributeColumn[] {
    return this.wanted.map((wanted, column) => this.attribute(wanted, column)).filter((one) => one !== null);
  }

  private attribute(wanted: Wanted, column: number): AttributeColumn | null {
    const cells = this.cells.map((row) => row[column]!.trim());
    const filled = cells.filter((cell) => cell !== '');
    this.blankCells += cells.length - filled.length;
    if (filled.length === 0) {
      this.notes.push(`“${wanted.name}” is blank for everyone and was left out.`);
      return null;
    }
    const commas = filled.filter(
      (cell) => Number.isNaN(parseNumber(cell)) && !Number.isNaN(parseNumber(cell, true)),
    ).length;
    const decimalComma = commas > 0 && commas >= filled.filter((cell) => cell.includes('.')).length;
    const values = Float64Array.from(cells, (cell) => (cell === '' ? NaN : parseNumber(cell, decimalComma)));
    const bad = filled.length - values.reduce((sum, value) => sum + (Number.isNaN(value) ? 0 : 1), 0);
    const type = wanted.type ?? (bad / filled.length > LABEL_SHARE ? 'label' : 'number');
    const common = {
      name: wanted.name,
      direction: wanted.direction,
      sensitive: wanted.sensitive,
      countOf: wanted.countColumn ?? null,
    };
    if (type === 'label')
      return {
        ...common,
        type,
        values: new Float64Array(),
        labels: cells.map((cell) => (cell === '' ? null : cell.slice(0, 200))),
      };
    cells.forEach((cell, i) => {
      if (cell === '' || !Number.isNaN(values[i]!)) return;
      this.refusedCells++;
      this.problems.add(
        'members',
        this.lines[i]!,
        wanted.column,
        cell,
        `${whyNotNumber(cell)} The cell was left blank.`,
      );
    });
    if (decimalComma) this.notes.push(`“${wanted.name}” was read with decimal commas.`);
    return { ...common, type, values, labels: null };
  }
}
