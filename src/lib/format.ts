/** How Thrum writes numbers, dates and chances. The locale is fixed so that server and browser agree. */

const LOCALE = 'en-GB';
/** A true minus sign (U+2212), as wide as the plus. */
export const MINUS = '\u2212';

const trueMinus = (text: string) => text.replace(/^-/, MINUS);

/** 1264 → "1,264"; with `digits`, exactly that many decimals; null and non-finite values → "–". */
export function formatNumber(value: number | null | undefined, digits?: number): string {
  if (value == null || !Number.isFinite(value)) return '–';
  const rounded = new Intl.NumberFormat(
    LOCALE,
    digits === undefined
      ? { maximumFractionDigits: 2 }
      : { minimumFractionDigits: digits, maximumFractionDigits: digits },
  ).format(value);
  return /^-0(\.0*)?$/.test(rounded) ? rounded.slice(1) : trueMinus(rounded);
}

/** A departure always carries its sign: 1.42 → "+1.42", -1.5 → "−1.50", 0 → "0.00". */
export function formatDeparture(value: number | null | undefined, digits = 2): string {
  const text = formatNumber(value, digits);
  return value != null && value > 0 && !/^0(\.0*)?$/.test(text) ? `+${text}` : text;
}

/** A share between 0 and 1 → "63%". */
export function formatPercent(share: number | null | undefined, digits = 0): string {
  if (share == null || !Number.isFinite(share)) return '–';
  return `${formatNumber(share * 100, digits)}%`;
}

/** A chance between 0 and 1, never written as certain: 0.004 → "under 1%", 0.997 → "over 99%". */
export function formatChance(chance: number | null | undefined): string {
  if (chance == null || !Number.isFinite(chance)) return '–';
  if (chance < 0.01) return 'under 1%';
  if (chance > 0.99) return 'over 99%';
  return formatPercent(chance);
}

export type DateStyle = 'day' | 'short' | 'long' | 'time';

const DATE_STYLES: Record<DateStyle, Intl.DateTimeFormatOptions> = {
  day: { day: 'numeric', month: 'short', year: 'numeric' },
  short: { day: 'numeric', month: 'short' },
  long: { day: 'numeric', month: 'long', year: 'numeric' },
  time: { day: 'numeric', month: 'short', hour: '2-digit', minute: '2-digit' },
};

/** ISO text or Date → "28 Nov 2026" (`day`), "28 Nov" (`short`), "28 November 2026" (`long`), "28 Nov, 14:02" (`time`), in UTC. */
export function formatDate(value: string | Date | null | undefined, style: DateStyle = 'day'): string {
  if (value == null) return '–';
  const date = value instanceof Date ? value : new Date(value);
  if (Number.isNaN(date.getTime())) return '–';
  // ICU writes "Sept" for en-GB; every other short month has three letters.
  return new Intl.DateTimeFormat(LOCALE, { ...DATE_STYLES[style], timeZone: 'UTC' })
    .format(date)
    .replace(/\bSept\b/, 'Sep');
}

/** Time since, in words: "now", "40 min ago", "3 h ago", "yesterday", then the date. */
export function formatAgo(value: string | Date | null | undefined, now: Date = new Date()): string {
  if (value == null) return '–';
  const date = value instanceof Date ? value : new Date(value);
  const minutes = Math.floor((now.getTime() - date.getTime()) / 60_000);
  if (Number.isNaN(minutes)) return '–';
  if (minutes < 1) return 'now';
  if (minutes < 60) return `${minutes} min ago`;
  if (minutes < 24 * 60) return `${Math.floor(minutes / 60)} h ago`;
  if (minutes < 48 * 60) return 'yesterday';
  return formatDate(date, date.getUTCFullYear() === now.getUTCFullYear() ? 'short' : 'day');
}

/** 1 → "1 member", 1264 → "1,264 members"; an irregular plural can be given. */
export function formatCount(count: number, singular: string, plural = `${singular}s`): string {
  return `${formatNumber(count)} ${count === 1 ? singular : plural}`;
}

/** "Orla Tennant-Rye" → "OT". */
export function initialsOf(name: string): string {
  const words = name.trim().split(/\s+/).filter(Boolean);
  const first = words[0]?.[0] ?? '?';
  const last = words.length > 1 ? (words[words.length - 1]?.[0] ?? '') : '';
  return (first + last).toUpperCase();
}
