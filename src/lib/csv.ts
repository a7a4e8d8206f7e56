/**
 * One CSV cell (RFC 4180). Text that a spreadsheet would take for a formula gets a leading apostrophe;
 * numbers never do, so that −2 stays −2.
 */
export function csvCell(value: string | number | boolean | null | undefined): string {
  if (value === null || value === undefined) return '';
  if (typeof value !== 'string') return String(value);
  const safe = /^[=+\-@\t\r]/.test(value) ? `'${value}` : value;
  return /[",\r\n]/.test(safe) ? `"${safe.replaceAll('"', '""')}"` : safe;
}

export const csvLine = (cells: readonly (string | number | boolean | null | undefined)[]): string =>
  `${cells.map(csvCell).join(',')}\r\n`;
