import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { textWidth, type Point, type Shape } from "../shape.ts";
import { describeEndView } from "./describe-end-view.ts";
import { drawEndView } from "./draw-end-view.ts";
import { clockDegOf, type EndViewModel, type ToleranceOutline } from "./end-view-model.ts";
import { endViewOf } from "./end-view-of.ts";
import { endViewCapacity, reachOf, scaleEndView } from "./scale-end-view.ts";
import { tabulateEndView } from "./tabulate-end-view.ts";

interface Place {
  readonly id: string;
  readonly found: { readonly h: number; readonly v: number };
  readonly left?: { readonly h: number; readonly v: number };
  readonly tolerance?: ToleranceOutline | null;
}

function modelOf(places: readonly Place[]): EndViewModel {
  const survey = (name: string, of: (place: Place) => Place["found"] | undefined) => ({
    name,
    stations: places.flatMap((place) => {
      const deviation = of(place);
      if (!deviation) return [];
      const radial = Math.hypot(deviation.h, deviation.v);
      return [{ id: place.id, deviation, radial, uncertainty: null, verdict: "exceeds" as const }];
    }),
  });
  return {
    axialUnit: "mm",
    offsetUnit: "mm",
    stations: places.map(({ id, tolerance = { kind: "ring", radius: 0.1 } }, index) => ({
      id,
      z: index * 100,
      reference: index === 0,
      tolerance,
    })),
    surveys: [survey("as found", ({ found }) => found), survey("as left", ({ left }) => left)],
  };
}

const model = modelOf([
  { id: "brg-1", found: { h: 0.2, v: 0 }, left: { h: 0.01, v: 0.02 } },
  { id: "cas-1", found: { h: -0.1, v: -0.3 }, left: { h: 0, v: -0.05 } },
]);

const pointsOf = (shape: Shape): readonly Point[] => {
  if (shape.kind === "line") return [shape.from, shape.to];
  if (shape.kind === "path") return shape.points;
  if (shape.kind !== "text") return [shape.centre];
  const width = textWidth(shape.text, shape.height);
  const left = shape.anchor === "middle" ? width / 2 : 0;
  return [
    { x: shape.at.x - left, y: shape.at.y - shape.height },
    { x: shape.at.x - left + width, y: shape.at.y },
  ];
};

describe("the scale of the end view", () => {
  it("is one for every station: sheet millimetres in proportion to the deviation", () => {
    const scale = scaleEndView(model, 200, 100);
    const { shapes } = drawEndView(model, 200, { height: 100 });
    const vectors = shapes.flatMap((shape) =>
      shape.kind === "line" && shape.pen === "dashed" ? [shape] : [],
    );
    // The last is the key's sample.
    for (const [index, { h, v }] of [
      { h: 0.2, v: 0 },
      { h: -0.1, v: -0.3 },
    ].entries()) {
      const { from, to } = vectors[index]!;
      // Right is right and up is high: the sheet's y runs down.
      expect(Math.abs(to.x - from.x - h * scale.perOffset)).toBeLessThan(1e-9);
      expect(Math.abs(to.y - from.y + v * scale.perOffset)).toBeLessThan(1e-9);
    }
  });

  it("says its magnification, and shows a bar as long as it says", () => {
    const scale = scaleEndView(model, 200, 100);
    expect(Math.abs(scale.magnification - scale.perOffset)).toBeLessThan(1e-12);
    const words = drawEndView(model, 200, { height: 100 }).shapes.flatMap((shape) =>
      shape.kind === "text" ? [shape.text] : [],
    );
    expect(words.join(" ")).toContain(`magnified ${Number(scale.magnification.toPrecision(2))} times`);
    // 0.7 of 0.3 mm, rounded down to 1, 2 or 5.
    expect(words).toContain("0.2 mm of deviation");
  });

  it("reckons magnification in the same unit on the sheet and off it", () => {
    const inMil = { ...model, offsetUnit: "mil" as const };
    const scale = scaleEndView(inMil, 200, 100);
    expect(Math.abs(scale.magnification * 0.0254 - scale.perOffset)).toBeLessThan(1e-12);
  });

  it("reaches to a tolerance that is wider than every deviation", () => {
    const wide = modelOf([
      { id: "a", found: { h: 0.01, v: 0 }, tolerance: { kind: "box", h: [-0.5, 0.2], v: [-0.1, 0.1] } },
    ]);
    expect(reachOf(wide)).toBe(0.5);
  });
});

describe("the drawing of the end view", () => {
  it("has a ring as large as a round tolerance and a box as large as one per plane", () => {
    const both = modelOf([
      { id: "a", found: { h: 0.2, v: 0 }, tolerance: { kind: "ring", radius: 0.1 } },
      { id: "b", found: { h: 0.2, v: 0 }, tolerance: { kind: "box", h: [-0.05, 0.05], v: [-0.03, 0.07] } },
      { id: "c", found: { h: 0.2, v: 0 }, tolerance: null },
    ]);
    const { perOffset, origins } = scaleEndView(both, 200, 100);
    const shaded = drawEndView(both, 200, { height: 100 }).shapes.filter(
      (shape) => "fill" in shape && shape.fill === "shade",
    );
    const [ring, box, key] = shaded;
    expect(ring).toMatchObject({ kind: "circle", centre: origins[0] });
    expect(ring?.kind === "circle" && Math.abs(ring.radius - 0.1 * perOffset)).toBeLessThan(1e-9);
    const ys = box?.kind === "path" ? box.points.map(({ y }) => y - (origins[1]?.y ?? NaN)) : [];
    expect(Math.abs(Math.min(...ys) + 0.07 * perOffset)).toBeLessThan(1e-9);
    expect(Math.abs(Math.max(...ys) - 0.03 * perOffset)).toBeLessThan(1e-9);
    expect(key?.kind).toBe("circle");
    expect(shaded).toHaveLength(3);
  });

  it("draws what was replaced in dashes, and the state that replaced it as arrows", () => {
    const pens = (drawn: EndViewModel) =>
      drawEndView(drawn, 200).shapes.flatMap((shape) => (shape.kind === "line" ? [shape.pen] : []));
    expect(pens(model).filter((pen) => pen === "dashed")).toHaveLength(3);
    const alone = { ...model, surveys: model.surveys.slice(0, 1) };
    expect(pens(alone)).not.toContain("dashed");
  });

  it("stays on its sheet, whatever the stations and the room", () => {
    const offset = fc.double({ min: -100, max: 100, noNaN: true });
    const pair = fc.record({ h: offset, v: offset });
    fc.assert(
      fc.property(
        fc.array(fc.record({ id: fc.stringMatching(/^[a-z]{1,64}$/), found: pair, left: pair }), {
          minLength: 1,
          maxLength: 60,
        }),
        fc.integer({ min: 80, max: 400 }),
        fc.integer({ min: 60, max: 200 }),
        (places, width, height) => {
          const drawn = drawEndView(modelOf(places), width, { height });
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

  it("keeps as many stations as it says within the height it was given", () => {
    for (const [width, height] of [
      [378, 160],
      [172, 90],
      [80, 60],
    ] as const) {
      const count = endViewCapacity(width, height);
      const full = modelOf(
        Array.from({ length: count }, (_, index) => ({ id: `s${index}`, found: { h: 1, v: 1 } })),
      );
      expect(scaleEndView(full, width, height).height).toBeLessThanOrEqual(height + 1e-9);
    }
  });

  it("writes names small before it cuts them, and cuts in the middle", () => {
    const names = (id: string) =>
      drawEndView(
        modelOf(
          Array.from({ length: 90 }, (_, index) => ({
            id: index === 0 ? id : `s${index}`,
            found: { h: 1, v: 1 },
          })),
        ),
        378,
        { height: 160 },
      ).shapes.flatMap((shape) => (shape.kind === "text" ? [shape.text] : []))[0];
    expect(names("cas-1")).toBe("cas-1 (ref.)");
    expect(names("a-station-with-a-long-name-1")).toMatch(/^a-s.*\u2026.*ref\.\)$/);
  });
});

describe("the words and the table of the end view", () => {
  it("say what the drawing shows", () => {
    expect(describeEndView(model)).toBe(
      "End view of 2 stations looking downstream: deviation of each from its target. " +
        "As found: brg-1 0.2000 mm at 90 degrees, exceeds; cas-1 0.3162 mm at 198 degrees, exceeds. " +
        "As left: brg-1 0.0224 mm at 27 degrees, exceeds; cas-1 0.0500 mm at 180 degrees, exceeds.",
    );
  });

  it("have a row a station and survey, as wide as the heading", () => {
    const table = tabulateEndView(model);
    expect(table.rows).toHaveLength(4);
    expect(table.rows.every((row) => row.length === table.columns.length)).toBe(true);
    expect(table.rows[0]?.[0]).toEqual({ kind: "text", text: "brg-1 (ref.)" });
  });

  it.each([
    [0, 1, 0],
    [1, 0, 90],
    [0, -1, 180],
    [-1, 0, 270],
  ])("point clockwise from the top: h %d, v %d is %d degrees", (h, v, clockDeg) => {
    expect(Math.abs((clockDegOf({ h, v }) ?? NaN) - clockDeg)).toBeLessThan(1e-12);
  });

  it("have no direction where there is no deviation", () => {
    expect(clockDegOf({ h: 0, v: 0 })).toBeNull();
  });
});

describe("the end view of a call", () => {
  it("takes the stations that were surveyed, in order of z", () => {
    const station = (id: string, z: number) => ({ id, z, tolerance: { h: [-0.1, 0.3], v: 0.2 } });
    const surveyed = model.surveys.slice(0, 1);
    const { stations } = endViewOf(
      {
        units: { axial: "mm", bore: "mm", offset: "mm" },
        stations: [station("cas-1", 900), station("brg-1", 0), station("not-read", 50)],
      },
      surveyed,
      new Set(["cas-1"]),
    );
    expect(stations).toEqual([
      { id: "brg-1", z: 0, reference: false, tolerance: { kind: "box", h: [-0.1, 0.3], v: [-0.2, 0.2] } },
      { id: "cas-1", z: 900, reference: true, tolerance: { kind: "box", h: [-0.1, 0.3], v: [-0.2, 0.2] } },
    ]);
  });
});
