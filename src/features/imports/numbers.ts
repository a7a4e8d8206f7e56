const PLAIN = /^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i;
const COMMA = /^[+-]?(\d+,?\d*|,\d+)(e[+-]?\d+)?$/i;

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

/** What a cell that is no number was meant to be, for its message. */
export function whyNotNumber(cell: string): string {
  const text = cell.trim().toLowerCase();
  if (/^[+-]?(inf|infinity|∞)$/.test(text)) return 'Infinite values are not accepted.';
  if (text === 'nan') return 'NaN is not a number.';
  if (PLAIN.test(text)) return 'This number is too large.';
  return 'This is not a number.';
}

/** Milliseconds of a date or time in ISO 8601 form, NaN for anything else. */
export function parseTime(cell: string): number {
  const text = cell.trim();
  if (!/^\d{4}-\d{2}-\d{2}([T ]\d{2}:\d{2}(:\d{2}(\.\d+)?)?(Z|[+-]\d{2}:?\d{2})?)?$/.test(text)) return NaN;
  const day = text.slice(0, 10);
  const time = Date.parse(text.length === 10 ? `${day}T00:00:00Z` : text.replace(' ', 'T'));
  // Date.parse lets 31 February roll over into March.
  const exists = new Date(`${day}T00:00:00Z`);
  return Number.isNaN(exists.getTime()) || exists.toISOString().slice(0, 10) !== day ? NaN : time;
}

/** An id as it is compared: outer spaces off, one Unicode form. */
export const normaliseId = (cell: string): string => cell.trim().normalize('NFC');
