import type { Cell } from "./table.ts";

/** Which decimal sign a file uses; null where no number shows it. */
export type Decimal = "point" | "comma" | null;

const point = /^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i;
const comma = /^[+-]?(\d+,\d*|,\d+)(e[+-]?\d+)?$/i;

/**
 * A number as people write it, with a decimal point or comma and nothing between thousands: whether 1.234,5 or 1,234.5
 * was meant is never guessed. Null for what is no number, or not a finite one.
 */
export function readNumber(cell: Cell): number | null {
  if (typeof cell === "number") return Number.isFinite(cell) ? cell : null;
  const text = withPlainMinus(cell ?? "");
  if (!point.test(text) && !comma.test(text)) return null;
  const value = Number(text.replace(",", "."));
  return Number.isFinite(value) ? value : null;
}

/** U+2212 is the minus that typeset tables have. */
const withPlainMinus = (text: string): string => text.replace("\u2212", "-");

/** The decimal signs that the numbers among these cells use: a file that uses both was pieced together, or is misread. */
export function decimalSigns(cells: readonly Cell[]): ReadonlySet<"point" | "comma"> {
  const signs = new Set<"point" | "comma">();
  for (const cell of cells) {
    if (typeof cell !== "string") continue;
    const text = withPlainMinus(cell);
    if (comma.test(text)) signs.add("comma");
    else if (point.test(text) && text.includes(".")) signs.add("point");
  }
  return signs;
}

export function readBoolean(cell: Cell): boolean | null {
  const text = String(cell ?? "").toLowerCase();
  if (["yes", "true", "1", "x"].includes(text)) return true;
  return ["no", "false", "0"].includes(text) ? false : null;
}

/** A moment with its zone: a wall clock's time alone does not say when something was. */
export function readMoment(cell: Cell): string | null {
  const text = String(cell ?? "").replace(" ", "T");
  const isMoment = /^\d{4}-\d\d-\d\dT\d\d:\d\d(:\d\d(\.\d{1,6})?)?(Z|[+-]\d\d:\d\d)$/i.test(text);
  if (!isMoment || Number.isNaN(Date.parse(text))) return null;
  return new Date(text).toISOString();
}
