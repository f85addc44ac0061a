import { drawVerdictMark } from "../../../../shared/figures/draw-verdict-mark.ts";
import { lettering, textWidth } from "../../../../shared/figures/shape.ts";
import {
  headHeightOf,
  lineHeightOf,
  markRoom,
  rowHeightOf,
  type LaidCell,
  type LaidColumn,
  type LaidRow,
  type LaidTable,
} from "../layout/lay-out-table.ts";
import type { Placed } from "../layout/placed.ts";
import type { Canvas } from "./canvas.ts";
import type { Tags } from "./tags.ts";

/** Below this a ring's line would fill it. */
const smallestMark = 1.05;

type PlacedTable = Extract<Placed, { kind: "table" }>;

/** One sheet's part of a table: head, rules, rows. Where it continues, the head is for the eye alone. */
export function paintTable(canvas: Canvas, tags: Tags, placed: PlacedTable): void {
  const { table, x, rows, continued } = placed;
  const element = tags.table(table);
  const bodyTop = placed.y + headHeightOf(table);
  tags.artifact(() => {
    const right = x + table.width;
    canvas.line({ x, y: placed.y }, { x: right, y: placed.y }, 0.35);
    canvas.line(
      { x, y: bodyTop - table.letters * 0.3 },
      { x: right, y: bodyTop - table.letters * 0.3 },
      0.25,
    );
    let y = bodyTop;
    rows.forEach((row, index) => {
      if (index > 0 && !row.joined) canvas.line({ x, y }, { x: right, y }, 0.13, "faint");
      y += rowHeightOf(row.lines, table.letters);
    });
    canvas.line({ x, y }, { x: right, y }, 0.25);
  });
  if (continued)
    tags.artifact(() => table.columns.forEach((column) => paintHead(canvas, table, column, placed)));
  else {
    const row = tags.row(element);
    for (const column of table.columns)
      tags.cell(row, "TH", "Column", () => paintHead(canvas, table, column, placed));
    row.end();
  }
  let y = bodyTop;
  for (const row of rows) {
    paintRow(canvas, tags, element, table, row, { x, y });
    y += rowHeightOf(row.lines, table.letters);
  }
}

function paintHead(canvas: Canvas, table: LaidTable, column: LaidColumn, { x, y }: PlacedTable): void {
  const { letters, headLines } = table;
  const last = y + letters * 0.4;
  // The words stand on the line above the units, however many lines they take.
  column.head.forEach((line, index) => {
    const down = headLines - column.head.length + index + 1;
    put(canvas, line, column, x, last + down * lineHeightOf(letters) - letters * 0.3, letters);
  });
  if (column.unit !== null) {
    const baseline = last + (headLines + 1) * lineHeightOf(letters) - letters * 0.3;
    put(canvas, column.unit, column, x, baseline, letters, "muted");
  }
}

function paintRow(
  canvas: Canvas,
  tags: Tags,
  element: PDFKit.PDFStructureElement,
  table: LaidTable,
  row: LaidRow,
  at: { readonly x: number; readonly y: number },
): void {
  const structure = tags.row(element);
  row.cells.forEach((cell, index) => {
    const column = table.columns[index];
    if (!column) return;
    const isName = index === 0;
    tags.cell(structure, isName ? "TH" : "TD", isName ? "Row" : null, () =>
      paintCell(canvas, cell, column, table.letters, at),
    );
  });
  structure.end();
}

function paintCell(
  canvas: Canvas,
  { lines, verdict }: LaidCell,
  column: LaidColumn,
  letters: number,
  { x, y }: { readonly x: number; readonly y: number },
): void {
  const first = y + letters * 1.45;
  const shift = verdict === null ? 0 : markRoom * textWidth("0", letters);
  if (verdict !== null) {
    const radius = Math.max(smallestMark, (letters / lettering.height) * 1.15);
    const mark = { x: x + column.x + radius * 1.3, y: first - letters / 2 };
    for (const shape of drawVerdictMark(verdict, mark, radius)) canvas.shape(shape);
  }
  const tone = verdict === null || verdict === "conforms" ? "ink" : "signal";
  lines.forEach((line, index) => {
    put(canvas, line, column, x + shift, first + index * lineHeightOf(letters), letters, tone);
  });
}

function put(
  canvas: Canvas,
  line: string,
  column: LaidColumn,
  x: number,
  baseline: number,
  height: number,
  tone: "ink" | "muted" | "signal" = "ink",
): void {
  if (line === "") return;
  const isEnd = column.align === "end";
  canvas.text(
    line,
    { x: x + column.x + (isEnd ? column.width : 0), y: baseline },
    { height, tone, anchor: isEnd ? "end" : "start" },
  );
}
