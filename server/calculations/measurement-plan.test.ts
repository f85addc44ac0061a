import { readdirSync, readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import {
  measurementPlanRequest,
  measurementPlanResponse,
  type BoreMeasurementPlan,
  type MeasurementPlanRequest,
  type PlannedBoreRequest,
} from "../../shared/schemas/measurement-plans.ts";
import { planRequest as base } from "../../tests/support/plan-requests.ts";
import { measurementPlanKind } from "./measurement-plan.ts";

const plansOf = (request: Partial<MeasurementPlanRequest>) =>
  measurementPlanKind.answer({ ...base, ...request }).result.bores;
const planOf = (bore: Partial<PlannedBoreRequest>, request: Partial<MeasurementPlanRequest> = {}) =>
  plansOf({ ...request, bores: [{ id: "brg-1", form: "points", ...bore }] })[0]!;
const near = (got: number, wanted: number, within = 1e-9) =>
  expect(Math.abs(got / wanted - 1)).toBeLessThanOrEqual(within);
const places = ({ add }: BoreMeasurementPlan) => add.map(({ clockDeg }) => clockDeg);
const wholeRing = { ranges: [{ fromDeg: 0, toDeg: 360 }], stepDeg: 15 };

describe("measurementPlanKind.answer", () => {
  it("answers in the shape of its schema, the level that holds, and each bore in its place", () => {
    const answer = measurementPlanKind.answer(base);
    expect(answer).toMatchObject({ units: base.units, level: 0.95 });
    expect(measurementPlanResponse.shape.result.parse(answer.result)).toEqual(answer.result);
    expect(answer.result.bores.map(({ id, form, status }) => [id, form, status])).toEqual([
      ["brg-1", "turned_gauge", "suffices_when_added"],
      ["brg-2", "rotating_target", "suffices_when_added"],
    ]);
  });

  it("wants a quarter of a tolerance unless another ratio is stated, of h and v the half-widths", () => {
    expect(plansOf({})[0]!.wanted).toEqual({ radial: 0.0125 });
    const tolerance = { h: 0.03, v: [-0.02, 0.06] };
    expect(planOf({ wanted: { tolerance }, reachable: wholeRing }).wanted).toEqual({ h: 0.0075, v: 0.01 });
    expect(planOf({ wanted: { tolerance, ratio: 10 }, reachable: wholeRing }).wanted).toEqual({
      h: 0.003,
      v: 0.004,
    });
  });

  it("lets a bore override what the call states, and a reading what its bore does", () => {
    const [gauge, target] = plansOf({});
    expect(target!.wanted).toEqual({ h: 0.01, v: 0.02 });
    // Nine readings of 0.01: u·√(2/n). Two spots of 0.02 and 0.03: Σ1/u².
    near(gauge!.now!.evenRing.uncertainty, 0.01 * Math.sqrt(2 / 9));
    near(target!.now!.evenRing.uncertainty, 1 / Math.sqrt(1 / 0.02 ** 2 + 1 / 0.03 ** 2));
  });

  it("offers a range clockwise over 12 o'clock, both ends and each place once, none that is read already", () => {
    const wanted = { expandedUncertainty: { radial: 1e-6 } };
    const all = (bore: Partial<PlannedBoreRequest>) => places(planOf({ wanted, ...bore }));
    expect(all({ reachable: { ranges: [{ fromDeg: 340, toDeg: 25 }], stepDeg: 10 } })).toEqual([
      0, 10, 20, 25, 340, 350,
    ]);
    expect(all({ reachable: { ranges: [{ fromDeg: 0, toDeg: 360 }], stepDeg: 90 } })).toEqual([
      0, 90, 180, 270,
    ]);
    const overlapping = [
      { fromDeg: -180, toDeg: 180 },
      { fromDeg: 280, toDeg: 30 },
    ];
    expect(all({ reachable: { ranges: overlapping, stepDeg: 100 } })).toEqual([20, 30, 120, 180, 280]);
    const read = [{ clockDeg: 90 }, { clockDeg: -270 }, { clockDeg: 180 }];
    const clockDegs = [0, 90, 180, 360, -180];
    expect(all({ read, reachable: { clockDegs } })).toEqual([0]);
    const thrice = planOf({ wanted, read, reachable: { clockDegs, readingsPerPlace: 3 } });
    expect(thrice.add).toEqual([
      { clockDeg: 0, readings: 3 },
      { clockDeg: 90, readings: 1 },
      { clockDeg: 180, readings: 2 },
    ]);
  });

  it("warns of a weak arc, of no reading to spare, and of what repeats do not average", () => {
    const codes = (bore: Partial<PlannedBoreRequest>) => planOf(bore).warnings.map(({ code }) => code);
    const short = { ranges: [{ fromDeg: 150, toDeg: 210 }], stepDeg: 5 };
    expect(codes({ reachable: short })).toEqual(["weak_arc"]);
    expect(codes({ reachable: wholeRing, wanted: { expandedUncertainty: { radial: 1 } } })).toEqual([
      "no_redundancy",
    ]);
    expect(codes({ reachable: { clockDegs: [0, 120, 240], readingsPerPlace: 9 } })).toEqual([
      "repeats_at_one_place",
    ]);
    expect(codes({ reachable: wholeRing })).toEqual([]);
    expect(
      codes({ form: "rotating_target", reachable: { clockDegs: [0, 10], readingsPerPlace: 2 } }),
    ).toContain("weak_angles");
  });

  it("says of an addedMax that is too small how near it comes", () => {
    const found = planOf({ reachable: wholeRing, addedMax: 4 });
    expect(found).toMatchObject({ status: "too_many_needed", addCount: 4, least: null });
    expect(found.after).toMatchObject({ readings: 4, suffices: false });
    expect(planOf({ reachable: wholeRing, addedMax: 2 }).after).toBeNull();
  });

  it.each([
    { axial: "m", bore: "mm", offset: "um" },
    { axial: "in", bore: "in", offset: "mil" },
    { axial: "ft", bore: "in", offset: "in" },
  ] as const)("says the same in $offset", (units) => {
    // Exact by definition (international inch, 1959).
    const per = { um: 0.001, mil: 0.0254, in: 25.4 }[units.offset];
    const wanted = plansOf({});
    const got = plansOf({
      units,
      readingUncertainty: 0.01 / per,
      wanted: { tolerance: { radial: 0.05 / per } },
      bores: [
        base.bores[0]!,
        {
          ...base.bores[1]!,
          wanted: { expandedUncertainty: { h: 0.01 / per, v: 0.02 / per } },
          readingUncertainty: 0.02 / per,
          read: [{ clockDeg: 0 }, { clockDeg: 90, u: 0.03 / per }],
        },
      ],
    });
    for (const [k, plan] of got.entries()) {
      const other = wanted[k]!;
      expect([plan.status, plan.add, plan.least]).toEqual([other.status, other.add, other.least]);
      near(plan.after!.covariance[0]![0]! * per * per, other.after!.covariance[0]![0]!);
      near(plan.after!.expandedUncertainty.radial * per, other.after!.expandedUncertainty.radial);
      near(plan.after!.ratio, other.after!.ratio);
      near(plan.best.evenRing.uncertainty * per, other.best.evenRing.uncertainty);
    }
  });

  it("turns to a thread with many places, and answers the most of them in time", () => {
    expect(measurementPlanKind.isLong!(base)).toBe(false);
    const bores = Array.from({ length: 27 }, (_, k) => ({
      id: `b-${k}`,
      form: "points" as const,
      reachable: { ranges: [{ fromDeg: 0, toDeg: 359 - 10 * k }], stepDeg: 1, readingsPerPlace: 100 },
      wanted: { expandedUncertainty: { radial: 0.002 } },
    }));
    const request = { ...base, bores };
    expect(measurementPlanKind.isLong!(request)).toBe(true);
    const begun = performance.now();
    expect(measurementPlanKind.answer(request).result.bores).toHaveLength(27);
    expect(performance.now() - begun).toBeLessThan(15_000);
  });
});

describe("examples/requests/measurement-plans", () => {
  const folder = new URL("../../examples/requests/measurement-plans/", import.meta.url);
  it.each(readdirSync(folder))("%s is answered in the shape of its schema", (file) => {
    const request = measurementPlanRequest.parse(JSON.parse(readFileSync(new URL(file, folder), "utf8")));
    const { result } = measurementPlanKind.answer(request);
    expect(measurementPlanResponse.shape.result.parse(result)).toEqual(result);
  });
});
