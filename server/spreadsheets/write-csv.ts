/**
 * A table as RFC 4180: CRLF after every row, a point for decimals, numbers in full. Text that a spreadsheet program
 * would take for a formula gets an apostrophe before it, numbers never; a text that has one keeps it, so that a table
 * read and written again is the same bytes.
 */
export function writeCsv(rows: readonly (readonly (string | number | null)[])[]): string {
  return rows.map((row) => `${row.map(writeField).join(",")}\r\n`).join("");
}

function writeField(value: string | number | null): string {
  if (value === null) return "";
  if (typeof value === "number") return String(value);
  const text = beginsFormula(value) ? `'${value}` : value;
  return /[",\r\n]/.test(text) || text !== text.trim() ? `"${text.replaceAll('"', '""')}"` : text;
}

/** OWASP, "CSV injection". A number begins with a minus too, and is none. */
function beginsFormula(text: string): boolean {
  return /^[=+\-@\t\r]/.test(text) && !/^-?\d+(\.\d+)?(e[+-]?\d+)?$/i.test(text);
}
