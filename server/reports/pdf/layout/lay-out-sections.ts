import type { Block, Section } from "./blocks.ts";
import { SheetFlow } from "./sheet-flow.ts";
import { placeTable } from "./place-table.ts";
import { legibleLine, legibleText } from "./legible-text.ts";
import type { LaidSheet } from "./placed.ts";
import {
  charactersIn,
  fieldNameWidth,
  gapBeforeHeading,
  headingHeight,
  lineHeight,
  listIndent,
  paragraphGap,
} from "./text-metrics.ts";
import { wrapText } from "../../wrap-text.ts";

/** Gives every block of every section its place, on as many sheets as it takes. */
export function layOutSections(sections: readonly Section[]): LaidSheet[] {
  return sections.flatMap((section) => {
    const flow = new SheetFlow(section);
    for (const block of section.blocks) placeBlock(flow, block);
    return flow.end();
  });
}

/** How much smaller than its own size a figure stands in a column. */
export function figureScale(
  { figure, under }: Extract<Block, { kind: "figure" }>,
  { width, height }: { readonly width: number; readonly height: number },
): number {
  return Math.min(1, width / figure.width, Math.max(height / 2, height - under) / figure.height);
}

function placeBlock(flow: SheetFlow, block: Block): void {
  switch (block.kind) {
    case "break":
      return flow.next();
    case "heading":
      return flow.announce({
        before: gapBeforeHeading,
        height: headingHeight,
        place: (x, y) => ({ kind: "heading", x, y, text: legibleLine(block.text) }),
      });
    case "text":
      return placeLines(flow, block.text, block.tone ?? "ink", null);
    case "list":
      for (const item of block.items) placeLines(flow, item, block.tone ?? "ink", "\u2013");
      return;
    case "fields":
      for (const [name, value] of block.fields) placeField(flow, name, value);
      return flow.skip(paragraphGap);
    case "table":
      return placeTable(flow, block.table);
    case "figure": {
      const { figure } = block;
      const scale = figureScale(block, flow);
      flow.keep(figure.height * scale);
      flow.put(figure.height * scale, (x, y) => ({ kind: "figure", x, y, scale, figure }));
      return flow.skip(paragraphGap);
    }
  }
}

/** A paragraph, or an item of a list; one longer than a column goes on in the next. */
function placeLines(
  flow: SheetFlow,
  text: string,
  tone: "ink" | "muted" | "faint" | "signal",
  mark: string | null,
): void {
  const indent = mark === null ? 0 : listIndent;
  let lines = wrapText(legibleText(text), charactersIn(flow.width - indent));
  let leading = mark;
  flow.keep(Math.min(lines.length, 3) * lineHeight);
  while (lines.length > 0) {
    const room = Math.max(1, Math.floor(flow.left / lineHeight));
    const here = lines.slice(0, room);
    const shown = leading;
    flow.put(here.length * lineHeight, (x, y) => ({
      kind: "lines",
      x: x + indent,
      y,
      lines: here,
      tone,
      mark: shown,
    }));
    lines = lines.slice(room);
    leading = null;
    if (lines.length > 0) flow.next();
  }
  flow.skip(paragraphGap);
}

function placeField(flow: SheetFlow, name: string, value: string): void {
  const lines = wrapText(legibleText(value), charactersIn(flow.width - fieldNameWidth));
  const room = Math.max(1, Math.floor(flow.height / lineHeight));
  for (let from = 0; from < lines.length; from += room) {
    const here = lines.slice(from, from + room);
    flow.keep(here.length * lineHeight);
    flow.put(here.length * lineHeight, (x, y) => ({
      kind: "field",
      x,
      y,
      name: from === 0 ? legibleLine(name) : "",
      lines: here,
    }));
  }
}
