import { stringify } from 'csv-stringify/sync';

export type CsvCell = string | number | boolean | null;

/**
 * What a spreadsheet takes for a formula, or for the beginning of one once it has cut the cell: such text gets an apostrophe in front, which spreadsheets
 * show as text. Text that begins with apostrophes before such a sign gets one more, so that taking one off always gives what was there.
 */
const dangerous = /^'*[=+\-@\t\r\n＝＋－＠]/u;
const guarded = /^'+[=+\-@\t\r\n＝＋－＠]/u;

/** Makes text safe for spreadsheets. Numbers are never passed through here: -1.5 stays a number. */
export function guardText(text: string): string {
  return dangerous.test(text) ? `'${text}` : text;
}

/** Takes off what {@link guardText} put in front. */
export function unguardText(text: string): string {
  return guarded.test(text) ? text.slice(1) : text;
}

/**
 * Rows as RFC 4180 wants them: commas, CRLF, quotes where needed. Numbers have all their digits, the shortest that read back as the same number; text is
 * guarded; what isn't known is empty.
 */
export function writeCsv(rows: readonly (readonly CsvCell[])[]): string {
  const cells = rows.map((row) => row.map((cell) => (cell === null ? '' : typeof cell === 'string' ? guardText(cell) : String(cell))));
  // Of line breaks the library quotes only the whole CRLF.
  return stringify(cells, { record_delimiter: '\r\n', quoted_match: /[\r\n]/u });
}

/** At the head of a file: without it, spreadsheets read UTF-8 as something else and spoil every accent. Readers of CSV pass over it. */
export const byteOrderMark = '\uFEFF';
