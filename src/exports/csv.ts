/** Rows to a CSV text: RFC 4180, safe against formula injection, numbers untouched. */

/** A cell that starts with one of these is run as a formula by spreadsheets. Source: OWASP CSV Injection; CWE-1236 (list from memory). */
const FORMULA = /^[=+\-@\t\r\0＝＋－＠]/;

/** A text with a leading apostrophe where a spreadsheet would run it. A text that is a finite number ("-0.0123") is data and stays as it is. */
export function harmless(text: string): string {
  const isNumber = text.trim() !== '' && Number.isFinite(Number(text));
  return FORMULA.test(text) && !isNumber ? `'${text}` : text;
}

/** One text field: made harmless, and quoted where RFC 4180 asks. */
export function textField(text: string): string {
  const safe = harmless(text);
  return /[",\r\n]/.test(safe) || safe !== safe.trim() ? `"${safe.replaceAll('"', '""')}"` : safe;
}

/** A comment of one line: the mark alone in the first field, so that commas and quotation marks in the text leave the line a comment. */
export const commentRow = (text: string): readonly string[] => ['#', textField(text.replace(/\s+/g, ' ').trim())];

/** Records joined by CRLF, the last ended too. Source: RFC 4180 section 2 (from memory). */
export const csvText = (rows: readonly (readonly string[])[]): string => rows.map((row) => `${row.join(',')}\r\n`).join('');
