import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { clockAngles } from "../../../tests/support/bore-inputs.ts";
import {
  placesAt,
  plainPlan,
  planOf,
  radial,
  spreadOf,
  takenAt,
} from "../../../tests/support/plan-inputs.ts";
import { everyChoice, planCovariance, planRatio } from "../../../tests/support/plan-oracle.ts";
import type { PlanInput } from "./plan-input.ts";
import { planMeasurement, type MeasurementPlan } from "./plan-measurement.ts";

/** √(−2·ln 0.05). */
const kRadial = 2.4477468306808166;
const near = (got: number, wanted: number, within: number) =>
  expect(Math.abs(got - wanted)).toBeLessThanOrEqual(within);
/** All readings of a plan: those taken, then those added. */
const readingsOf = (input: PlanInput, found: MeasurementPlan) => [
  ...input.taken.flatMap((one) => Array.from({ length: one.times }, () => one)),
  ...spreadOf(found).map((clockDeg) => ({ clockDeg, uMm: input.uMm })),
];

describe("planMeasurement adds", () => {
  it.each([3, 4, 6, 8, 12])("exactly the even ring of %d out of 24 places where that just suffices", (n) => {
    const found = planOf({
      places: placesAt(clockAngles(24)),
      wanted: radial(kRadial * plainPlan.uMm * Math.sqrt(2 / n)),
    });
    expect(found).toMatchObject({
      status: "suffices_when_added",
      now: null,
      addedCount: n,
      evenRingReadings: n,
    });
    expect(found.least).toEqual({ count: n, by: n === 3 ? "taken" : "even_ring" });
    near(found.planned!.dilution, 1, 1e-9);
    near(found.planned!.ratio, 1, 1e-9);
  });

  it("nothing where those taken suffice, all where nothing suffices", () => {
    const taken = takenAt(clockAngles(24));
    const done = planOf({ taken, places: placesAt([7, 8]) });
    expect(done).toMatchObject({ status: "suffices", addedCount: 0, added: [] });
    expect(done.planned).toEqual(done.now);
    const places = placesAt(clockAngles(5, 120, 60), 2);
    const short = planOf({ places, wanted: radial(0.001) });
    expect(short).toMatchObject({ status: "out_of_reach", addedCount: 10, least: null });
    expect(short.planned).toEqual(short.best);
    expect(short.best.ratio).toBeGreaterThan(1);
  });

  it("the best it finds of as many as may be added, where more would be needed", () => {
    const found = planOf({ places: placesAt(clockAngles(36)), wanted: radial(0.004), addedMax: 9 });
    expect(found).toMatchObject({ status: "too_many_needed", addedCount: 9, least: null });
    // Nine evenly round are among the 36: none of nine is better.
    near(found.planned!.dilution, 1, 0.02);
    expect(planOf({ places: placesAt(clockAngles(36)), addedMax: 2 }).planned).toBeNull();
  });

  it("above the halves that were read, where the centre is weak", () => {
    const taken = takenAt(clockAngles(9, 90, 180));
    const found = planOf({ taken, places: placesAt(clockAngles(36)), wanted: radial(0.009) });
    expect(found.now!.ratio).toBeGreaterThan(1);
    expect(spreadOf(found).every((clockDeg) => clockDeg < 60 || clockDeg > 300)).toBe(true);
  });

  const small = fc.record({
    form: fc.constantFrom("wall", "wall", "rotating_target"),
    taken: fc.array(fc.tuple(fc.integer({ min: 0, max: 23 }), fc.constantFrom(0.003, 0.005, 0.01)), {
      maxLength: 4,
    }),
    angles: fc.uniqueArray(fc.integer({ min: 0, max: 23 }), { minLength: 3, maxLength: 9 }),
    times: fc.constantFrom(1, 1, 2),
    wanted: fc.oneof(
      fc.double({ min: 0.004, max: 0.05, noNaN: true }).map(radial),
      fc
        .tuple(
          fc.double({ min: 0.004, max: 0.05, noNaN: true }),
          fc.double({ min: 0.004, max: 0.05, noNaN: true }),
        )
        .map(([hMm, vMm]) => ({ form: "planes", hMm, vMm }) as const),
    ),
  });
  const inputOf = ({
    form,
    taken,
    angles,
    times,
    wanted,
  }: typeof small extends fc.Arbitrary<infer T> ? T : never): PlanInput => ({
    ...plainPlan,
    form,
    taken: taken.map(([step, each]) => ({ clockDeg: 15 * step, uMm: each, times: 1 })),
    places: placesAt(
      angles.slice(0, times === 1 ? 9 : 5).map((step) => 15 * step),
      times,
    ),
    wanted,
  });
  const isOpen = (input: PlanInput) =>
    planCovariance(
      [...input.taken, ...input.places.map(({ clockDeg }) => ({ clockDeg, uMm: input.uMm }))],
      input.form,
    ) === null;

  it("as few as every choice looked at one by one shows to do, but for one at the most, and never under its own bound", () => {
    let cases = 0;
    let optimal = 0;
    let proved = 0;
    let foremost = 0;
    fc.assert(
      fc.property(small, (drawn) => {
        const input = inputOf(drawn);
        fc.pre(!isOpen(input));
        const found = planMeasurement(input);
        const { fewest, bestRatio } = everyChoice(input);
        expect(found.status === "suffices").toBe(fewest === 0);
        expect(found.status === "suffices_when_added").toBe(fewest > 0 && fewest < Infinity);
        const ratio = planRatio(readingsOf(input, found), input);
        near(found.planned!.ratio, ratio, 1e-7 * ratio);
        if (fewest === Infinity) return;
        cases++;
        expect(found.least!.count).toBeLessThanOrEqual(fewest);
        expect(found.addedCount).toBeGreaterThanOrEqual(fewest);
        expect(found.addedCount).toBeLessThanOrEqual(fewest + 1);
        // Of as many the best, or one that no single move betters.
        const best = bestRatio.get(found.addedCount)!;
        expect(ratio).toBeLessThanOrEqual(1.4 * best);
        if (ratio <= best * (1 + 1e-6)) foremost++;
        if (found.addedCount === fewest) optimal++;
        if (found.addedCount === found.least!.count) proved++;
      }),
      { numRuns: 600 },
    );
    expect(cases).toBeGreaterThan(200);
    expect(optimal / cases).toBeGreaterThan(0.98);
    expect(foremost / cases).toBeGreaterThan(0.9);
    expect(proved / cases).toBeGreaterThan(0.7);
  });

  it("the same wherever 12 o'clock is put, seen from either end, whatever the unit", () => {
    fc.assert(
      fc.property(small, fc.double({ min: -360, max: 360, noNaN: true }), (drawn, by) => {
        const input = { ...inputOf(drawn), wanted: radial(0.02) };
        fc.pre(!isOpen(input));
        const found = planMeasurement(input);
        const where = ({ added }: MeasurementPlan, of: PlanInput) =>
          added.map(({ clockDeg, readings }) => [
            of.places.findIndex((place) => place.clockDeg === clockDeg),
            readings,
          ]);
        const changed = (angle: (clockDeg: number) => number, scale: number): PlanInput => ({
          ...input,
          uMm: scale * input.uMm,
          wanted: radial(scale * 0.02),
          taken: input.taken.map((one) => ({ ...one, clockDeg: angle(one.clockDeg), uMm: scale * one.uMm })),
          places: input.places.map((one) => ({ ...one, clockDeg: angle(one.clockDeg) })),
        });
        for (const other of [changed((deg) => deg + by, 1), changed((deg) => deg, 25.4)]) {
          const again = planMeasurement(other);
          expect(where(again, other)).toEqual(where(found, input));
          near(again.planned!.ratio, found.planned!.ratio, 1e-9 * found.planned!.ratio);
          expect([again.status, again.least]).toEqual([found.status, found.least]);
        }
        const mirrored = planMeasurement(changed((deg) => -deg, 1));
        expect([mirrored.status, mirrored.addedCount]).toEqual([found.status, found.addedCount]);
      }),
      { numRuns: 300 },
    );
  });

  it("no more readings for less: wanted less sharply, read more finely, with more in reach", () => {
    const places = placesAt(clockAngles(25, 90, 180), 4);
    const counts = [0.006, 0.007, 0.009, 0.012, 0.02].map(
      (wanted) => planOf({ places, wanted: radial(wanted) }).addedCount,
    );
    expect(counts).toEqual([...counts].sort((a, b) => b - a));
    const finer = [0.006, 0.005, 0.004, 0.003].map(
      (each) => planOf({ places, uMm: each, wanted: radial(0.009) }).addedCount,
    );
    expect(finer).toEqual([...finer].sort((a, b) => b - a));
    const wider = [120, 150, 180, 240, 300].map(
      (over) =>
        planOf({ places: placesAt(clockAngles(25, 180 - over / 2, over), 40), wanted: radial(0.012) })
          .addedCount,
    );
    expect(wider).toEqual([...wider].sort((a, b) => b - a));
  });

  it.each([
    { what: "a half ring", places: placesAt(clockAngles(37, 90, 180), 3), wanted: radial(0.005), within: 0 },
    {
      what: "120 degrees",
      places: placesAt(clockAngles(25, 120, 120), 20),
      wanted: radial(0.005),
      within: 1,
    },
    {
      what: "200 degrees",
      places: placesAt(clockAngles(41, 80, 200), 4),
      wanted: radial(0.003),
      within: 1,
    },
    {
      what: "planes unlike each other",
      places: placesAt(clockAngles(37, 90, 180), 8),
      wanted: { form: "planes", hMm: 0.006, vMm: 0.004 } as const,
      within: 1,
    },
  ])(
    "within $within of a proved bound where the even ring is no measure: $what",
    ({ places, wanted, within }) => {
      const found = planOf({ places, wanted });
      expect(found.status).toBe("suffices_when_added");
      expect(found.addedCount).toBeGreaterThan(found.evenRingReadings);
      expect(found.least!.by).toBe("relaxation");
      expect(found.addedCount - found.least!.count).toBeLessThanOrEqual(within);
    },
  );

  it("in time with the most places and readings that a bore may have, and within its budget", () => {
    const started = performance.now();
    const found = planOf({ places: placesAt(clockAngles(360, 0, 90), 100), wanted: radial(0.003) });
    expect(performance.now() - started).toBeLessThan(5_000);
    expect(found.addedCount / found.least!.count).toBeLessThan(1.02);
    const hurried = planOf({ places: placesAt(clockAngles(24)), exchangesMax: 0 });
    expect(hurried.status).toBe("suffices_when_added");
    expect(hurried.addedCount).toBeGreaterThanOrEqual(found.least!.count > 0 ? hurried.least!.count : 0);
  });
});
