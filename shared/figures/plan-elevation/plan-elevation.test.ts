import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { textWidth, type Point, type Shape } from "../shape.ts";
import { describePlanElevation } from "./describe-plan-elevation.ts";
import { drawPlanElevation } from "./draw-plan-elevation.ts";
import type { PlanElevationModel } from "./plan-elevation-model.ts";
import { scalePlanElevation } from "./scale-plan-elevation.ts";
import { tabulatePlanElevation } from "./tabulate-plan-elevation.ts";

type Verdict = PlanElevationModel["surveys"][number]["stations"][number]["verdict"];

function modelOf(
  places: readonly { id: string; z: number; h: number; v: number; verdict?: Verdict }[],
  changes: Partial<PlanElevationModel> = {},
): PlanElevationModel {
  return {
    axialUnit: "mm",
    offsetUnit: "mm",
    axisWords: "line of sight",
    zero: "axis",
    stations: places.map(({ id, z }, index) => ({
      id,
      z,
      reference: index === 0,
      target: { h: 0, v: 0 },
      allowed: { h: [-0.1, 0.1], v: [-0.1, 0.1] },
    })),
    surveys: [
      {
        name: "measured",
        stations: places.map(({ id, h, v, verdict = "conforms" }) => ({
          id,
          deviation: { h, v },
          radial: Math.hypot(h, v),
          uncertainty: { h: 0.02, v: 0.03 },
          verdict,
        })),
      },
    ],
    ...changes,
  };
}

const places = [
  { id: "brg-1", z: 0, h: 0, v: 0 },
  { id: "cas-1", z: 1000, h: 0.1, v: 0.2, verdict: "exceeds" as const },
  { id: "brg-2", z: 4000, h: -0.05, v: -0.1, verdict: "undecided" as const },
];
const model = modelOf(places);

describe("the scale of plan and elevation", () => {
  const scale = scalePlanElevation(model, 200);

  it("sets stations along z in proportion", () => {
    const [first, second, third] = model.stations.map(({ z }) => scale.placeX(z)) as [number, number, number];
    expect(Math.abs((second - first) / (third - first) - 0.25)).toBeLessThan(1e-12);
  });

  it("has up as high in elevation, and down as right in plan", () => {
    expect(scale.elevation.placeY(0.1)).toBeLessThan(scale.elevation.placeY(0));
    expect(scale.plan.placeY(0.1)).toBeGreaterThan(scale.plan.placeY(0));
  });

  it("magnifies both planes alike, by what it states", () => {
    const perOffset = scale.plan.placeY(1) - scale.plan.placeY(0);
    expect(Math.abs(scale.elevation.placeY(0) - scale.elevation.placeY(1) - perOffset)).toBeLessThan(1e-9); // mm
    const perZ = scale.placeX(1) - scale.placeX(0);
    expect(Math.abs(scale.exaggeration / (perOffset / perZ) - 1)).toBeLessThan(1e-9);
  });

  it("states the same magnification when the offsets come in mil and z in inches", () => {
    const places25 = places.map((place) => ({
      ...place,
      z: place.z / 25.4,
      h: place.h / 0.0254,
      v: place.v / 0.0254,
    }));
    const inches = modelOf(places25, { axialUnit: "in", offsetUnit: "mil" });
    const scaled = modelOf(places25, { axialUnit: "in", offsetUnit: "mil" }).stations.map((station) => ({
      ...station,
      allowed: { h: [-0.1 / 0.0254, 0.1 / 0.0254] as const, v: [-0.1 / 0.0254, 0.1 / 0.0254] as const },
    }));
    const surveys = inches.surveys.map((survey) => ({
      ...survey,
      stations: survey.stations.map((station) => ({
        ...station,
        uncertainty: { h: 0.02 / 0.0254, v: 0.03 / 0.0254 },
      })),
    }));
    const other = scalePlanElevation({ ...inches, stations: scaled, surveys }, 200);
    // Tick labels are as wide as their digits, so the strips differ a little in length.
    const perZ = (other.placeX(1) - other.placeX(0)) / 25.4;
    const perOffset = (other.plan.placeY(1) - other.plan.placeY(0)) / 0.0254;
    expect(Math.abs(other.exaggeration / (perOffset / perZ) - 1)).toBeLessThan(1e-9);
  });

  it("gives names rows in which none touches another", () => {
    const station = fc.record({
      z: fc.double({ min: 0, max: 5000, noNaN: true }),
      letters: fc.integer({ min: 1, max: 12 }),
    });
    fc.assert(
      fc.property(
        fc.array(station, { minLength: 2, maxLength: 25 }),
        fc.integer({ min: 80, max: 400 }),
        (stations, width) => {
          const crowded = modelOf(
            stations.map(({ z, letters }) => ({ id: "x".repeat(letters), z, h: 0, v: 0 })),
          );
          const { placeX, labelRows } = scalePlanElevation(crowded, width);
          const spans = crowded.stations.map(({ id, z }, index) => {
            const half = textWidth(id) / 2;
            const middle = Math.max(half, Math.min(width - half, placeX(z)));
            return { row: labelRows[index] ?? -1, from: middle - half, to: middle + half };
          });
          spans.forEach((one, index) => {
            for (const other of spans.slice(index + 1)) {
              if (one.row === other.row) expect(one.to <= other.from || other.to <= one.from).toBe(true);
            }
          });
        },
      ),
    );
  });
});

const pointsOf = (shape: Shape): readonly Point[] =>
  shape.kind === "line"
    ? [shape.from, shape.to]
    : shape.kind === "path"
      ? shape.points
      : shape.kind === "text"
        ? [shape.at]
        : [shape.centre];

describe("the drawing of plan and elevation", () => {
  const scale = scalePlanElevation(model, 200);
  const figure = drawPlanElevation(model, 200);

  it("has a bar as long as the uncertainty at each station in both planes", () => {
    for (const { id, deviation, uncertainty } of model.surveys[0]?.stations ?? []) {
      const x = scale.placeX(model.stations.find((station) => station.id === id)?.z ?? NaN);
      for (const strip of [scale.elevation, scale.plan]) {
        const [low, high] = [-1, 1].map((side) =>
          strip.placeY(deviation[strip.plane] + side * (uncertainty?.[strip.plane] ?? NaN)),
        ) as [number, number];
        const bars = figure.shapes.filter(
          (shape) =>
            shape.kind === "line" &&
            shape.from.x === x &&
            shape.to.x === x &&
            Math.abs(shape.from.y - low) < 1e-9 &&
            Math.abs(shape.to.y - high) < 1e-9,
        );
        expect(bars).toHaveLength(1);
      }
    }
  });

  it("has a gate as high as the tolerance about each target", () => {
    const gates = figure.shapes.filter((shape) => shape.kind === "path" && shape.fill === "shade");
    const [low, high] = [scale.plan.placeY(-0.1), scale.plan.placeY(0.1)];
    const inPlan = gates.filter((shape) => {
      const ys = pointsOf(shape).map(({ y }) => y);
      return Math.abs(Math.min(...ys) - low) < 1e-9 && Math.abs(Math.max(...ys) - high) < 1e-9;
    });
    expect(inPlan).toHaveLength(places.length);
  });

  it("draws a state that was replaced in dashes, under the one that replaced it", () => {
    const [survey] = model.surveys;
    if (!survey) throw new Error("The model has a survey.");
    const two = {
      ...model,
      surveys: [
        { ...survey, name: "as found" },
        { ...survey, name: "as left" },
      ],
    };
    const pens = drawPlanElevation(two, 200).shapes.flatMap((shape) =>
      shape.kind === "path" && !shape.closed && shape.points.length === places.length ? [shape.pen] : [],
    );
    expect(pens).toEqual(["dashed", "narrow", "dashed", "narrow"]);
  });

  it("stays on its sheet, whatever the stations and the room", () => {
    const offset = fc.double({ min: -100, max: 100, noNaN: true });
    const station = fc.record({ z: fc.double({ min: -5e4, max: 5e4, noNaN: true }), h: offset, v: offset });
    fc.assert(
      fc.property(
        fc.array(station, { minLength: 1, maxLength: 20 }),
        fc.integer({ min: 80, max: 400 }),
        (stations, width) => {
          const drawn = drawPlanElevation(
            modelOf(stations.map((one, index) => ({ id: `s-${index}`, ...one }))),
            width,
          );
          for (const { x, y } of drawn.shapes.flatMap(pointsOf)) {
            expect(x).toBeGreaterThanOrEqual(-1e-9);
            expect(x).toBeLessThanOrEqual(drawn.width + 1e-9);
            expect(y).toBeGreaterThanOrEqual(-1e-9);
            expect(y).toBeLessThanOrEqual(drawn.height + 1e-9);
          }
        },
      ),
      { numRuns: 40 },
    );
  });

  it("names a dot in its key only where one is drawn", () => {
    const words = (drawn: PlanElevationModel) =>
      drawPlanElevation(drawn, 200).shapes.flatMap((shape) => (shape.kind === "text" ? [shape.text] : []));
    expect(words(model)).not.toContain("not judged");
    expect(words(modelOf([{ id: "a", z: 0, h: 0, v: 0, verdict: null }]))).toContain("not judged");
  });
});

describe("the words and the table of plan and elevation", () => {
  it("say what the drawing shows", () => {
    expect(describePlanElevation(model)).toBe(
      "Plan and elevation of 3 stations relative to the line of sight. Reference stations: brg-1. " +
        "Measured: 1 conform, 1 undecided (brg-2), 1 exceed (cas-1). " +
        "Largest deviation 0.2236 mm at cas-1: h +0.1000, v +0.2000.",
    );
  });

  it("have one table a survey and one row a station, each as wide as its heading", () => {
    const [table] = tabulatePlanElevation(model);
    expect(table?.rows).toHaveLength(3);
    expect(table?.rows.every((row) => row.length === table.columns.length)).toBe(true);
    expect(table?.columns.every((column) => column.align === "start" || column.unit === "mm")).toBe(true);
  });
});

describe("the numbers along z", () => {
  const far = modelOf([
    { id: "brg-1", z: 0, h: 0, v: 0 },
    { id: "brg-2", z: 6900, h: 0, v: 0 },
  ]);

  it.each([80, 120, 172, 220, 300, 400])("do not run into each other on a sheet %d mm wide", (width) => {
    const numbers = drawPlanElevation(far, width)
      .shapes.filter((shape) => shape.kind === "text")
      .filter(({ text, anchor }) => anchor === "middle" && /^\d+$/.test(text));
    expect(numbers.length).toBeGreaterThan(2);
    for (const [index, next] of numbers.slice(1).entries()) {
      const last = numbers[index]!;
      expect(next.at.x - last.at.x).toBeGreaterThan((textWidth(last.text) + textWidth(next.text)) / 2 + 1); // mm
    }
  });
});
