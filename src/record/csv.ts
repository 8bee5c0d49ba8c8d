/** CSV by RFC 4180 (Shafranovich, 2005): one header, CRLF after every line, quotes doubled. Text is UTF-8. */

/** Null and numbers that are not finite become an empty field. */
export type CsvValue = string | number | null;

/**
 * Spreadsheets run a field that begins like a formula, whoever typed it (OWASP, CSV injection): such text gets an
 * apostrophe in front. Numbers are ours and keep their sign.
 */
const FORMULA_START = /^[=+\-@\t\r]/;
const NEEDS_QUOTES = /[",\r\n]/;

/** One field as it stands in the file. */
export function csvField(value: CsvValue): string {
  if (value === null) return '';
  if (typeof value === 'number') return Number.isFinite(value) ? String(value) : '';
  const text = FORMULA_START.test(value) ? `'${value}` : value;
  return NEEDS_QUOTES.test(text) ? `"${text.replaceAll('"', '""')}"` : text;
}

/**
 * A whole file. Headers name their units, in ASCII (`thickness_nm`), for programs that guess encodings wrong.
 * @throws RangeError where a row is longer or shorter than the header
 */
export function writeCsv(header: readonly string[], rows: Iterable<readonly CsvValue[]>): string {
  const lines = [header.map(csvField).join(',')];
  for (const row of rows) {
    if (row.length !== header.length) {
      throw new RangeError(`Row ${lines.length} has ${row.length} fields, the header ${header.length}.`);
    }
    lines.push(row.map(csvField).join(','));
  }
  return `${lines.join('\r\n')}\r\n`;
}
