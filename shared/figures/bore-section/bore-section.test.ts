import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { boreFitResponse, pointsBore, turnedGaugeBore, type BoreFitResult } from "../../schemas/bore-fits.ts";
import type { Point, Shape } from "../shape.ts";
import type { BoreSectionModel } from "./bore-section-model.ts";
import { boreSectionOf } from "./bore-section-of.ts";
import { describeBoreSection } from "./describe-bore-section.ts";
import { drawBoreSection } from "./draw-bore-section.ts";
import { scaleBoreSection } from "./scale-bore-section.ts";
import { tabulateBoreSection } from "./tabulate-bore-section.ts";

const millimetres = { axial: "mm", bore: "mm", offset: "mm" } as const;
const fitSchema = boreFitResponse.shape.result.shape.bores.element;

function fitOf(count: number, changes: Partial<BoreFitResult> = {}): BoreFitResult {
  return fitSchema.parse({
    id: "brg-1",
    form: "points",
    method: "least_squares",
    centre: { h: 0, v: 0 },
    diameter: 200,
    roundness: 0.01,
    residuals: Array.from({ length: count }, () => 0),
    used: Array.from({ length: count }, () => true),
    exclusions: [],
    contacts: null,
    covariance: null,
    expandedUncertainty: null,
    arc: { coverageDeg: 270, largestGapDeg: 90 },
    taper: null,
    tilt: null,
    ellipse: null,
    statistics: {
      readingsUsed: count,
      parameters: 3,
      rms: 0,
      chiSquare: null,
      varianceInflation: null,
      dilution: 1,
      iterations: 1,
    },
    warnings: [],
    ...changes,
  });
}

const quarterPoints = pointsBore.parse({
  id: "brg-1",
  form: "points",
  points: [
    { h: 0, v: 100 },
    { h: 100, v: 0 },
    { h: 0, v: -100 },
    { h: -100, v: 0 },
  ],
});
const angles = (model: BoreSectionModel | null) =>
  model?.points.map(({ clockDeg }) => Math.round(clockDeg * 1e6) / 1e6 + 0);

describe("the directions of a bore section", () => {
  it("go clockwise from the top", () => {
    expect(angles(boreSectionOf(quarterPoints, fitOf(4), millimetres, "downstream"))).toEqual([
      0, 90, 180, 270,
    ]);
  });

  it("are turned into the downstream view where the bore was read from the other end", () => {
    expect(angles(boreSectionOf(quarterPoints, fitOf(4), millimetres, "upstream"))).toEqual([
      0, 270, 180, 90,
    ]);
    const itself = { ...quarterPoints, seen: "upstream" as const };
    expect(angles(boreSectionOf(itself, fitOf(4), millimetres, "downstream"))).toEqual([0, 270, 180, 90]);
  });

  it("are seen from the fitted centre, whose unit is another", () => {
    // Centre 100 000 um right: the point on top of the origin then lies at 315 degrees.
    const units = { ...millimetres, offset: "um" } as const;
    const model = boreSectionOf(
      quarterPoints,
      fitOf(4, { centre: { h: 100_000, v: 0 } }),
      units,
      "downstream",
    );
    expect(angles(model)?.[0]).toBe(315);
  });

  it("of a gauge are those at which it was read, moved by its sag", () => {
    const gauge = turnedGaugeBore.parse({
      id: "cas-1",
      form: "turned_gauge",
      nominalDiameter: 200,
      sense: "larger_is_farther",
      zero: "nominal",
      gaugeSag: 100,
      readings: [0, 90, 180].map((clockDeg) => ({ clockDeg, reading: 0 })),
    });
    // Its tip hangs 100 mm low: seen from 100 mm below, the three points keep their angles about that place.
    const model = boreSectionOf(gauge, fitOf(3, { centre: { h: 0, v: -100 } }), millimetres, "downstream");
    expect(angles(model)).toEqual([0, 90, 180]);
  });

  it("are none for readings that are no wall points", () => {
    const spots = {
      id: "shr-1",
      form: "rotating_target",
      sense: "spot_on_target",
      spots: [{ clockDeg: 0, h: 0, v: 0 }],
    } as const;
    expect(
      boreSectionOf({ ...spots, spots: [...spots.spots] }, fitOf(1), millimetres, "downstream"),
    ).toBeNull();
  });
});

const modelWith = (changes: Partial<BoreSectionModel> = {}): BoreSectionModel => ({
  id: "brg-1",
  methodWords: "least-squares circle",
  offsetUnit: "mm",
  boreUnit: "mm",
  originWords: "points' origin",
  centre: { h: 0.1, v: -0.2 },
  uncertainty: { h: 0.01, v: 0.01 },
  diameter: 200,
  roundness: 0.03,
  points: [
    { number: 1, clockDeg: 0, residual: 0.02, used: true, contact: false },
    { number: 2, clockDeg: 90, residual: -0.01, used: true, contact: true },
    { number: 3, clockDeg: 180, residual: 0.4, used: false, contact: false },
    { number: 4, clockDeg: 200, residual: 0, used: true, contact: false },
  ],
  arc: { coverageDeg: 200, largestGapDeg: 160 },
  ...changes,
});

const pointsOf = (shape: Shape): Point[] => {
  switch (shape.kind) {
    case "line":
      return [shape.from, shape.to];
    case "path":
      return [...shape.points];
    case "circle":
    case "arc":
      return [
        { x: shape.centre.x - shape.radius, y: shape.centre.y - shape.radius },
        { x: shape.centre.x + shape.radius, y: shape.centre.y + shape.radius },
      ];
    case "text":
      return [shape.at];
  }
};

describe("the drawing of a bore section", () => {
  const model = modelWith();
  const width = 150;
  const scale = scaleBoreSection(model, width);
  const figure = drawBoreSection(model, width);

  it("sets each reading in use at its residual from the circle, in its own direction", () => {
    const dots = figure.shapes.filter(
      (shape) =>
        shape.kind === "circle" &&
        shape.pen === null &&
        shape.fill === "ink" &&
        shape.centre.y < width * 0.95,
    );
    const radii = dots.map((shape) =>
      shape.kind === "circle"
        ? Math.hypot(shape.centre.x - scale.centre.x, shape.centre.y - scale.centre.y)
        : NaN,
    );
    const expected = [0.02, -0.01, 0].map((residual) => scale.circleRadius + residual * scale.residualScale);
    expect(radii.length).toBeGreaterThanOrEqual(3);
    for (const radius of expected) expect(radii.some((drawn) => Math.abs(drawn - radius) < 1e-9)).toBe(true); // mm
  });

  it("states an exaggeration that is what it draws", () => {
    // On the sheet the circle of 100 mm radius is circleRadius; a residual of 1 mm is residualScale.
    const drawn = scale.residualScale / (scale.circleRadius / 100);
    expect(Math.abs((scale.exaggeration ?? 0) / drawn - 1)).toBeLessThan(1e-12);
    const words = figure.shapes.flatMap((shape) => (shape.kind === "text" ? [shape.text] : [])).join(" ");
    expect(words).toContain("Residuals exaggerated");
    expect(words).toContain("Seen looking downstream.");
  });

  it("strikes what was not used in the signal tone, and rings contacts", () => {
    expect(
      figure.shapes.filter((shape) => shape.kind === "line" && shape.pen === "signal").length,
    ).toBeGreaterThanOrEqual(2);
    const rings = figure.shapes.filter(
      (shape) => shape.kind === "circle" && shape.pen === "wide" && shape.radius === 1.9,
    );
    expect(rings.length).toBeGreaterThanOrEqual(1);
  });

  it("stays on its sheet, whatever the readings and the room", () => {
    const point = fc.record({
      clockDeg: fc.double({ min: 0, max: 359.999, noNaN: true }),
      residual: fc.double({ min: -5, max: 5, noNaN: true }),
      used: fc.boolean(),
      contact: fc.boolean(),
    });
    fc.assert(
      fc.property(
        fc.array(point, { minLength: 3, maxLength: 30 }),
        fc.integer({ min: 80, max: 400 }),
        fc.record({
          h: fc.double({ min: -10, max: 10, noNaN: true }),
          v: fc.double({ min: -10, max: 10, noNaN: true }),
        }),
        (points, room, centre) => {
          const drawn = drawBoreSection(
            modelWith({ centre, points: points.map((one, index) => ({ ...one, number: index + 1 })) }),
            room,
          );
          for (const { x, y } of drawn.shapes.flatMap(pointsOf)) {
            expect(x).toBeGreaterThanOrEqual(0);
            expect(x).toBeLessThanOrEqual(drawn.width);
            expect(y).toBeGreaterThanOrEqual(0);
            expect(y).toBeLessThanOrEqual(drawn.height);
          }
        },
      ),
    );
  });

  it("does not magnify what is arithmetic, not scatter", () => {
    const exact = model.points.map((point) => ({ ...point, residual: 1e-14, used: true }));
    const { residualScale, reach } = scaleBoreSection(modelWith({ points: exact }), width);
    expect(1e-14 * residualScale).toBeLessThan(reach / 1e6);
  });

  it("draws a dense scan with few shapes, and none of it as NaN", () => {
    const points = Array.from({ length: 10_000 }, (_, index) => ({
      number: index + 1,
      clockDeg: (index * 360) / 10_000,
      residual: Math.sin(index) / 100,
      used: true,
      contact: false,
    }));
    const dense = drawBoreSection(modelWith({ points }), width);
    expect(dense.shapes.length).toBeLessThan(100);
    expect(dense.shapes.flatMap(pointsOf).every(({ x, y }) => Number.isFinite(x) && Number.isFinite(y))).toBe(
      true,
    );
  });
});

describe("the words and the table of a bore section", () => {
  it("say what the drawing shows", () => {
    expect(describeBoreSection(modelWith())).toBe(
      "Section of bore brg-1 looking downstream: least-squares circle through 3 of 4 readings. " +
        "Centre h +0.1000 mm, v \u22120.2000 mm from the points' origin. Diameter 200.0000 mm. Roundness 0.0300 mm. " +
        "Largest residual +0.0200 mm at reading 1, clock angle 0.0 degrees. " +
        "The readings cover 200 degrees; the largest gap is 160 degrees. Contacts: readings 2. Excluded: reading 3.",
    );
  });

  it("have a row for every reading in the order sent", () => {
    const { rows, columns } = tabulateBoreSection(modelWith());
    expect(rows).toHaveLength(4);
    expect(rows.every((row) => row.length === columns.length)).toBe(true);
    expect(rows[2]?.at(-1)).toEqual({ kind: "text", text: "excluded" });
  });
});
