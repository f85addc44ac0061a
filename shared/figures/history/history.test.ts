import { describe, expect, it } from "vitest";
import { describeHistory } from "./describe-history.ts";
import { drawHistory } from "./draw-history.ts";
import type { HistoryModel } from "./history-model.ts";
import { scaleHistory } from "./scale-history.ts";

const model: HistoryModel = {
  offsetUnit: "mm",
  outages: [
    { title: "First", day: "2022-11-14" },
    { title: "Second", day: "2026-11-14" },
  ],
  stations: [
    {
      id: "brg-1",
      reference: true,
      places: [
        { outage: 0, moment: "found", h: 0, v: 0, verdict: "conforms" },
        { outage: 1, moment: "found", h: 0, v: 0, verdict: "conforms" },
      ],
      drifts: [{ from: 0, to: 1, changed: null }],
    },
    {
      id: "cas-1",
      reference: false,
      places: [
        { outage: 0, moment: "found", h: 0.2, v: -0.4, verdict: "exceeds" },
        { outage: 0, moment: "left", h: 0, v: 0.01, verdict: "conforms" },
        { outage: 1, moment: "found", h: 0.1, v: -0.2, verdict: null },
      ],
      drifts: [{ from: 0, to: 1, changed: true }],
    },
  ],
};

const linesOf = (figure: ReturnType<typeof drawHistory>, pen: string) =>
  figure.shapes.flatMap((shape) => (shape.kind === "line" && shape.pen === pen ? [shape] : []));

describe("drawHistory", () => {
  it("draws a drift that the test shows in the signal pen, low to high, at the scale stated", () => {
    const figure = drawHistory(model, 180);
    const scale = scaleHistory(model, 180);
    const drifts = linesOf(figure, "signal").filter(({ from, to }) => from.y !== to.y);
    expect(drifts).toHaveLength(2);
    const [v, h] = drifts;
    // v fell from +0.01 to −0.2 and h went right from 0 to 0.1: down the sheet is low, up is right.
    expect(Math.abs((v?.to.y ?? 0) - (v?.from.y ?? 0) - 0.21 * scale.perOffset)).toBeLessThan(1e-9); // sheet mm
    expect(Math.abs((h?.to.y ?? 0) - (h?.from.y ?? 0) + 0.1 * scale.perOffset)).toBeLessThan(1e-9); // sheet mm
  });

  it("keeps every shape inside the width, whatever it is", () => {
    for (const width of [80, 130, 180, 400]) {
      const { shapes } = drawHistory(model, width);
      const xs = shapes.flatMap((shape) =>
        shape.kind === "line"
          ? [shape.from.x, shape.to.x]
          : shape.kind === "path"
            ? shape.points.map(({ x }) => x)
            : shape.kind === "text"
              ? [shape.at.x]
              : [shape.centre.x],
      );
      expect(Math.max(...xs)).toBeLessThanOrEqual(width);
      expect(Math.min(...xs)).toBeGreaterThanOrEqual(0);
    }
  });

  it("draws places that are all zero", () => {
    const flat = { ...model, stations: model.stations.slice(0, 1) };
    const { shapes, height } = drawHistory(flat, 180);
    const ys = shapes.flatMap((shape) => (shape.kind === "circle" ? [shape.centre.y] : []));
    expect(ys.length).toBeGreaterThan(0);
    expect([...ys, height].every(Number.isFinite)).toBe(true);
  });
});

describe("describeHistory", () => {
  it("says what drifted, what was not tested and which stations set the axis", () => {
    expect(describeHistory(model)).toBe(
      "2 stations over 2 outages: 1 First, 2022-11-14; 2 Second, 2026-11-14. " +
        "Drifted: cas-1 between outages 1 and 2. 1 drift could not be tested. " +
        "Reference stations, whose own drift is hidden in the axis: brg-1. " +
        "Last known, in mm: brg-1 found at h 0.0000, v 0.0000; cas-1 found at h +0.1000, v \u22120.2000.",
    );
  });
});
