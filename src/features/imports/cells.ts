/**
 * Cells of a row as its header wants them, or why they do not fit. Blank cells beyond the header are no error: many
 * programs end each row with a delimiter.
 */
export function cellsThatFit(cells: string[], columns: number): string[] | string {
  if (cells.length === columns) return cells;
  if (cells.length > columns && cells.slice(columns).every((cell) => cell.trim() === ''))
    return cells.slice(0, columns);
  return `This row has ${cells.length} cells; the header has ${columns}.`;
}
