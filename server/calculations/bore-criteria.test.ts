import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import {
  boreFitRequest,
  boreFitResult,
  type BoreFitRequest,
  type BoreFitResult,
} from "../../shared/schemas/bore-fits.ts";
import { boreFitKind } from "./bore-fit.ts";

const file = new URL("../../examples/requests/bore-fits/other-criteria-and-oval.json", import.meta.url);
const example = boreFitRequest.parse(JSON.parse(readFileSync(file, "utf8")));
const bores = (request: BoreFitRequest) => boreFitKind.answer(request).result.bores;
const near = (got: number | null | undefined, wanted: number | null | undefined, within: number) =>
  typeof wanted === "number"
    ? expect(Math.abs((got ?? NaN) - wanted)).toBeLessThan(within)
    : expect(got).toBe(wanted);

/** The example in inches and mil: 25.4 mm and 0.0254 mm by definition, stated here apart from the service's own table. */
function inInches(request: BoreFitRequest): BoreFitRequest {
  const inch = (value: number) => value / 25.4;
  const mil = (value: number | null | undefined) => (typeof value === "number" ? value / 0.0254 : null);
  return {
    ...request,
    units: { axial: "in", bore: "in", offset: "mil" },
    bores: request.bores.map((bore) => {
      const common = { readingUncertainty: mil(bore.readingUncertainty) };
      if (bore.form === "points") {
        const points = bore.points.map(({ h, v, z }) => ({
          h: inch(h),
          v: inch(v),
          z: typeof z === "number" ? inch(z) : null,
        }));
        return { ...bore, ...common, nominalDiameter: inch(bore.nominalDiameter!), points };
      }
      if (bore.form !== "turned_gauge") throw new Error("The example has points and gauges only.");
      return {
        ...bore,
        ...common,
        nominalDiameter: inch(bore.nominalDiameter),
        gaugeSag: mil(bore.gaugeSag),
        readings: bore.readings.map(({ clockDeg, reading }) => ({ clockDeg, reading: mil(reading)! })),
      };
    }),
  };
}

describe("boreFitKind.answer by other criteria", () => {
  it("answers each in the shape of its schema, contacts and ellipse where they belong", () => {
    const answered = bores(example);
    expect(answered.map((bore) => boreFitResult.parse(bore))).toEqual(answered);
    expect(answered.map(({ id, method }) => `${id} ${method}`)).toEqual(
      example.bores.map(({ id, method }) => `${id} ${method}`),
    );
    for (const { method, contacts, ellipse } of answered) {
      expect(ellipse === null).toBe(method !== "ellipse");
      expect(contacts === null).toBe(method === "ellipse");
    }
    const [zone, plug, ring] = answered as [BoreFitResult, BoreFitResult, BoreFitResult];
    expect(plug.diameter!).toBeLessThan(zone.diameter!);
    expect(zone.diameter!).toBeLessThan(ring.diameter!);
    expect(zone.roundness!).toBeLessThan(Math.min(plug.roundness!, ring.roundness!));
    expect(JSON.parse(JSON.stringify(answered))).toEqual(answered);
  });

  it("gives the same bores in inches and mil", () => {
    const wanted = bores(example);
    for (const [i, bore] of bores(inInches(example)).entries()) {
      const mm = wanted[i]!;
      near(bore.centre.h * 0.0254, mm.centre.h, 1e-9);
      near(bore.centre.v * 0.0254, mm.centre.v, 1e-9);
      near(bore.diameter! * 25.4, mm.diameter, 1e-9);
      near(bore.roundness! * 0.0254, mm.roundness, 1e-9);
      near(bore.covariance![0]![0]! * 0.0254 ** 2, mm.covariance![0]![0], 1e-9);
      near(bore.expandedUncertainty!.diameter! * 0.0254, mm.expandedUncertainty!.diameter, 1e-7);
      expect(bore.contacts).toEqual(mm.contacts);
      expect(bore.warnings).toEqual(mm.warnings);
      if (mm.ellipse === null) continue;
      near(bore.ellipse!.major! * 25.4, mm.ellipse.major, 1e-9);
      near(bore.ellipse!.minor! * 25.4, mm.ellipse.minor, 1e-9);
      near(bore.ellipse!.ovality * 0.0254, mm.ellipse.ovality, 1e-8);
      near(bore.ellipse!.ovalityExpandedUncertainty! * 0.0254, mm.ellipse.ovalityExpandedUncertainty, 1e-7);
      near(bore.ellipse!.majorClockDeg, mm.ellipse.majorClockDeg, 1e-6);
    }
  });

  it("turns what was read looking upstream: centres and the direction of the oval, not the contacts", () => {
    const down = bores(example);
    for (const [i, up] of bores({ ...example, seen: "upstream" }).entries()) {
      const wanted = down[i]!;
      near(up.centre.h, -wanted.centre.h, 1e-9);
      near(up.centre.v, wanted.centre.v, 1e-9);
      expect(up.contacts).toEqual(wanted.contacts);
      const clockDeg = wanted.ellipse?.majorClockDeg;
      if (clockDeg !== undefined) near(up.ellipse!.majorClockDeg, 180 - clockDeg!, 1e-6);
    }
  });

  it("leaves a criterion's diameters out where the gauge's zero does not tell them", () => {
    const arbitrary = example.bores.map((bore) =>
      bore.form === "turned_gauge" ? { ...bore, zero: "arbitrary" as const } : bore,
    );
    const oval = bores({ ...example, bores: arbitrary }).at(-1)!;
    expect([oval.diameter, oval.ellipse!.major, oval.ellipse!.minor]).toEqual([null, null, null]);
    near(oval.ellipse!.ovality, bores(example).at(-1)!.ellipse!.ovality, 1e-9);
  });

  it("takes long work to a thread sooner than least squares", () => {
    const many = (method: "least_squares" | "minimum_zone", count: number): BoreFitRequest => ({
      ...example,
      bores: Array.from({ length: count }, (_, k) => ({ ...example.bores[0]!, id: `b${k}`, method })),
    });
    expect(boreFitKind.isLong!(many("least_squares", 40))).toBe(false);
    expect(boreFitKind.isLong!(many("minimum_zone", 3))).toBe(false);
    expect(boreFitKind.isLong!(many("minimum_zone", 40))).toBe(true);
  });
});
