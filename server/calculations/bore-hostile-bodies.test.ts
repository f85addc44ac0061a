import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { problemCodes } from "../../shared/error-codes.ts";
import { boreFitRequest, boreFitResult, type BoreFitRequest } from "../../shared/schemas/bore-fits.ts";
import { everyFormMm } from "../../tests/support/bore-requests.ts";
import { boreFitKind } from "./bore-fit.ts";
import { CalculationRefusal } from "./calculation-kind.ts";

/** The answer, or the faults that stand for it; any other error fails the test. */
function answerOrFaults(request: BoreFitRequest) {
  try {
    return { bores: boreFitKind.answer(request).result.bores, faults: [] };
  } catch (error) {
    if (error instanceof CalculationRefusal) return { bores: [], faults: error.faults };
    throw error;
  }
}

describe("boreFitKind.faultsBesideSchema", () => {
  it("names places in the bores of whatever body it is given, with codes of the catalogue", () => {
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
    const someBores = fc.array(fc.oneof(bore, fc.constantFrom(...everyFormMm.bores), fc.anything()));
    const body = fc.oneof(
      fc.anything(),
      fc.record({ bores: fc.anything(), units: fc.constant(everyFormMm.units) }),
      fc.record({ bores: someBores, units: fc.constant(everyFormMm.units), seen: fc.anything() }),
      fc.record({ bores: someBores, units: fc.anything(), seen: fc.anything() }),
    );
    let named = 0;
    fc.assert(
      fc.property(body, (one) => {
        for (const { pointer, code } of boreFitKind.faultsBesideSchema!(one, [])) {
          expect(pointer).toMatch(/^\/bores\/\d+(\/|$)/);
          expect(problemCodes).toContain(code);
          named++;
        }
      }),
      { numRuns: 500 },
    );
    expect(named).toBeGreaterThan(0);
  });
});

const coordinate = fc.oneof(
  fc.integer({ min: -3, max: 3 }),
  fc.double({ min: -300, max: 300, noNaN: true }),
  fc.double({ min: -1e10, max: 1e10, noNaN: true }),
);
const offset = fc.oneof(
  fc.double({ min: -1, max: 1, noNaN: true }),
  fc.double({ min: -1e9, max: 1e9, noNaN: true }),
);
const length = fc.oneof(fc.constantFrom(1, 200), fc.double({ min: 1e-6, max: 1e10, noNaN: true }));
const u = fc.oneof(fc.constantFrom(null, 0.01), fc.double({ min: 1e-12, max: 1e9, noNaN: true }));
const clockDeg = fc.oneof(
  fc.constantFrom(0, 90, 180, 270, 360),
  fc.double({ min: -360, max: 360, noNaN: true }),
);
const z = fc.constantFrom(null, 0, 100, -1e10);
const outliers = fc.constantFrom(null, { rule: "none" }, { rule: "mad" }, { rule: "mad", threshold: 1 });
const taper = fc.constantFrom(
  null,
  { estimate: true },
  ...[0, 7, -89, 89].map((halfAngleDeg) => ({ halfAngleDeg })),
);

/** The same bore may state z, and u, for all its points or for each as it comes. */
const points = fc
  .record({ z, u, mixed: fc.boolean(), list: fc.array(fc.record({ h: coordinate, v: coordinate, z, u })) })
  .map(({ mixed, list, ...all }) =>
    mixed ? list : list.map((point) => ({ ...point, u: all.u, z: all.z === null ? null : (point.z ?? 0) })),
  );

function ofForm<Shape extends object>(form: string, shape: { [K in keyof Shape]: fc.Arbitrary<Shape[K]> }) {
  const common = {
    id: fc.constant("x"),
    form: fc.constant(form),
    seen: fc.constantFrom("downstream", "upstream"),
  };
  return fc.record({ ...common, readingUncertainty: u, ...shape });
}

/** Anything that the schema lets pass, near what is measured and at the bounds of what may be sent. */
const soundBore = fc.oneof(
  ofForm("points", { points, taper, outliers }),
  ofForm("turned_gauge", {
    nominalDiameter: length,
    sense: fc.constantFrom("larger_is_farther", "larger_is_nearer"),
    zero: fc.constantFrom("nominal", "arbitrary"),
    gaugeSag: offset,
    readings: fc.array(fc.record({ clockDeg, reading: offset, u })),
    outliers,
  }),
  ofForm("rotating_target", {
    sense: fc.constantFrom("spot_on_target", "target_from_spot"),
    spots: fc.array(fc.record({ clockDeg, h: offset, v: offset, u })),
  }),
  ofForm("wire", {
    wire: fc.record({
      left: length,
      right: length,
      bottom: length,
      top: fc.option(length, { nil: null }),
      sag: offset,
      wireDiameter: fc.option(length, { nil: null }),
      measuredTo: fc.constantFrom("surface", "centre"),
    }),
  }),
);

describe("any bore that passes the schema", () => {
  it("is answered in the schema's shape with finite numbers only, or refused at a place of its own", () => {
    const answered = new Map<string, number>();
    fc.assert(
      fc.property(soundBore, (bore) => {
        const request = boreFitRequest.parse({ ...everyFormMm, bores: [bore] });
        const { bores, faults } = answerOrFaults(request);
        for (const { pointer } of faults) expect(pointer).toMatch(/^\/bores\/0(\/|$)/);
        for (const one of bores) {
          // z.number() refuses NaN and infinities. The covariance shares the bound of one that is sent: held apart.
          expect(boreFitResult.safeParse({ ...one, covariance: null }).error).toBeUndefined();
          expect((one.covariance ?? []).flat().every(Number.isFinite)).toBe(true);
          answered.set(one.form, (answered.get(one.form) ?? 0) + 1);
        }
      }),
      { numRuns: 3000 },
    );
    for (const form of ["points", "turned_gauge", "rotating_target", "wire"]) {
      expect(answered.get(form), form).toBeGreaterThan(50);
    }
  });
});
