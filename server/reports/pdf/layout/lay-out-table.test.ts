import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { textWidth } from "../../../../shared/figures/shape.ts";
import {
  numberCell,
  numberColumn,
  signedCell,
  textCell,
  textColumn,
  type FigureTable,
} from "../../../../shared/figures/figure-table.ts";
import { layOutTable, type LaidTable } from "./lay-out-table.ts";
import { splitColumns } from "./split-columns.ts";
import { cutLine, wrapText } from "../../wrap-text.ts";

const words = fc.array(fc.stringMatching(/^[a-z]{1,30}$/), { minLength: 1, maxLength: 20 });

describe("wrapText", () => {
  it("keeps every letter in order, and no line is longer than its room", () => {
    fc.assert(
      fc.property(words, fc.integer({ min: 1, max: 80 }), (sentence, room) => {
        const lines = wrapText(sentence.join(" "), room);
        expect(lines.join("").replaceAll(" ", "")).toBe(sentence.join(""));
        for (const line of lines) expect(line.length).toBeLessThanOrEqual(room);
      }),
    );
  });

  it("ends a line where the text does, and keeps empty ones", () => {
    expect(wrapText("one\n\ntwo three", 20)).toEqual(["one", "", "two three"]);
  });

  it("cuts one line with an ellipsis, inside its room", () => {
    expect(cutLine("alignment", 9)).toBe("alignment");
    expect(cutLine("alignment", 5)).toBe("alig\u2026");
  });
});

const table = (rows: FigureTable["rows"], columns: FigureTable["columns"]): FigureTable => ({
  caption: "A table",
  columns,
  rows,
});
const textsOf = (laid: readonly LaidTable[], column: number): string[] =>
  laid.flatMap(({ rows }) => rows.map(({ cells }) => cells[column]?.lines.join(" ") ?? ""));

describe("layOutTable", () => {
  const long =
    "a reason that goes on for longer than a line of the sheet has room for, and then some more of it";

  it("sets numbers at the end of their column, all with the same decimals, so that points stand under points", () => {
    const [laid] = layOutTable(
      table(
        [
          [textCell("a"), signedCell(-1.23456, 4)],
          [textCell("b"), signedCell(12.5, 4)],
          [textCell("c"), numberCell(null, 4)],
        ],
        [textColumn("station"), numberColumn("h", "mm")],
      ),
      180,
    );
    expect(laid?.columns[1]?.align).toBe("end");
    expect(laid && textsOf([laid], 1)).toEqual(["\u22121.2346", "+12.5000", "\u2013"]);
  });

  it("breaks long text into lines rather than leaving the sheet", () => {
    const [laid] = layOutTable(
      table([[textCell("a"), textCell(long)]], [textColumn("id"), textColumn("reason")]),
      80,
    );
    expect(laid?.rows[0]?.lines).toBeGreaterThan(1);
    expect(laid && textsOf([laid], 1)[0]).toBe(long);
    expect(laid?.width).toBeLessThanOrEqual(80);
  });

  it("never makes a table wider than its room, and loses no cell", () => {
    const cell = fc.oneof(
      fc.stringMatching(/^[a-z]{1,8}( [a-z]{1,12}){0,9}$/).map(textCell),
      fc.double({ min: -1e4, max: 1e4, noNaN: true }).map((value) => signedCell(value, 3)),
    );
    fc.assert(
      fc.property(
        fc.array(fc.array(cell, { minLength: 12, maxLength: 12 }), { minLength: 1, maxLength: 5 }),
        fc.integer({ min: 2, max: 12 }),
        fc.integer({ min: 90, max: 380 }),
        (rows, count, width) => {
          const columns = Array.from({ length: count }, (_, index) =>
            rows[0]?.[index]?.kind === "number" ? numberColumn(`n ${index}`, "mm") : textColumn(`t ${index}`),
          );
          // A column is of one kind: the first row's.
          const kept = rows.map((row) =>
            row
              .slice(0, count)
              .map((one, index) => (one.kind === rows[0]?.[index]?.kind ? one : textCell(""))),
          );
          const laid = layOutTable(table(kept, columns), width);
          for (const part of laid) {
            expect(part.width).toBeLessThanOrEqual(width + 1e-9);
            expect(part.rows).toHaveLength(rows.length);
            for (const row of part.rows)
              row.cells.forEach(({ lines }, index) => {
                for (const line of lines)
                  expect(textWidth(line, part.letters)).toBeLessThanOrEqual(
                    (part.columns[index]?.width ?? 0) + 1e-9,
                  );
              });
          }
          const shown = laid.reduce((total, { columns: some }) => total + some.length, 0);
          expect(shown - (laid.length - 1)).toBe(count);
        },
      ),
      { numRuns: 60 },
    );
  });

  it("takes its letters no smaller than 1.8 mm, which ISO 3098 has as the smallest", () => {
    const many = Array.from({ length: 40 }, (_, index) => numberColumn(`column ${index}`, "mm"));
    const laid = layOutTable(table([many.map((_, index) => numberCell(index * 1000, 4))], many), 184);
    expect(laid.length).toBeGreaterThan(1);
    expect(Math.min(...laid.map(({ letters }) => letters))).toBeGreaterThanOrEqual(1.8);
  });
});

describe("splitColumns", () => {
  it("repeats the first column in every part and keeps an h with its v", () => {
    const columns = [
      numberColumn("part", null),
      ...Array.from({ length: 9 }, (_, index) =>
        ["h", "v"].map((plane) => numberColumn(`foot-${index} ${plane}`, "mm")),
      ).flat(),
    ];
    const parts = splitColumns(
      table([columns.map((_, index) => numberCell(index, 0))], columns),
      columns.map(() => 8),
      60,
    );
    expect(parts.length).toBeGreaterThan(1);
    for (const { columns: some } of parts) {
      expect(some[0]?.heading).toBe("part");
      expect(some.slice(1).map(({ heading }) => heading.slice(-1))).toEqual(
        some.slice(1).map((_, index) => (index % 2 === 0 ? "h" : "v")),
      );
    }
    expect(parts.flatMap(({ columns: some }) => some.slice(1).map(({ heading }) => heading))).toEqual(
      columns.slice(1).map(({ heading }) => heading),
    );
  });
});
