import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { standardGravity, type Shaft } from "../beam/shaft.ts";
import { ComputeError } from "../compute-error.ts";
import type { PlaneVector } from "../plane.ts";
import { runningFromClearance, type Rotor, type TargetStation } from "./cold-target-input.ts";
import { bendRotor, coldTargets } from "./cold-targets.ts";
import type { Growth } from "./growth.ts";

const none: PlaneVector = { hMm: 0, vMm: 0 };
const at = (hMm: number, vMm: number): PlaneVector => ({ hMm, vMm });
const growth = (direction: "h" | "v", lengthMm: number, uncertaintyMm: number | null = null): Growth => ({
  direction,
  lengthMm,
  expansionPerK: 1e-5,
  riseK: 50,
  uncertaintyMm,
});
/** A solid steel shaft of 300 mm across 4 m. */
const shaft: Shaft = {
  startMm: 0,
  sections: [{ lengthMm: 4000, outerMm: 300, innerMm: 0 }],
  densityKgPerMm3: 7.85e-6,
  modulusNPerMm2: 207e3,
  masses: [],
};
const rotor: Rotor = {
  shaft,
  supports: [
    { zMm: 0, line: at(0, 0.1), running: at(0.05, -0.12) },
    { zMm: 4000, line: at(0.2, 0.4), running: at(0.07, -0.1) },
  ],
};
const station = (over: Partial<TargetStation>): TargetStation => ({
  zMm: 2000,
  follows: "rotor",
  growths: [],
  closing: none,
  ...over,
});
const one = (over: Partial<TargetStation>, on: Rotor | null = rotor) =>
  coldTargets({ stations: [station(over)], rotor: on, wire: null }).stations[0]!;
const near = (got: number, wanted: number) => expect(Math.abs(got - wanted), `${got}`).toBeLessThan(1e-12); // mm

/** 5ρgAL⁴/384EI of a solid round shaft is 80ρgL⁴/384Ed² (any handbook of beams). */
const sagMm = (80 * 7.85e-6 * standardGravity * 4000 ** 4) / (384 * 207e3 * 300 ** 2);

describe("coldTargets", () => {
  it("puts a part round the rotor at the shaft bent between its running journals", () => {
    const { base, target } = one({});
    near(base.hMm, (0.05 + 0.27) / 2);
    near(base.vMm, (0.1 - 0.12 + 0.4 - 0.1) / 2 - sagMm);
    expect(target).toEqual(base);
  });

  it("puts a bearing on its line, without its journal's running place", () => {
    expect(one({ zMm: 4000, follows: "bearing_line" }).target).toEqual(at(0.2, 0.4));
    expect(one({ zMm: 4000, follows: "bearing_line" }).base).toEqual(at(0.2, 0.4));
    expect(one({ zMm: 4000, follows: "bearing_line" }, null).target).toEqual(none);
  });

  it("tells of a bearing at no support when the line is not all 0", () => {
    const off = one({ zMm: 3000, follows: "bearing_line" });
    expect([off.target, off.lineNotGiven]).toEqual([none, true]);
    expect(one({ zMm: 4000, follows: "bearing_line" }).lineNotGiven).toBe(false);
    const flat = { ...rotor, supports: rotor.supports.map((support) => ({ ...support, line: none })) };
    expect(one({ zMm: 3000, follows: "bearing_line" }, flat).lineNotGiven).toBe(false);
    expect(one({ zMm: 3000 }).lineNotGiven).toBe(false);
  });

  it("takes off growth and closing, each in its plane", () => {
    const growths = [growth("v", 800), growth("h", -100), growth("v", 60)];
    const found = one({ growths, closing: at(0.01, -0.02), zMm: 4000, follows: "bearing_line" });
    near(found.growth.vMm, 0.43);
    near(found.growth.hMm, -0.05);
    near(found.target.hMm, 0.2 + 0.05 - 0.01);
    near(found.target.vMm, 0.4 - 0.43 + 0.02);
    found.growthsMm.forEach((value, i) => near(value, [0.4, -0.05, 0.03][i]!));
  });

  it("combines the growths' uncertainties as independent, plane by plane, and none where none is stated", () => {
    const growths = [growth("v", 1, 0.003), growth("v", 1, 0.004), growth("h", 1, 0), growth("h", 1)];
    const { uncertainty } = one({ growths });
    near(uncertainty!.vMm, 0.005);
    expect(uncertainty!.hMm).toBe(0);
    expect(one({ growths: [growth("v", 1)] }).uncertainty).toBeNull();
    expect(one({}).uncertainty).toBeNull();
  });

  it("refuses a station that follows no rotor", () => {
    const attempt = () => one({}, null);
    expect(attempt).toThrow(ComputeError);
    expect(attempt).toThrow(expect.objectContaining({ code: "combination_invalid" }));
  });

  it("refuses a growth that no number holds", () => {
    const huge = { ...growth("v", 1e308), riseK: 1e308 };
    expect(() => one({ growths: [huge] })).toThrow(expect.objectContaining({ code: "result_overflow" }));
  });

  it("keeps target + growth + closing = rotor or line, whatever is sent, in the order sent", () => {
    const size = fc.double({ min: -5, max: 5, noNaN: true });
    const pair = fc.record({ hMm: size, vMm: size });
    const stations = fc.array(
      fc.record({
        zMm: fc.double({ min: 0, max: 4000, noNaN: true }),
        follows: fc.constantFrom("rotor" as const, "bearing_line" as const),
        growths: fc.array(
          fc.record({
            direction: fc.constantFrom("h" as const, "v" as const),
            lengthMm: fc.double({ min: -2000, max: 2000, noNaN: true }),
            expansionPerK: fc.double({ min: 0, max: 2e-5, noNaN: true }),
            riseK: fc.double({ min: -300, max: 600, noNaN: true }),
            uncertaintyMm: fc.option(fc.double({ min: 0, max: 1, noNaN: true })),
          }),
          { maxLength: 4 },
        ),
        closing: pair,
      }),
      { minLength: 1, maxLength: 5 },
    );
    fc.assert(
      fc.property(stations, (list) => {
        const found = coldTargets({ stations: list, rotor, wire: null }).stations;
        const reversed = coldTargets({ stations: [...list].reverse(), rotor, wire: null }).stations;
        expect([...reversed].reverse()).toEqual(found);
        for (const { target, base, growth: grown, closing } of found)
          for (const plane of ["hMm", "vMm"] as const)
            expect(Math.abs(target[plane] + grown[plane] + closing[plane] - base[plane])).toBeLessThan(1e-12);
      }),
    );
  });
});

describe("bendRotor", () => {
  it("knows no gravity in h: two bearings leave the shaft straight there", () => {
    const { h } = bendRotor(rotor);
    expect(h.supports.map(({ reactionN }) => Math.abs(reactionN))).toEqual([0, 0]);
  });

  it("bends alike in h and v what has no weight", () => {
    const weightless = { ...shaft, densityKgPerMm3: 0 };
    const supports = [0, 1500, 4000].map((zMm, i) => ({ zMm, line: at(i * i, i * i), running: none }));
    const { h, v } = bendRotor({ shaft: weightless, supports });
    expect(h).toEqual(v);
  });

  it("weighs a hollow shaft and its masses: the reactions carry them", () => {
    const sections = [
      { lengthMm: 1000, outerMm: 400, innerMm: 0 },
      { lengthMm: 3000, outerMm: 300, innerMm: 299.9 },
    ];
    const masses = [
      { zMm: 0, massKg: 70 },
      { zMm: 2500, massKg: 300 },
    ];
    const { v } = bendRotor({ ...rotor, shaft: { ...shaft, sections, masses } });
    const kg = (Math.PI / 4) * 7.85e-6 * (1000 * 400 ** 2 + 3000 * (300 ** 2 - 299.9 ** 2)) + 370;
    const carried = v.supports.reduce((sum, { reactionN }) => sum + reactionN, 0);
    expect(Math.abs(carried / (kg * 9.80665) - 1)).toBeLessThan(1e-12);
  });
});

describe("runningFromClearance", () => {
  it("rests on the bottom by the radial clearance, less its lift", () => {
    expect(runningFromClearance(0.25, at(0.06, 0.1))).toEqual(at(0.06, -0.15));
  });
});
