import type { ReadSettings } from '@/features/files';
import type { AttributeOption } from './imports';
import { isAmbiguous, monthsUntil, parseNumber, parseTime, whyNotNumber } from './numbers';
import { storable } from './problems';

export interface AttributeColumn {
  readonly name: string;
  readonly type: 'number' | 'label';
  readonly direction: AttributeOption['direction'];
  readonly sensitive: boolean;
  /** Name of the attribute whose counts weigh this one. */
  readonly countOf: string | null;
  /** One a row; NaN where missing. Empty for labels. */
  readonly values: Float64Array;
  /** For labels; null where missing. */
  readonly labels: (string | null)[] | null;
}

export interface ColumnCells {
  readonly wanted: AttributeOption;
  readonly cells: readonly string[];
  /** Line of each cell in the file. */
  readonly lines: ArrayLike<number>;
}

interface How {
  readonly decimal: ReadSettings['decimal'] | undefined;
  readonly dates: ReadSettings['dates'] | undefined;
  /** Milliseconds of the day of the snapshot. */
  readonly takenOn: number;
  /** Characters that a label may have. */
  readonly longest: number;
}

interface Built {
  readonly column: AttributeColumn | null;
  readonly blank: number;
  readonly notes: string[];
}

/** Above this share of filled cells that are no numbers, a column is taken for labels. */
const LABEL_SHARE = 0.05;

/**
 * Whether a column is written with decimal commas: as set, else where commas cannot be thousands marks somewhere and
 * are no rarer than points.
 */
function hasDecimalComma(cells: readonly string[], decimal: How['decimal']): boolean {
  if (decimal !== undefined) return decimal === 'comma';
  let commas = 0;
  let points = 0;
  let sure = false;
  for (const cell of cells) {
    if (cell.includes('.')) points++;
    if (!Number.isNaN(parseNumber(cell)) || Number.isNaN(parseNumber(cell, true))) continue;
    commas++;
    sure ||= !isAmbiguous(cell);
  }
  return sure && commas >= points;
}

function rangeWords({ least, most }: AttributeOption): string {
  if (least !== undefined && most !== undefined) return `This is not between ${least} and ${most}.`;
  return least !== undefined ? `This is less than ${least}.` : `This is more than ${most}.`;
}

/** Turns the cells of one column into an attribute, telling of every cell that does not fit. */
export function buildAttribute(
  { wanted, cells: raw, lines }: ColumnCells,
  how: How,
  refuse: (line: number, cell: string, reason: string) => void,
): Built {
  const notes: string[] = [];
  const cells = raw.map((cell) => cell.trim());
  const filled = cells.reduce((sum, cell) => sum + (cell === '' ? 0 : 1), 0);
  const blank = cells.length - filled;
  if (filled === 0)
    return { column: null, blank, notes: [`“${wanted.name}” is blank for everyone and was left out.`] };
  const common = {
    name: wanted.name,
    direction: wanted.direction,
    sensitive: wanted.sensitive,
    countOf: null,
  };
  const refuseFrom = (values: Float64Array, why: (cell: string) => string): void =>
    cells.forEach((cell, i) => {
      if (cell !== '' && Number.isNaN(values[i]!))
        refuse(lines[i]!, cell, `${why(cell)} The cell was left blank.`);
    });
  if (wanted.type === 'date') {
    const values = Float64Array.from(cells, (cell) =>
      cell === '' ? NaN : monthsUntil(parseTime(cell, how.dates), how.takenOn),
    );
    refuseFrom(values, () => 'This is not a date such as 2026-11-28, or the form of dates is not set.');
    return { column: { ...common, type: 'number', values, labels: null }, blank, notes };
  }
  const decimalComma = hasDecimalComma(cells, how.decimal);
  const strict = how.decimal === 'comma';
  const values = Float64Array.from(cells, (cell) =>
    cell === '' || (strict && cell.includes('.')) ? NaN : parseNumber(cell, decimalComma),
  );
  const bad = values.reduce((sum, value) => sum + (Number.isNaN(value) ? 1 : 0), 0) - blank;
  const type = wanted.type ?? (bad / filled > LABEL_SHARE ? 'label' : 'number');
  if (type === 'label') {
    const cut = cells.filter((cell) => cell.length > how.longest).length;
    if (cut > 0) notes.push(`${cut} cells of “${wanted.name}” were cut after ${how.longest} characters.`);
    const labels = cells.map((cell) => (cell === '' ? null : storable(cell.slice(0, how.longest))));
    return { column: { ...common, type, values: new Float64Array(), labels }, blank, notes };
  }
  refuseFrom(values, (cell) => whyNotNumber(cell, decimalComma ? 'comma' : how.decimal));
  const { least = -Infinity, most = Infinity } = wanted;
  values.forEach((value, i) => {
    if (!(value < least) && !(value > most)) return;
    values[i] = NaN;
    refuse(lines[i]!, cells[i]!, `${rangeWords(wanted)} The cell was left blank.`);
  });
  if (decimalComma && how.decimal === undefined) notes.push(`“${wanted.name}” was read with decimal commas.`);
  return { column: { ...common, type, values, labels: null }, blank, notes };
}
