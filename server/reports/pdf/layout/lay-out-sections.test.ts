import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { textCell, textColumn } from "../../../../shared/figures/figure-table.ts";
import { headingBlock, listBlock, textBlock, type Block, type Section } from "./blocks.ts";
import { headHeightOf, rowHeightOf } from "./lay-out-table.ts";
import { layOutSections } from "./lay-out-sections.ts";
import type { Placed } from "./placed.ts";
import { area } from "./sheet-geometry.ts";
import { headingHeight, lineHeight } from "./text-metrics.ts";

const sentence = fc.stringMatching(/^[a-z]{1,12}( [a-z]{1,12}){0,200}$/);
const block: fc.Arbitrary<Block> = fc.oneof(
  sentence.map((text) => textBlock(text)),
  fc.array(sentence, { minLength: 1, maxLength: 6 }).map((items) => listBlock(items)),
  fc.constant(headingBlock("A heading")),
  fc.array(fc.tuple(sentence, sentence), { minLength: 1, maxLength: 60 }).map((rows): Block => ({
    kind: "table",
    table: {
      caption: "A table",
      columns: [textColumn("one"), textColumn("two")],
      rows: rows.map(([one, two]) => [textCell(one.slice(0, 20)), textCell(two)]),
    },
  })),
);
const section: fc.Arbitrary<Section> = fc.record({
  title: fc.constant("A part"),
  columns: fc.constantFrom(1 as const, 2 as const),
  blocks: fc.array(block, { minLength: 1, maxLength: 8 }),
});

function bottomOf(item: Placed): number {
  switch (item.kind) {
    case "heading":
      return item.y + headingHeight;
    case "lines":
    case "field":
      return item.y + item.lines.length * lineHeight;
    case "figure":
      return item.y + item.figure.height * item.scale;
    case "table":
      return item.rows.reduce(
        (y, { lines }) => y + rowHeightOf(lines, item.table.letters),
        item.y + headHeightOf(item.table),
      );
  }
}

describe("laying out", () => {
  it("keeps everything inside the frame, nothing over anything else", () => {
    fc.assert(
      fc.property(fc.array(section, { minLength: 1, maxLength: 3 }), (sections) => {
        for (const { items } of layOutSections(sections)) {
          for (const [index, item] of items.entries()) {
            expect(item.y).toBeGreaterThanOrEqual(area.top - 1e-9);
            expect(bottomOf(item)).toBeLessThanOrEqual(area.bottom + 1e-6);
            const next = items[index + 1];
            // What follows stands lower, or at the top of the next column.
            if (next) expect(next.y === area.top || next.y >= bottomOf(item) - 1e-6).toBe(true);
          }
        }
      }),
      { numRuns: 60 },
    );
  });

  it("places every line of every text and every row of every table once, in order", () => {
    fc.assert(
      fc.property(section, (one) => {
        const items = layOutSections([one]).flatMap((sheet) => sheet.items);
        const shown = items
          .flatMap((item) => {
            if (item.kind === "lines") return item.lines;
            if (item.kind === "table")
              return item.rows.flatMap(({ cells }) => cells.flatMap(({ lines }) => lines));
            return [];
          })
          .join("")
          .replaceAll(" ", "");
        const written = one.blocks
          .flatMap((each) => {
            if (each.kind === "text") return [each.text];
            if (each.kind === "list") return each.items;
            if (each.kind !== "table") return [];
            return each.table.rows.flatMap((row) =>
              row.map((cell) => (cell.kind === "text" ? cell.text : "")),
            );
          })
          .join("")
          .replaceAll(" ", "");
        // A row cut between two sheets shows its cells in turns; the letters are the same.
        expect([...shown].sort().join("")).toBe([...written].sort().join(""));
      }),
      { numRuns: 60 },
    );
  });

  it("never leaves a heading at the end of a column", () => {
    fc.assert(
      fc.property(section, ({ blocks, ...rest }) => {
        const closed = { ...rest, blocks: [...blocks, textBlock("end")] };
        for (const { items } of layOutSections([closed])) {
          items.forEach((item, index) => {
            if (item.kind !== "heading") return;
            const next = items[index + 1];
            expect(next && next.y > item.y).toBe(true);
          });
        }
      }),
      { numRuns: 60 },
    );
  });

  it("repeats a table's head on every sheet that it goes on to", () => {
    const rows = Array.from({ length: 150 }, (_, index) => [textCell(`row ${index}`)]);
    const tables = layOutSections([
      {
        title: "A part",
        columns: 1,
        blocks: [{ kind: "table", table: { caption: "Long", columns: [textColumn("name")], rows } }],
      },
    ]).map(({ items }) => items.find((item) => item.kind === "table"));
    expect(tables.length).toBeGreaterThan(2);
    expect(tables.map((one) => one?.continued)).toEqual(tables.map((_, index) => index > 0));
    expect(new Set(tables.map((one) => one?.table)).size).toBe(1);
  });
});
