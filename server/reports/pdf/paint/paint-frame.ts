import { textWidth } from "../../../../shared/figures/shape.ts";
import type { JobRecord } from "../../../../shared/schemas/jobs.ts";
import { draftMark, type ReportContext } from "../../report-format.ts";
import { signatureWords } from "../../report-words.ts";
import { legibleLine } from "../layout/legible-text.ts";
import { frame, recordBlock, sheetSize, titleBlock } from "../layout/sheet-geometry.ts";
import { cutLine } from "../../wrap-text.ts";
import type { Canvas } from "./canvas.ts";
import { drawProjectionSymbol } from "./projection-symbol.ts";
import { recordLines, titleCells, titleRowHeight } from "./title-fields.ts";

const nameHeight = 1.8;
const padding = 1.8;
/** Heights that the value of a field is tried in before it is cut. */
const valueHeights = [2.5, 2.2, 1.8] as const;
/** Zones of ISO 5457: 50 mm each from the middle of the sheet, numbers across and letters down, without I and O. */
const zone = 50;
const zoneLetters = "ABCDEFGH";

/** Border, zones, title block and record block of a sheet: all but what says whether it is signed. */
export function paintFrame(
  canvas: Canvas,
  record: JobRecord,
  context: ReportContext,
  place: { readonly sheet: number; readonly sheets: number },
): void {
  canvas.rectangle(frame.left, frame.top, frame.right, frame.bottom, 0.7);
  paintZones(canvas);
  canvas.line({ x: frame.left, y: titleBlock.top }, { x: frame.right, y: titleBlock.top }, 0.5);
  canvas.line({ x: titleBlock.left, y: titleBlock.top }, { x: titleBlock.left, y: titleBlock.bottom }, 0.5);
  for (const cell of titleCells(record, place)) {
    const left = titleBlock.left + cell.x;
    const top = titleBlock.top + cell.y;
    if (cell.x > 0) canvas.line({ x: left, y: top }, { x: left, y: top + titleRowHeight }, 0.25);
    if (cell.x === 0 && cell.y > 0) canvas.line({ x: left, y: top }, { x: titleBlock.right, y: top }, 0.25);
    canvas.text(cell.name, { x: left + padding, y: top + 3.1 }, { height: nameHeight, tone: "muted" });
    paintFitted(canvas, cell.value, { x: left + padding, y: top + 7.4 }, cell.width - 2 * padding, {
      tone: cell.isOpen ? "signal" : "ink",
      weight: cell.isOpen ? 600 : 400,
    });
  }
  recordLines(record, context).forEach((line, index) => {
    paintFitted(
      canvas,
      line,
      { x: recordBlock.left + 5, y: recordBlock.top + 17.5 + index * 4.6 },
      recordBlock.right - recordBlock.left - 10,
      { heights: [2, 1.8], tone: "muted" },
    );
  });
  drawProjectionSymbol(canvas, { x: recordBlock.right - 26, y: recordBlock.top + 8 });
}

/** What the state of a sheet is, in letters that cannot be overlooked. */
export function paintState(canvas: Canvas, record: JobRecord): void {
  const at = { x: recordBlock.left + 5, y: recordBlock.top + 10 };
  if (record.signature) {
    const room = recordBlock.right - recordBlock.left - 45;
    paintFitted(canvas, signatureWords(record), at, room, { heights: [3.5, 2.5, 1.8], weight: 600 });
    return;
  }
  const height = 5;
  const width = textWidth(draftMark, height);
  canvas.rectangle(at.x, at.y - height - 2, at.x + width + 6, at.y + 2.4, 0.7, "signal");
  canvas.text(draftMark, { x: at.x + 3, y: at.y }, { height, tone: "signal", weight: 600 });
}

/** A line in the largest letters that fit; where the smallest do not, its end is cut. */
function paintFitted(
  canvas: Canvas,
  value: string,
  at: { readonly x: number; readonly y: number },
  room: number,
  {
    heights = valueHeights,
    tone = "ink",
    weight = 400,
  }: {
    readonly heights?: readonly number[];
    readonly tone?: "ink" | "muted" | "signal";
    readonly weight?: 400 | 600;
  },
): void {
  const text = legibleLine(value);
  const smallest = heights.at(-1) ?? nameHeight;
  const height = heights.find((one) => textWidth(text, one) <= room) ?? smallest;
  canvas.text(cutLine(text, room / textWidth("0", height)), at, { height, tone, weight });
}

function paintZones(canvas: Canvas): void {
  const middle = { x: sheetSize.width / 2, y: sheetSize.height / 2 };
  const outer = {
    left: frame.left - 5,
    top: frame.top - 5,
    right: frame.right + 5,
    bottom: frame.bottom + 5,
  };
  canvas.rectangle(outer.left, outer.top, outer.right, outer.bottom, 0.25, "muted");
  const letter = { height: 2.5, tone: "muted", anchor: "middle" } as const;
  for (let index = 0; index < 8; index += 1) {
    const from = Math.max(frame.left, middle.x + (index - 4) * zone);
    const to = Math.min(frame.right, middle.x + (index - 3) * zone);
    const x = (from + to) / 2;
    for (const [y, baseline] of [
      [outer.top, outer.top + 3.8],
      [frame.bottom, frame.bottom + 3.8],
    ] as const) {
      if (index > 0) canvas.line({ x: from, y }, { x: from, y: y + 5 }, 0.25, "muted");
      canvas.text(String(index + 1), { x, y: baseline }, letter);
    }
  }
  for (let index = 0; index < 6; index += 1) {
    const from = Math.max(frame.top, middle.y + (index - 3) * zone);
    const to = Math.min(frame.bottom, middle.y + (index - 2) * zone);
    for (const x of [outer.left, frame.right]) {
      if (index > 0) canvas.line({ x, y: from }, { x: x + 5, y: from }, 0.25, "muted");
      canvas.text(zoneLetters[index] ?? "", { x: x + 2.5, y: (from + to) / 2 + 1.25 }, letter);
    }
  }
}
