/** What a spreadsheet would take for a formula at the start of a cell. */
const formulaStart = /^[=+\-@\t\r]/;

/**
 * One line of comma-separated text (RFC 4180) without its end. Texts that a spreadsheet would run
 * begin with an apostrophe; numbers stay as they are; null is an empty cell.
 */
export function csvLine(cells: readonly (string | number | boolean | null)[]): string {
  return cells.map(cellText).join(',');
}

function cellText(cell: string | number | boolean | null): string {
  if (cell === null) return '';
  if (typeof cell !== 'string') return String(cell);
  const safe = formulaStart.test(cell) ? `'${cell}` : cell;
  return /[",\r\n]/.test(safe) ? `"${safe.replaceAll('"', '""')}"` : safe;
}
