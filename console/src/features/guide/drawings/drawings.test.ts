import { describe, expect, it } from "vitest";
import { textWidth, type Figure, type Point, type Shape } from "../../../../../shared/figures/shape.ts";
import { drawColdTarget } from "./draw-cold-target.ts";
import { drawCriteria } from "./draw-criteria.ts";
import { drawCrossSection } from "./draw-cross-section.ts";
import { drawDeviation } from "./draw-deviation.ts";
import { drawForms } from "./draw-forms.ts";
import { drawGuard } from "./draw-guard.ts";
import { drawJobOrder } from "./draw-job-order.ts";
import { drawMachine } from "./draw-machine.ts";
import { drawRoll } from "./draw-roll.ts";
import { drawShimSigns, padChange } from "./draw-shim-signs.ts";

const drawings: readonly (readonly [string, (width: number) => Figure])[] = [
  ["the machine", drawMachine],
  ["the cross-section", drawCrossSection],
  ["the deviation", drawDeviation],
  ["shim signs", drawShimSigns],
  ["roll and indicators", drawRoll],
  ["forms of reading", drawForms],
  ["criteria", drawCriteria],
  ["guarded verdicts", drawGuard],
  ["cold targets", drawColdTarget],
  ["the order of a job", drawJobOrder],
];
/** A phone, a sheet of paper, a wide screen. */
const widths = [80, 172, 320];

/** The corners that a shape reaches. */
function reachOf(shape: Shape): Point[] {
  switch (shape.kind) {
    case "line":
      return [shape.from, shape.to];
    case "path":
      return [...shape.points];
    case "circle":
    case "arc": {
      const { centre, radius } = shape;
      return [
        { x: centre.x - radius, y: centre.y - radius },
        { x: centre.x + radius, y: centre.y + radius },
      ];
    }
    case "text": {
      const width = textWidth(shape.text, shape.height);
      const left = shape.at.x - { start: 0, middle: width / 2, end: width }[shape.anchor];
      return [
        { x: left, y: shape.at.y - shape.height },
        { x: left + width, y: shape.at.y },
      ];
    }
  }
}

describe.each(drawings)("the drawing of %s", (_name, draw) => {
  it.each(widths)("stays on a sheet %d mm wide", (width) => {
    const { shapes, height, width: drawn } = draw(width);
    const slack = 0.01;
    const outside = shapes.filter((shape) =>
      reachOf(shape).some(
        ({ x, y }) => !(x >= -slack && x <= width + slack && y >= -slack && y <= height + slack),
      ),
    );
    expect(drawn).toBe(width);
    expect(outside).toEqual([]);
  });

  it("says in words what it shows, and under what name", () => {
    const { title, alternative } = draw(172);
    expect(title).not.toBe("");
    expect(alternative.length).toBeGreaterThan(80);
  });
});

describe("padChange", () => {
  it("lifts on lower pads at 135 and 225 degrees by cos 45 degrees each (common practice, no source)", () => {
    const wanted = 0.1 * Math.cos(Math.PI / 4);
    for (const clockDeg of [135, 225])
      expect(Math.abs(padChange(clockDeg, { h: 0, v: 0.1 }) - wanted)).toBeLessThan(1e-15); // mm
  });

  it("is thinner on the side that the bore moves to", () => {
    expect(padChange(90, { h: 0.1, v: 0 })).toBeLessThan(0);
    expect(padChange(270, { h: 0.1, v: 0 })).toBeGreaterThan(0);
  });
});
