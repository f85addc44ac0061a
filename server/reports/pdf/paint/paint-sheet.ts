import { heading, letterHeights } from "../layout/sheet-geometry.ts";
import { headingHeight, lineHeight, listIndent, fieldNameWidth } from "../layout/text-metrics.ts";
import { legibleText, legibleLine } from "../layout/legible-text.ts";
import type { LaidSheet, Placed } from "../layout/placed.ts";
import type { Canvas } from "./canvas.ts";
import { pointsPerMm } from "./canvas.ts";
import { paintTable } from "./paint-table.ts";
import type { Tags } from "./tags.ts";

/** Everything of a sheet that is its own: its heading and what was placed on it. */
export function paintSheet(canvas: Canvas, tags: Tags, { section, first, items }: LaidSheet): void {
  const title = legibleLine(first ? section : `${section}, continued`);
  const paintTitle = () =>
    canvas.text(title, { x: heading.x, y: heading.baseline }, { height: letterHeights.sheet, weight: 600 });
  if (first) tags.content("H1", paintTitle);
  else tags.artifact(paintTitle, "Pagination");
  for (const item of items) paintItem(canvas, tags, item);
}

function paintItem(canvas: Canvas, tags: Tags, item: Placed): void {
  const baseline = item.y + letterHeights.text + 0.5;
  switch (item.kind) {
    case "heading":
      return tags.content("H2", () =>
        canvas.text(item.text, { x: item.x, y: item.y + headingHeight - 2.4 }, { weight: 600 }),
      );
    case "lines": {
      const { lines, tone, mark, x } = item;
      const paint = () => paintLines(canvas, lines, x, baseline, tone);
      if (mark === null) return tags.content("P", paint);
      return tags.listItem(() => canvas.text(mark, { x: x - listIndent, y: baseline }, { tone }), paint);
    }
    case "field":
      return tags.content("P", () => {
        if (item.name !== "") canvas.text(item.name, { x: item.x, y: baseline }, { tone: "muted" });
        paintLines(canvas, item.lines, item.x + fieldNameWidth, baseline, "ink");
      });
    case "figure": {
      const { figure, x, y, scale } = item;
      const [right, bottom] = [x + figure.width * scale, y + figure.height * scale];
      const bbox = [x * pointsPerMm, y * pointsPerMm, right * pointsPerMm, bottom * pointsPerMm] as const;
      return tags.content(
        "Figure",
        () =>
          canvas.within({ x, y }, scale, () => {
            for (const shape of figure.shapes)
              canvas.shape(shape.kind === "text" ? { ...shape, text: legibleLine(shape.text) } : shape);
          }),
        { alt: legibleText(figure.alternative), bbox },
      );
    }
    case "table":
      return paintTable(canvas, tags, item);
  }
}

function paintLines(
  canvas: Canvas,
  lines: readonly string[],
  x: number,
  baseline: number,
  tone: "ink" | "muted" | "faint" | "signal",
): void {
  lines.forEach((line, index) => {
    if (line !== "") canvas.text(line, { x, y: baseline + index * lineHeight }, { tone });
  });
}
