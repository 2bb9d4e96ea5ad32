/**
 * Rows as CSV (RFC 4180). A cell that a spreadsheet would take for a formula (= + - @ tab or return first) is led by an
 * apostrophe, unless it is a plain number.
 */
export function toCsv(rows: readonly (readonly (string | number | null)[])[]): string {
  return rows.map((row) => row.map(cell).join(',')).join('\r\n') + '\r\n';
}

function cell(value: string | number | null): string {
  if (value === null) return '';
  if (typeof value === 'number') return String(value);
  const isNumber = /^-?\d+(\.\d+)?$/.test(value);
  const safe = !isNumber && /^[=+\-@\t\r]/.test(value) ? `'${value}` : value;
  return /[",\r\n]/.test(safe) ? `"${safe.replaceAll('"', '""')}"` : safe;
}

/** Hands a text to the browser as a file. The byte-order mark tells spreadsheets that it is UTF-8. */
export function downloadCsv(name: string, text: string): void {
  const url = URL.createObjectURL(new Blob(['\ufeff', text], { type: 'text/csv;charset=utf-8' }));
  const link = document.createElement('a');
  link.href = url;
  link.download = name;
  link.click();
  setTimeout(() => URL.revokeObjectURL(url), 1000);
}

/**
 * Cells of a CSV text (RFC 4180: quotes, doubled quotes, line ends of either kind), without its byte-order mark and
 * without empty lines; null when it has more than `maxRows` rows, found out before any more is read.
 */
export function parseCsv(text: string, maxRows: number): string[][] | null {
  const rows: string[][] = [];
  let row: string[] = [];
  // A cell is quoted, or runs to the next comma or line end; what stands between is read in one piece.
  const cells = /(?:"((?:[^"]|"")*)"|([^,\r\n]*))(,|\r\n|\n|\r|$)/gy;
  cells.lastIndex = text.startsWith('\ufeff') ? 1 : 0;
  for (let match = cells.exec(text); match !== null; match = cells.exec(text)) {
    const [, quoted, plain = '', end] = match;
    row.push((quoted === undefined ? plain : quoted.replaceAll('""', '"')).trim());
    if (end === ',') continue;
    if (row.some((value) => value !== '')) rows.push(row);
    if (rows.length > maxRows) return null;
    row = [];
    if (cells.lastIndex >= text.length) break;
  }
  return rows;
}
