import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { boreFitRequest } from "../../shared/schemas/bore-fits.ts";
import { everyFormMm } from "../../tests/support/bore-requests.ts";
import { boreFitKind } from "./bore-fit.ts";
import { CalculationRefusal } from "./calculation-kind.ts";

describe("boreFitKind.faultsBesideSchema", () => {
  it("makes something of any body", () => {
    const bore = fc.record(
      {
        id: fc.anything(),
        form: fc.oneof(fc.constantFrom("points", "turned_gauge", "rotating_target", "wire"), fc.anything()),
        points: fc.anything(),
        readings: fc.anything(),
        spots: fc.anything(),
        wire: fc.anything(),
        taper: fc.anything(),
      },
      { requiredKeys: [] },
    );
    fc.assert(
      fc.property(
        fc.anything(),
        fc.anything(),
        fc.array(fc.oneof(bore, fc.anything())),
        (body, part, bores) => {
          const bodies = [
            body,
            { ...everyFormMm, bores: part },
            { ...everyFormMm, bores },
            { bores, units: part, seen: part },
          ];
          for (const one of bodies) expect(Array.isArray(beside(one))).toBe(true);
        },
      ),
    );
  });
});

describe("any sound request", () => {
  it("is answered in the shape of its schema, or refused at places that are in it", () => {
    const coordinate = fc.oneof(
      fc.integer({ min: -3, max: 3 }),
      fc.double({ min: -1e10, max: 1e10, noNaN: true }),
    );
    const u = fc.option(fc.double({ min: 1e-12, max: 1e9, noNaN: true }), { nil: null });
    const clockDeg = fc.oneof(fc.constantFrom(0, 90, 360), fc.double({ min: -360, max: 360, noNaN: true }));
    const small = fc.double({ min: -1e9, max: 1e9, noNaN: true });
    const seen = fc.constantFrom("downstream", "upstream");
    const length = fc.oneof(fc.constantFrom(1, 200), fc.double({ min: 1e-6, max: 1e10, noNaN: true }));
    const z = fc.option(fc.constantFrom(0, 0, 100, -1e10), { nil: null });
    const taper = fc.option(
      fc.oneof(fc.constant({ estimate: true }), fc.record({ halfAngleDeg: fc.constantFrom(0, 7, -89, 89) })),
      { nil: null },
    );
    const outliers = fc.constantFrom(null, { rule: "none" }, { rule: "mad" }, { rule: "mad", threshold: 1 });
    const of = <Shape extends object>(form: string, shape: { [K in keyof Shape]: fc.Arbitrary<Shape[K]> }) =>
      fc.record({ id: fc.constant("x"), form: fc.constant(form), seen, readingUncertainty: u, ...shape });
    const bore = fc.oneof(
      of("points", { points: fc.array(fc.record({ h: coordinate, v: coordinate, z, u })), taper, outliers }),
      of("turned_gauge", {
        nominalDiameter: length,
        sense: fc.constantFrom("larger_is_farther", "larger_is_nearer"),
        zero: fc.constantFrom("nominal", "arbitrary"),
        gaugeSag: small,
        readings: fc.array(fc.record({ clockDeg, reading: small, u })),
        outliers,
      }),
      of("rotating_target", {
        sense: fc.constantFrom("spot_on_target", "target_from_spot"),
        spots: fc.array(fc.record({ clockDeg, h: small, v: small, u })),
      }),
      of("wire", {
        wire: fc.record({
          left: length,
          right: length,
          bottom: length,
          top: length,
          sag: small,
          wireDiameter: length,
          measuredTo: fc.constantFrom("surface", "centre"),
        }),
      }),
    );
    const finite = (value: unknown): boolean =>
      typeof value === "number"
        ? Number.isFinite(value)
        : typeof value !== "object" || value === null || Object.values(value).every(finite);
    fc.assert(
      fc.property(bore, (one) => {
        const request = boreFitRequest.parse({ ...everyFormMm, bores: [one] });
        const faults = faultsOf(request);
        for (const { pointer } of faults) expect(pointer).toMatch(/^\/bores\/0(\/|$)/);
        if (faults.length > 0) return;
        expect(finite(boreFitKind.answer(request))).toBe(true);
      }),
      { numRuns: 2000 },
    );
  });
});
