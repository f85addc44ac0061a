import type { CellObject } from "write-excel-file/node";

/** How a cell looks. */
export type CellLook = Pick<
  CellObject,
  "align" | "alignVertical" | "backgroundColor" | "columnSpan" | "fontSize" | "fontWeight" | "wrap"
> & { readonly borderStyle?: "thin" };

/** What a cell holds. Text is never a formula, whatever it begins with. */
export type SheetCell =
  | null
  | { readonly kind: "text"; readonly value: string; readonly look: CellLook }
  | { readonly kind: "number"; readonly value: number; readonly format: string; readonly look: CellLook }
  | { readonly kind: "moment"; readonly value: Date; readonly look: CellLook }
  | {
      readonly kind: "formula";
      readonly formula: string;
      /** What the formula comes to: shown by readers that do not compute. */
      readonly value: number | string;
      readonly format: string;
      readonly look: CellLook;
    };

export function textCell(value: string | null | undefined, look: CellLook = {}): SheetCell {
  return value === null || value === undefined || value === ""
    ? emptyCell(look)
    : { kind: "text", value, look };
}

export function numberCell(
  value: number | null | undefined,
  format = "General",
  look: CellLook = {},
): SheetCell {
  return value === null || value === undefined ? emptyCell(look) : { kind: "number", value, format, look };
}

/** A moment, shown in UTC. */
export function momentCell(iso: string | null | undefined, look: CellLook = {}): SheetCell {
  return iso ? { kind: "moment", value: new Date(iso), look } : emptyCell(look);
}

/** `formula` without its equals sign. */
export function formulaCell(
  formula: string,
  value: number | string,
  format = "General",
  look: CellLook = {},
): SheetCell {
  return { kind: "formula", formula, value, format, look };
}

export const titleCell = (value: string): SheetCell => textCell(value, { fontWeight: "bold", fontSize: 14 });
const heading: CellLook = {
  fontWeight: "bold",
  wrap: true,
  alignVertical: "top",
  backgroundColor: "#E7ECEF",
  borderStyle: "thin",
};
export const headingCell = (value: string): SheetCell => textCell(value, heading);
/** Of a column of numbers. */
export const numberHeadingCell = (value: string): SheetCell =>
  textCell(value, { ...heading, align: "right" });

/** A number format with this many decimals; what rounds to nothing is shown without a sign. */
export function fixed(decimals: number): string {
  const digits = decimals > 0 ? `0.${"0".repeat(decimals)}` : "0";
  const least = `0.${"0".repeat(decimals)}5`;
  return `[>=${least}]${digits};[<=-${least}]-${digits};"${digits}"`;
}

const emptyCell = (look: CellLook): SheetCell =>
  look.borderStyle === undefined && look.backgroundColor === undefined
    ? null
    : { kind: "text", value: "", look };

/** A1, from places counted from 0. */
export function addressOf(row: number, column: number): string {
  return `${columnName(column)}${row + 1}`;
}

export function columnName(column: number): string {
  const rest = Math.floor(column / 26);
  return (rest > 0 ? columnName(rest - 1) : "") + String.fromCharCode(65 + (column % 26));
}
