import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  allFinite,
  feetAt,
  jointKeysAt,
  moveProblem,
  padsAt,
  partOn,
  range,
  solvePart,
  stackOf,
  stationOff,
  unlimited,
} from "../../../tests/support/move-problems.ts";
import type { MoveProblem, MoveSupport } from "./move-problem.ts";
import { solveMoves } from "./solve-moves.ts";

/** Solves, and expects finite numbers or a refusal by code; answers the code, or null. */
function codeOf(problem: MoveProblem): string | null {
  try {
    expect(allFinite(solveMoves(problem))).toBe(true);
    return null;
  } catch (error) {
    expect(error).toMatchObject({ name: "ComputeError" });
    return (error as { code: string }).code;
  }
}

const keyed = { left: stackOf(5), right: stackOf(5), "key-left": stackOf(4), "key-right": stackOf(4) };

describe("solveMoves with hostile input", () => {
  it("refuses a tolerance of 0, or a range the wrong way round, by code", () => {
    const tolerances = [
      { form: "radial", halfWidthMm: 0 },
      { form: "radial", halfWidthMm: -1 },
      { form: "planes", h: range(0, 0), v: range(-1, 1) },
      { form: "planes", h: range(-1, 1), v: range(1, -1) },
    ] as const;
    for (const tolerance of tolerances) {
      for (const cutIncrementMm of [null, 0.01]) {
        const bad = stationOff("bad", 0, 0.1, 0.1, null, { tolerance });
        const solveIt = () =>
          solvePart([stationOff("s", 9, 0, 0), bad], [feetAt("f", 0)], { cutIncrementMm });
        expect(solveIt).toThrow(expect.objectContaining({ code: "tolerance_invalid" }) as Error);
      }
    }
  });

  it("answers for deviations of 1e9 mm and tolerances of 1e-6 mm", () => {
    for (const cutIncrementMm of [null, 1e6, 1e9]) {
      const stations = [stationOff("a", 0, 1e9, -1e9, 1e-6), stationOff("b", 1e10, -1e9, 1e9, 1e-6)];
      const supports = [feetAt("f", -1e10), feetAt("g", 1e10)];
      const { answer } = solvePart(stations, supports, { cutIncrementMm });
      // h: 1e9 at 0 and −1e9 at 1e10, so that the part moves by −3e9 at −1e10 and by 1e9 at 1e10.
      expect(Math.abs(answer.ideal[0]!.hMm / -3e9 - 1)).toBeLessThan(1e-12);
      expect(Math.abs(answer.ideal[1]!.hMm / 1e9 - 1)).toBeLessThan(1e-12);
    }
  });

  it("refuses by code what would take too many trials", () => {
    const stations = [0, 1000, 2500].map((z, i) => stationOff(`s${i}`, z, 0.05 * i, -0.13 * i));
    const many = Array.from({ length: 40 }, (_, k) => feetAt(`f${k}`, 100 * k, { stacks: keyed }));
    const problem = (supports: readonly MoveSupport[], cutIncrementMm: number) =>
      moveProblem(stations, [partOn("part", ["s0", "s1", "s2"], supports)], { cutIncrementMm });
    expect(codeOf(problem(many, 0.001))).toBe("too_many_choices");
    expect(codeOf(problem([padsAt("p", 0, [90, 120, 150, 180, 210, 240, 270])], 1e-5))).toBe(
      "too_many_choices",
    );
    // Without shims to choose nothing is searched.
    expect(codeOf({ ...problem(many, 1), cutIncrementMm: null })).toBe(null);
  });

  it("answers for ten supports of two feet and two keys, which the part follows within the misfit", () => {
    const supports = Array.from({ length: 10 }, (_, k) => feetAt(`f${k}`, 400 * k, { stacks: keyed }));
    const stations = [stationOff("a", 0, 0.12, -0.31), stationOff("b", 3600, -0.2, -0.05)];
    const { answer } = solvePart(stations, supports, { cutIncrementMm: 0.05 });
    expect(answer.stacks.length).toBe(40);
    for (const { misfitMm } of answer.stacks) expect(Math.abs(misfitMm)).toBeLessThanOrEqual(0.02 + 1e-9);
  });

  it("spends its trials per call too: parts after the budget is gone are refused, not awaited", () => {
    const parts = Array.from({ length: 60 }, (_, k) =>
      partOn(`part-${k}`, [`s${k}`], [padsAt("p", 1000 * k, [110, 140, 180, 220, 250])]),
    );
    const stations = parts.map((_, k) => stationOff(`s${k}`, 1000 * k, 0.0713, -0.1119));
    expect(codeOf(moveProblem(stations, parts, { cutIncrementMm: 0.002 }))).toBe("too_many_choices");
  });

  it("finds no move, by code or in words, where limits contradict each other at many supports", () => {
    const supports = Array.from({ length: 30 }, (_, k) =>
      feetAt(`f${k}`, 100 * k, { travel: { h: unlimited, v: k % 2 ? range(0.1, 0.2) : range(-0.2, -0.1) } }),
    );
    const { answer } = solvePart([stationOff("a", 0, 0, 0.3)], supports, { cutIncrementMm: 0.01 });
    expect(answer.unreachable?.cause).toBe("contradiction");
  });

  it("answers finite numbers or refuses by code, whatever the numbers", () => {
    const extreme = fc.constantFrom(-1e9, -1e6, -0.3, -1e-9, -5e-324, 0, 1e-15, 1e-6, 0.02, 1, 1e4, 1e9);
    const size = extreme.map(Math.abs);
    const tolerance = fc.oneof(
      fc.constant(null),
      size.map((halfWidthMm) => ({ form: "radial", halfWidthMm }) as const),
      fc
        .tuple(extreme, extreme, extreme, extreme)
        .map(([a, b, c, d]) => ({ form: "planes", h: range(a, b), v: range(c, d) }) as const),
    );
    const stack = fc
      .record({
        thick: size,
        min: size,
        max: fc.oneof(size, fc.constant(Infinity)),
        maxCount: fc.integer({ min: 0, max: 3 }),
      })
      .map(({ thick, min, max, maxCount }) => stackOf(thick, { minMm: min, maxMm: max, maxCount }));
    const limits = fc.tuple(extreme, extreme).map(([a, b]) => range(a, b));
    const support = fc
      .record({
        form: fc.constantFrom("feet", "joint", "pads"),
        z: extreme,
        stacks: fc.tuple(stack, stack, stack),
        travel: fc.record({
          h: fc.oneof(limits, fc.constant(unlimited)),
          v: fc.oneof(limits, fc.constant(unlimited)),
        }),
        blocked: fc.constantFrom([], ["h"] as const, ["v"] as const, ["h", "v"] as const),
        clocks: fc.array(fc.constantFrom(0, 30, 90, 135, 180, 225, 359), { minLength: 1, maxLength: 4 }),
      })
      .map(({ form, z, stacks: [a, b, c], travel, blocked, clocks }) => (index: number) => {
        const rest = { travel, blocked };
        if (form === "feet")
          return feetAt(`f${index}`, z, { ...rest, stacks: { left: a, right: b, "key-left": c } });
        if (form === "joint")
          return jointKeysAt(`f${index}`, z, { ...rest, stacks: { "key-left": a, "key-right": b } });
        return padsAt(`f${index}`, z, [...new Set(clocks)], a, rest);
      });
    const station = fc.record({ z: extreme, h: extreme, v: extreme, tolerance });
    let answered = 0;
    fc.assert(
      fc.property(
        fc.array(station, { minLength: 1, maxLength: 4 }),
        fc.array(support, { minLength: 1, maxLength: 3 }),
        fc.option(
          size.filter((mm) => mm > 0),
          { nil: null },
        ),
        size,
        (stations, supports, cutIncrementMm, maximumMisfitMm) => {
          const all = stations.map(({ z, h, v, tolerance: t }, i) =>
            stationOff(`s${i}`, z, h, v, null, { tolerance: t }),
          );
          const part = partOn(
            "part",
            all.map(({ id }) => id),
            supports.map((make, index) => make(index)),
          );
          const code = codeOf(moveProblem(all, [part], { cutIncrementMm, maximumMisfitMm }));
          if (code === null) answered++;
          expect([
            null,
            "tolerance_invalid",
            "too_many_choices",
            "not_converged",
            "result_overflow",
          ]).toContain(code);
        },
      ),
      { numRuns: 300 },
    );
    expect(answered).toBeGreaterThan(50);
  });
});
