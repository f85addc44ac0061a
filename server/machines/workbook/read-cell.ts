import type { ProblemCode } from "../../../shared/error-codes.ts";
import { limits } from "../../../shared/limits.ts";
import type { OpenedCell } from "../../spreadsheets/open-workbook.ts";
import type { CellKind } from "./layout.ts";
import type { Json } from "./nested.ts";

/** A cell's value, or what is wrong with it; undefined where it is empty. */
export type CellReading =
  { readonly value: Json | undefined } | { readonly code: ProblemCode; readonly detail: string };

export function readCell(cell: OpenedCell, kind: CellKind): CellReading {
  if (cell === null || cell === "") return { value: undefined };
  if (cell instanceof Date) return wrong("Holds a date.");
  switch (kind) {
    case "number":
      return readNumber(cell);
    case "yes_no":
      return readYesNo(cell);
    case "numbers":
      return readNumbers(cell);
    case "list":
      return typeof cell === "boolean" ? wrong("Holds no text.") : { value: partsOf(String(cell)) };
    case "choice":
      return typeof cell === "string" ? { value: cell.trim() } : wrong("Holds no text.");
    // An id that is written in figures is a number to a spreadsheet program.
    case "text":
      return typeof cell === "boolean" ? wrong("Holds no text.") : { value: String(cell) };
  }
}

function readNumber(cell: string | number | boolean): CellReading {
  if (typeof cell === "number") return { value: cell };
  const text = String(cell);
  return wrong(
    /^\s*[+-]?[\d ]*,\d+\s*$/.test(text)
      ? `${quoted(text)} is text with a decimal comma, not a number: enter it as a number.`
      : `${quoted(text)} is not a number.`,
  );
}

function readNumbers(cell: string | number | boolean): CellReading {
  if (typeof cell === "number") return { value: [cell] };
  const parts = partsOf(String(cell));
  const numbers = parts.map((part) => (plainNumber.test(part) ? Number(part) : NaN));
  const at = numbers.findIndex((number) => !Number.isFinite(number));
  return at < 0
    ? { value: numbers }
    : wrong(
        `${quoted(parts[at] ?? "")} is not a number: write a decimal point, and semicolons between numbers.`,
      );
}

const plainNumber = /^[+-]?(\d+(\.\d*)?|\.\d+)(e[+-]?\d+)?$/i;

function readYesNo(cell: string | number | boolean): CellReading {
  if (typeof cell === "boolean") return { value: cell };
  const word = String(cell).trim().toLowerCase();
  if (["yes", "true"].includes(word)) return { value: true };
  if (["no", "false"].includes(word)) return { value: false };
  return { code: "choice_unknown", detail: `${quoted(String(cell))} is neither yes nor no.` };
}

/** One a line; in one line, with semicolons between. A line feed at the end says that a semicolon is part of the text. */
export function partsOf(text: string): string[] {
  if (text.includes("\n")) return text.split(/\r?\n/).filter((part) => part !== "");
  return text
    .split(";")
    .map((part) => part.trim())
    .filter((part) => part !== "");
}

/** The other way: what `partsOf` takes apart to the same. */
export function joinParts(parts: readonly string[]): string {
  const [first = "", ...more] = parts;
  return more.length > 0
    ? parts.join("\n")
    : first.includes(";") || first !== first.trim()
      ? `${first}\n`
      : first;
}

const wrong = (detail: string): CellReading => ({ code: "wrong_type", detail });
const quoted = (text: string): string => `"${text.slice(0, limits.echoedTextLength)}"`;
