import { describe, expect, it } from "vitest";
import { addReadingsRequest } from "../../../../../shared/schemas/job-entries.ts";
import { bodyOf, emptyDraft, filledRows, pasteRows, type ReadingDraft } from "./reading-draft.ts";

const at = "2026-11-04T07:40";
const draft = (overrides: Partial<ReadingDraft>): ReadingDraft => ({
  ...emptyDraft("brg-1", at),
  ...overrides,
});
const rows = (overrides: Partial<ReadingDraft["rows"]>) => ({
  rows: { ...emptyDraft("brg-1", at).rows, ...overrides },
});

describe("a reading as typed", () => {
  it("is the body that the service takes, decimal commas and all", () => {
    const typed = draft({
      person: " Ines Alder ",
      gaugeSag: "0,02",
      ...rows({
        turned_gauge: [
          ["0", "0,12"],
          ["90", "0.05"],
          ["180", "\u22120,1"],
          ["270", ""],
        ],
      }),
    });
    const { readings } = addReadingsRequest.parse(bodyOf(typed));
    expect(readings).toEqual([
      {
        station: "brg-1",
        takenAt: new Date(at).toISOString(),
        person: "Ines Alder",
        upperHalf: "on",
        form: "turned_gauge",
        sense: "larger_is_farther",
        zero: "nominal",
        gaugeSag: 0.02,
        readings: [
          { clockDeg: 0, reading: 0.12 },
          { clockDeg: 90, reading: 0.05 },
          { clockDeg: 180, reading: -0.1 },
        ],
      },
    ]);
  });

  it("takes points and a wire without a top", () => {
    const points = bodyOf(
      draft({
        form: "points",
        ...rows({
          points: [
            ["1", "2"],
            ["3", "4,5"],
          ],
        }),
      }),
    );
    expect(addReadingsRequest.parse(points).readings[0]).toMatchObject({
      points: [
        { h: 1, v: 2 },
        { h: 3, v: 4.5 },
      ],
    });
    const wire = bodyOf(
      draft({ form: "wire", wireDiameter: "0,5", ...rows({ wire: [["179,9", "180,1", "180", ""]] }) }),
    );
    expect(addReadingsRequest.parse(wire).readings[0]).toMatchObject({
      wire: { left: 179.9, right: 180.1, bottom: 180, measuredTo: "surface", wireDiameter: 0.5 },
    });
  });

  it("leaves what is no number for the schema to refuse, at its cell", () => {
    const typed = draft(
      rows({
        turned_gauge: [
          ["0", "0,12"],
          ["90", "1.2,3"],
        ],
      }),
    );
    const [issue] = addReadingsRequest.safeParse(bodyOf(typed)).error?.issues ?? [];
    expect(issue?.path).toEqual(["readings", 0, "readings", 1, "reading"]);
  });

  it("does not take a clock angle by itself for a reading", () => {
    expect(filledRows(emptyDraft("brg-1", at))).toEqual([]);
  });
});

describe("pasteRows", () => {
  it("fills cells from a spreadsheet's copy and adds rows", () => {
    const before = [
      ["0", ""],
      ["90", ""],
    ];
    expect(
      pasteRows("turned_gauge", before, { row: 1, column: 0 }, "90\t0,1\r\n180\t0,2\textra\r\n"),
    ).toEqual([
      ["0", ""],
      ["90", "0,1"],
      ["180", "0,2"],
    ]);
    expect(before).toEqual([
      ["0", ""],
      ["90", ""],
    ]);
  });

  it("fills one column downward", () => {
    expect(
      pasteRows(
        "turned_gauge",
        [
          ["0", ""],
          ["90", ""],
        ],
        { row: 0, column: 1 },
        "0,1\n0,2",
      ),
    ).toEqual([
      ["0", "0,1"],
      ["90", "0,2"],
    ]);
  });
});
