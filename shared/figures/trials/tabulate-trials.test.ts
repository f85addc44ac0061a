import { describe, expect, it } from "vitest";
import type { MonteCarloFigure } from "../../schemas/monte-carlo.ts";
import type { Cell } from "../figure-table.ts";
import { tabulateTrials } from "./tabulate-trials.ts";

const units = { axial: "in", bore: "in", offset: "mil" } as const;

const figure = (mean: number, rest: Partial<MonteCarloFigure> = {}): MonteCarloFigure => ({
  mean,
  standardUncertainty: 0.5,
  interval: [mean - 1, mean + 1],
  significantDigits: 1,
  tolerance: 0.05,
  difference: null,
  sampling: null,
  confirmed: true,
  ...rest,
});

const valuesOf = (cells: readonly Cell[]) =>
  cells.map((cell) =>
    cell.kind === "number" ? cell.value : cell.kind === "text" ? cell.text : cell.verdict,
  );

const near = (value: number): unknown => expect.closeTo(value, 9);

describe("the table of trials", () => {
  it("stands only where trials were asked for", () => {
    expect(tabulateTrials([{ id: "brg-1" }], units, "bore")).toBe(null);
  });

  it("tells each figure in offset units, a diameter too, and in words whether its interval stands", () => {
    const monteCarlo = {
      trials: 100_000,
      failed: 2,
      h: figure(3, { confirmed: false }),
      v: figure(-4, { confirmed: null, interval: null }),
      diameter: figure(14, { interval: [13.999, 14.001] }),
    };
    const table = tabulateTrials([{ id: "brg-1", monteCarlo }, { id: "brg-2" }], units, "bore");
    expect(table?.rows.map(valuesOf)).toEqual([
      ["brg-1", "h", 3, 0.5, 2, 4, "refuted", 100_000, 2],
      ["brg-1", "v", -4, 0.5, null, null, "left open", 100_000, 2],
      ["brg-1", "diameter", near(14_000), 0.5, near(13_999), near(14_001), "confirmed", 100_000, 2],
    ]);
  });

  it("leaves out what no uncertainty is known of", () => {
    const monteCarlo = { trials: 1000, failed: 0, h: null, v: figure(1) };
    const table = tabulateTrials([{ id: "cas-1", monteCarlo }], units, "station");
    expect(table?.rows.map((row) => valuesOf(row)[1])).toEqual(["v"]);
    expect(table?.columns[0]?.heading).toBe("station");
  });
});
