import type { Cell, Column, FigureTable } from "../../../../shared/figures/figure-table.ts";
import type { Verdict } from "../../../../shared/figures/draw-verdict-mark.ts";
import { textWidth } from "../../../../shared/figures/shape.ts";
import { writeNumber, writeSigned } from "../../../../shared/figures/write-number.ts";
import { legibleLine, legibleText } from "./legible-text.ts";
import { splitColumns } from "./split-columns.ts";
import { wrapText } from "../../wrap-text.ts";

export interface LaidColumn {
  readonly x: number;
  readonly width: number;
  readonly align: "start" | "end";
  readonly head: readonly string[];
  readonly unit: string | null;
}
export interface LaidCell {
  readonly lines: readonly string[];
  /** Drawn as a mark before the word. */
  readonly verdict: Verdict | null;
}
export interface LaidRow {
  readonly cells: readonly LaidCell[];
  readonly lines: number;
  /** Whether it belongs with the row above: its first cell is empty. */
  readonly joined: boolean;
}

/** A table with everything measured, not yet cut into sheets. */
export interface LaidTable {
  readonly caption: string;
  /** Height of its capitals. */
  readonly letters: number;
  readonly columns: readonly LaidColumn[];
  readonly width: number;
  readonly headLines: number;
  readonly hasUnits: boolean;
  readonly rows: readonly LaidRow[];
}

/** From the largest that fits down to the smallest that reads, by ISO 3098. */
const letterChoices = [2.5, 2.2, 2, 1.8] as const;
/** A cell of text is broken into lines from here on, rather than making the letters smaller. */
const longestLine = 48;
const shortestLine = 14;
const hashLength = 64;
/** Room for a verdict's mark, in characters. */
export const markRoom = 2;

/** Room after a column: more where a number at its end meets a text at its start. */
function gapAfter({ columns }: FigureTable, index: number, letters: number): number {
  if (index === columns.length - 1) return 0;
  const meets = columns[index]?.align === "end" && columns[index + 1]?.align === "start";
  return letters * (meets ? 2.2 : 1.3);
}
export const lineHeightOf = (letters: number): number => letters * 1.6;
export const rowHeightOf = (lines: number, letters: number): number => (lines * 1.6 + 0.5) * letters;
export const headHeightOf = ({ headLines, hasUnits, letters }: LaidTable): number =>
  (headLines + (hasUnits ? 1 : 0)) * lineHeightOf(letters) + letters;

/** Measures a table for a width; a table wider than that is parted into several with the same first columns. */
export function layOutTable(table: FigureTable, width: number): LaidTable[] {
  const texts = table.rows.map((row) => row.map(cellText));
  const widest = table.columns.map((column, index) => naturalWidth(column, texts, index));
  const capped = table.columns.map(({ align }, index) => {
    const natural = widest[index] ?? 0;
    return align === "start" ? Math.min(natural, Math.max(longestLine, longestWord(texts, index))) : natural;
  });
  for (const letters of letterChoices) {
    const room = roomFor(table, width, letters);
    if (sum(capped) <= room) return [measure(table, texts, fill(capped, widest, room), letters)];
  }
  const smallest = letterChoices.at(-1) ?? 1.8;
  const room = roomFor(table, width, smallest);
  const squeezed = squeeze(table.columns, capped, room);
  if (squeezed) return [measure(table, texts, squeezed, smallest)];
  const parts = splitColumns(table, capped, Math.floor(width / textWidth("0", smallest)));
  // A table of one or two columns is as narrow as it gets.
  if (parts.length < 2) return [measure(table, texts, capped, smallest)];
  return parts.flatMap((part) => layOutTable(part, width));
}

const sum = (values: readonly number[]): number => values.reduce((total, value) => total + value, 0);

/** Characters that fit beside the gaps between columns. */
function roomFor(table: FigureTable, width: number, letters: number): number {
  const gaps = sum(table.columns.map((_, index) => gapAfter(table, index, letters)));
  return Math.floor((width - gaps) / textWidth("0", letters));
}

/** Long texts take the room that is left over, the longest first. */
function fill(from: readonly number[], wanted: readonly number[], room: number): number[] {
  let left = room - sum(from);
  const widths = [...from];
  for (const index of widths.map((_, index) => index).sort((a, b) => (wanted[b] ?? 0) - (wanted[a] ?? 0))) {
    const more = Math.min(left, (wanted[index] ?? 0) - (from[index] ?? 0));
    widths[index] = (from[index] ?? 0) + more;
    left -= more;
  }
  return widths;
}

/** Shortens the longest columns of text until all fit; null where they would become too short to read. */
function squeeze(columns: readonly Column[], from: readonly number[], room: number): number[] | null {
  for (let cap = longestLine; cap >= shortestLine; cap -= 1) {
    const widths = columns.map(({ align }, index) =>
      align === "start" ? Math.min(from[index] ?? 0, cap) : (from[index] ?? 0),
    );
    if (sum(widths) <= room) return widths;
  }
  return null;
}

function naturalWidth(column: Column, texts: readonly (readonly string[])[], index: number): number {
  return texts.reduce(
    (most, row) => Math.max(most, ...(row[index] ?? "").split("\n").map((line) => line.length)),
    Math.max(headWidth(legibleLine(column.heading)), column.unit?.length ?? 0),
  );
}

/** A hash stays on one line where it can. */
function longestWord(texts: readonly (readonly string[])[], index: number): number {
  return texts.reduce((most, row) => {
    const words = (row[index] ?? "").split(/[ \n]/);
    return Math.max(most, ...words.map((word) => (word.length <= hashLength ? word.length : 0)));
  }, 0);
}

/** The narrowest that a heading stands in on two lines, its longest word whole. */
function headWidth(heading: string): number {
  const longest = heading.split(" ").reduce((most, word) => Math.max(most, word.length), 0);
  let width = Math.min(longest, longestLine);
  while (width < heading.length && width < longestLine && wrapText(heading, width).length > 2) width += 1;
  return width;
}

function measure(
  table: FigureTable,
  texts: readonly (readonly string[])[],
  widths: readonly number[],
  letters: number,
): LaidTable {
  let x = 0;
  let right = 0;
  const columns = table.columns.map(({ heading, unit, align }, index): LaidColumn => {
    const characters = widths[index] ?? 1;
    const width = textWidth("0", letters) * characters;
    const column = { x, width, align, head: wrapText(legibleLine(heading), characters), unit };
    right = x + width;
    x = right + gapAfter(table, index, letters);
    return column;
  });
  return {
    caption: table.caption,
    letters,
    columns,
    width: right,
    headLines: Math.max(...columns.map(({ head }) => head.length)),
    hasUnits: columns.some(({ unit }) => unit !== null),
    rows: table.rows.map((row, rowIndex) => {
      const cells = row.map((cell, index): LaidCell => ({
        lines:
          cell.kind === "verdict"
            ? [cell.verdict]
            : wrapText(texts[rowIndex]?.[index] ?? "", widths[index] ?? 1),
        verdict: cell.kind === "verdict" ? cell.verdict : null,
      }));
      return {
        cells,
        lines: Math.max(1, ...cells.map(({ lines }) => lines.length)),
        joined: rowIndex > 0 && cells[0]?.lines.join("") === "",
      };
    }),
  };
}

/** As it is drawn. A verdict leaves room for its mark, a missing number is a dash. */
function cellText(cell: Cell): string {
  switch (cell.kind) {
    case "text":
      return legibleText(cell.text);
    case "verdict":
      return `${" ".repeat(markRoom)}${cell.verdict}`;
    case "number":
      if (cell.value === null) return "\u2013";
      return cell.signed ? writeSigned(cell.value, cell.decimals) : writeNumber(cell.value, cell.decimals);
  }
}
