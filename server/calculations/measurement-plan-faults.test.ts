import fc from "fast-check";
import { describe, expect, it } from "vitest";
import type { Fault } from "../../shared/error-codes.ts";
import {
  measurementPlanRequest,
  type MeasurementPlanRequest,
} from "../../shared/schemas/measurement-plans.ts";
import { planRequest as base } from "../../tests/support/plan-requests.ts";
import { schemaFaults } from "../http/schema-faults.ts";
import { CalculationRefusal } from "./calculation-kind.ts";
import { measurementPlanKind } from "./measurement-plan.ts";

const places = (faults: readonly Fault[]) => faults.map(({ pointer, code }) => `${pointer} ${code}`).sort();
function refused(request: unknown): string[] {
  expect(schemaFaults(measurementPlanRequest, request)).toEqual([]);
  try {
    measurementPlanKind.answer(request as MeasurementPlanRequest);
  } catch (error) {
    if (error instanceof CalculationRefusal) return places(error.faults);
    throw error;
  }
  return [];
}
const [gauge, target] = base.bores as [
  MeasurementPlanRequest["bores"][0],
  MeasurementPlanRequest["bores"][0],
];
const bare = {
  units: base.units,
  bores: [{ id: "a", form: "points", reachable: { clockDegs: [0, 90, 200] } }],
};

describe("measurementPlanKind.answer: refusals", () => {
  it("accepts the call that the refusals below are made from", () => {
    expect(refused(base)).toEqual([]);
  });

  it("names every fault of every bore at once", () => {
    const sparse = { id: "c", form: "points", reachable: { clockDegs: [10, -350, 190] } };
    const request = {
      ...base,
      wanted: { tolerance: { h: 0.1, v: [0.2, 0.1] } },
      bores: [
        { ...gauge, wanted: { tolerance: { h: [1, 1], v: [3, 2] } } },
        { ...target, id: "brg-1" },
        sparse,
        { id: "d", form: "points", read: [] },
        { id: "e", form: "rotating_target", read: [{ clockDeg: 7 }, { clockDeg: -353 }] },
        { id: "f", form: "points", reachable: { ranges: [{ fromDeg: 0, toDeg: 359 }], stepDeg: 0.5 } },
      ],
    };
    expect(refused(request)).toEqual(
      [
        "/wanted/tolerance/v tolerance_invalid",
        "/bores/0/wanted/tolerance/h tolerance_invalid",
        "/bores/0/wanted/tolerance/v tolerance_invalid",
        "/bores/1/id duplicate_id",
        "/bores/2/reachable angles_insufficient",
        "/bores/3/reachable too_few_points",
        "/bores/4/read angles_insufficient",
        "/bores/5/reachable too_many_items",
      ].sort(),
    );
  });

  it("asks for what is wanted and for an uncertainty where neither the bore nor the call states them", () => {
    expect(refused(bare)).toEqual(["/bores/0/readingUncertainty required", "/bores/0/wanted required"]);
    expect(refused({ ...bare, readingUncertainty: 0.01, wanted: null })).toEqual([
      "/bores/0/wanted required",
    ]);
    expect(refused({ ...bare, readingUncertainty: 0.01, wanted: base.wanted })).toEqual([]);
  });

  it("refuses more places, or more readings, than one call takes", () => {
    const ring = { ranges: [{ fromDeg: 0, toDeg: 359 }], stepDeg: 1 };
    const bores = (count: number, rest: object) =>
      Array.from({ length: count }, (_, k) => ({ id: `b-${k}`, form: "points", ...rest }));
    expect(refused({ ...base, bores: bores(28, { reachable: ring }) })).toEqual(["/bores call_too_large"]);
    const read = Array.from({ length: 10_000 }, (_, k) => ({ clockDeg: k % 360 }));
    expect(refused({ ...base, bores: bores(6, { read }) })).toEqual(["/bores call_too_large"]);
    expect(refused({ ...base, bores: bores(2, { read }) })).toEqual([]);
  });
});

describe("measurementPlanKind.faultsBesideSchema", () => {
  const beside = (body: unknown) => places(measurementPlanKind.faultsBesideSchema!(body, []));

  it("finds the domain faults of sound bores beside what is broken elsewhere", () => {
    const body = {
      wanted: { tolerance: { radial: "wide" } },
      readingUncertainty: "fine",
      bores: [
        {
          id: "a",
          form: "points",
          reachable: { clockDegs: [0, 180] },
          wanted: { tolerance: { h: 1, v: [2, 1] } },
        },
        { id: "a", form: "points", reachable: { clockDegs: ["top"] } },
        { id: "b", form: "points" },
        {
          ...gauge,
          readingUncertainty: 0.01,
          wanted: { tolerance: { radial: 1 } },
          id: "c",
          read: null,
          reachable: { clockDegs: [0, 180] },
        },
        7,
      ],
    };
    expect(beside(body)).toEqual(
      [
        "/bores/0/wanted/tolerance/v tolerance_invalid",
        "/bores/1/id duplicate_id",
        "/bores/2/reachable too_few_points",
        "/bores/3/reachable angles_insufficient",
      ].sort(),
    );
  });

  it("takes anything without throwing", () => {
    fc.assert(
      fc.property(fc.anything(), fc.anything(), fc.anything(), (bores, wanted, one) => {
        for (const body of [
          bores,
          { bores, wanted },
          { bores: [one, { ...gauge, reachable: one }], wanted: one },
        ]) {
          expect(Array.isArray(measurementPlanKind.faultsBesideSchema!(body, []))).toBe(true);
        }
      }),
      { numRuns: 500 },
    );
  });
});

describe("measurementPlanKind.answer, on any call that passes its schema,", () => {
  const degrees = fc.oneof(
    fc.constantFrom(-360, 0, 1e-9, 90, 180, 360),
    fc.double({ min: -360, max: 360, noNaN: true }),
  );
  const size = fc.oneof(fc.constantFrom(1e-12, 1e9), fc.double({ min: 1e-6, max: 1, noNaN: true }));
  const bore = fc.record({
    id: fc.constantFrom("a", "b", "c"),
    form: fc.constantFrom("points", "turned_gauge", "rotating_target"),
    read: fc.array(fc.record({ clockDeg: degrees, u: fc.option(size) }), { maxLength: 6 }),
    reachable: fc.option(
      fc.oneof(
        fc.record({
          clockDegs: fc.array(degrees, { maxLength: 8 }),
          readingsPerPlace: fc.integer({ min: 1, max: 9 }),
        }),
        fc.record({
          ranges: fc.array(fc.record({ fromDeg: degrees, toDeg: degrees }), { maxLength: 3 }),
          stepDeg: fc.constantFrom(7, 30, 180),
        }),
      ),
    ),
    wanted: fc.option(
      fc.oneof(
        size.map((radial) => ({ expandedUncertainty: { radial } })),
        fc.record({ h: size, v: size }).map((tolerance) => ({ tolerance })),
      ),
    ),
  });

  it("answers with finite numbers or refuses by code", () => {
    let answered = 0;
    fc.assert(
      fc.property(fc.array(bore, { minLength: 1, maxLength: 3 }), size, (bores, readingUncertainty) => {
        const request = { ...base, bores, readingUncertainty } as MeasurementPlanRequest;
        expect(schemaFaults(measurementPlanRequest, request)).toEqual([]);
        try {
          const text = JSON.stringify(measurementPlanKind.answer(request).result, (_, value: unknown) =>
            typeof value === "number" && !Number.isFinite(value) ? "not finite" : value,
          );
          expect(text).not.toContain("not finite");
          answered++;
        } catch (error) {
          expect(error).toBeInstanceOf(CalculationRefusal);
          for (const { code } of (error as CalculationRefusal).faults) expect(code).toMatch(/^[a-z_]+$/);
        }
      }),
      { numRuns: 800 },
    );
    expect(answered).toBeGreaterThan(50);
  });
});
