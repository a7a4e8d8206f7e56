import type { DateOrder, ReadSettings } from '@/features/files';

const PLAIN = /^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i;
const COMMA = /^[+-]?(\d+,?\d*|,\d+)(e[+-]?\d+)?$/i;
/** "1,234" is one and a bit, or a thousand and more: only a person can tell. */
const AMBIGUOUS = /^[+-]?[1-9]\d{0,2}(,\d{3})+$/;

/**
 * Number in a cell, strictly: no units, no thousands marks, no hexadecimal. NaN when it is not a finite number.
 * @param decimalComma whether "3,5" is three and a half
 */
export function parseNumber(cell: string, decimalComma = false): number {
  const text = cell.trim().replace(/^\u2212/, '-');
  const usual = PLAIN.test(text);
  if (!usual && !(decimalComma && COMMA.test(text))) return NaN;
  const value = Number(usual ? text : text.replace(',', '.'));
  return Number.isFinite(value) ? value : NaN;
}

/** Number in a cell of a file whose decimal mark is set, or else must be plain from the cell alone. */
export function parseCell(cell: string, decimal: ReadSettings['decimal']): number {
  if (decimal === 'comma') return cell.includes('.') ? NaN : parseNumber(cell, true);
  return parseNumber(cell, decimal === undefined && !isAmbiguous(cell));
}

export const isAmbiguous = (cell: string): boolean => AMBIGUOUS.test(cell.trim());

/** What a cell that is no number was meant to be, for its message. */
export function whyNotNumber(cell: string, decimal?: ReadSettings['decimal']): string {
  const text = cell.trim().toLowerCase();
  if (/^[+-]?(inf|infinity|∞)$/.test(text)) return 'Infinite values are not accepted.';
  if (text === 'nan') return 'NaN is not a number.';
  if (decimal === undefined && isAmbiguous(cell))
    return 'This comma may divide thousands or decimals. Set the decimal mark of the file.';
  if (decimal === 'comma' && text.includes('.') && PLAIN.test(text))
    return 'This has a point, but the decimal mark is a comma.';
  if (PLAIN.test(text)) return 'This number is too large.';
  return 'This is not a number.';
}

const YEAR_FIRST =
  /^(\d{4})[-/.](\d{1,2})[-/.](\d{1,2})(?:[T ](\d{2}:\d{2}(?::\d{2}(?:\.\d+)?)?)\s?(Z|[+-]\d{2}:?\d{2})?)?$/;
const YEAR_LAST = /^(\d{1,2})[-/.](\d{1,2})[-/.](\d{4})(?:[T ,]+(\d{2}:\d{2}(?::\d{2})?))?$/;

/**
 * Milliseconds of a date or time, in UTC where no zone is named; NaN for anything else and for days that do not exist.
 * @param order of day and month where the year stands last; year-first refuses such dates
 */
export function parseTime(cell: string, order: DateOrder = 'year-first'): number {
  const text = cell.trim();
  const first = YEAR_FIRST.exec(text);
  const last = order === 'year-first' ? null : YEAR_LAST.exec(text);
  if (!first && !last) return NaN;
  const [year, a, b, time, zone] = first ? first.slice(1) : [last![3], last![1], last![2], last![4]];
  const [month, day] = first || order === 'month-first' ? [a, b] : [b, a];
  const date = `${year}-${month!.padStart(2, '0')}-${day!.padStart(2, '0')}`;
  const midnight = new Date(`${date}T00:00:00Z`);
  // Date lets 31 February roll over into March.
  if (Number.isNaN(midnight.getTime()) || midnight.toISOString().slice(0, 10) !== date) return NaN;
  return time === undefined ? midnight.getTime() : Date.parse(`${date}T${time}${zone ?? 'Z'}`);
}

/** The order in which all of these cells are dates; null when there is none. */
export function dateOrderOf(cells: readonly string[]): DateOrder | null {
  const filled = cells.filter((cell) => cell.trim() !== '');
  if (filled.length === 0) return null;
  const fits = (order: DateOrder): boolean => filled.every((cell) => !Number.isNaN(parseTime(cell, order)));
  return (['year-first', 'day-first', 'month-first'] as const).find(fits) ?? null;
}

const DAY = 86_400_000;
const MONTH = 365.2425 / 12;
/** Months, as the mean of the calendar has them, from a time to the day of the snapshot. */
export const monthsUntil = (time: number, takenOn: number): number => (takenOn - time) / DAY / MONTH;

/** An id as it is compared: outer spaces off, one Unicode form. */
export const normaliseId = (cell: string): string => cell.trim().normalize('NFC');

/** Why text cannot be an id; null when it can. */
export function whyNotId(id: string, longest: number): string | null {
  if (id === '') return 'The member id is blank.';
  if (id.length > longest) return `The member id is longer than ${longest} characters.`;
  if (id.includes('\0')) return 'The member id holds a NUL character.';
  if (!id.isWellFormed()) return 'The member id holds half a character.';
  return null;
}
