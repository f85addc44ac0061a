import fc from "fast-check";
import { Matrix, solve } from "ml-matrix";
import { describe, expect, it } from "vitest";
import { feetAt, range, solvePart, stationOff, unlimited } from "../../../tests/support/move-problems.ts";
import type { MoveStation, MoveSupport } from "./move-problem.ts";

const near = (got: number, wanted: number, within = 1e-12) =>
  expect(Math.abs(got - wanted)).toBeLessThan(within); // mm

const liftsOf = (stations: readonly MoveStation[], supports: readonly MoveSupport[]) =>
  solvePart(stations, supports).answer.ideal.map(({ vMm }) => vMm);

describe("the ideal move on one support", () => {
  it("is a translation: the mean of what its stations ask, weighted by 1/T²", () => {
    const support = [feetAt("f", 1000)];
    near(liftsOf([stationOff("a", 800, 0, 0.3), stationOff("b", 1200, 0, 0.1)], support)[0]!, -0.2);
    // Weights 4 : 1, so −(4·0.3 + 0.1)/5.
    const [unequal] = liftsOf(
      [stationOff("a", 800, 0, 0.3, 0.05), stationOff("b", 1200, 0, 0.1, 0.1)],
      support,
    );
    near(unequal!, -0.26);
  });

  it("stays a translation where several supports stand at one z", () => {
    const stations = [stationOff("a", 800, 0, 0.3), stationOff("b", 1200, 0, 0.1)];
    for (const z of [0, 1000, 1e6]) {
      liftsOf(stations, [feetAt("f", z), feetAt("g", z), feetAt("k", z)]).forEach((lift) => near(lift, -0.2));
    }
  });

  it("measures from the middle of a one-sided tolerance, and weights by its half-width", () => {
    const oneSided = (id: string, z: number, v: number, min: number, max: number) =>
      stationOff(id, z, 0, v, null, {
        tolerance: { form: "planes", h: range(-1, 1), v: range(min, max) },
      });
    near(liftsOf([oneSided("a", 0, 0.5, 0, 0.2)], [feetAt("f", 0)])[0]!, -0.4);
    // Wanted −0.4 with T = 0.1 and 0 with T = 0.2: weights 4 : 1.
    near(
      liftsOf([oneSided("a", 0, 0.5, 0, 0.2), oneSided("b", 9, 0.1, -0.1, 0.3)], [feetAt("f", 0)])[0]!,
      -0.32,
    );
  });

  it("lets a station without tolerance be carried along; where none has one, all ask alike", () => {
    const support = [feetAt("f", 0)];
    near(liftsOf([stationOff("a", 0, 0, 0.3), stationOff("b", 9, 0, 9, null)], support)[0]!, -0.3);
    near(liftsOf([stationOff("a", 0, 0, 0.3, null), stationOff("b", 9, 0, 0.1, null)], support)[0]!, -0.2);
  });
});

describe("the ideal move on two supports", () => {
  const supports = [feetAt("f", 0), feetAt("g", 1000)];

  it("translates for one station midway", () => {
    const [front, rear] = liftsOf([stationOff("s", 500, 0, -0.3)], supports);
    near(front!, 0.3);
    near(rear!, 0.3);
  });

  it("moves the supports least, in the sum of squares, for one station anywhere", () => {
    // ¾a + ¼b = 0.3 with a² + b² least: a = 0.3·¾/(⅝) = 0.36, b = 0.12.
    const [front, rear] = liftsOf([stationOff("s", 250, 0, -0.3)], supports);
    near(front!, 0.36);
    near(rear!, 0.12);
  });

  it("brings two stations to their targets exactly, wherever their supports are", () => {
    // Lift +0.1 at 250 and −0.1 at 750: slope −0.2 over 500, so +0.2 at 0 and −0.2 at 1000.
    const stations = [stationOff("a", 250, 0, -0.1), stationOff("b", 750, 0, 0.1)];
    const [front, rear] = liftsOf(stations, supports);
    near(front!, 0.2);
    near(rear!, -0.2);
    const [inner, outer] = liftsOf(stations, [feetAt("f", 400), feetAt("g", 900)]);
    near(inner!, 0.04);
    near(outer!, -0.16);
  });

  const pair = [stationOff("a", 250, 0, -0.1), stationOff("b", 750, 0, 0.1)];

  it("stops at a travel limit and makes the best of the other support", () => {
    // With a = 0.15: (¾a + ¼b − 0.1)² + (¼a + ¾b + 0.1)² is least at ⅜a + ⅝b + 0.05 = 0, b = −0.17.
    const limited = feetAt("f", 0, { travel: { h: unlimited, v: range(-0.1, 0.15) } });
    const [front, rear] = liftsOf(pair, [limited, supports[1]!]);
    near(front!, 0.15);
    near(rear!, -0.17);
  });

  it("turns about a support that is blocked", () => {
    // The same with a = 0: b = −0.05/⅝ = −0.08.
    const [front, rear] = liftsOf(pair, [feetAt("f", 0, { blocked: ["v"] }), supports[1]!]);
    expect(front).toBe(0);
    near(rear!, -0.08);
  });

  it("does not move in a direction that is blocked at both", () => {
    const blocked = [feetAt("f", 0, { blocked: ["v"] }), feetAt("g", 1000, { blocked: ["v", "h"] })];
    const { answer } = solvePart([stationOff("a", 250, 0.2, -0.1), stationOff("b", 750, 0.2, 0.1)], blocked);
    expect(answer.ideal.map(({ vMm }) => vMm)).toEqual([0, 0]);
    // In h it turns about the rear support: ¾a − and ¼a against −0.2 each, a = −0.2·(¾ + ¼)/(⅝) = −0.32.
    near(answer.ideal[0]!.hMm, -0.32);
    expect(answer.ideal[1]!.hMm).toBe(0);
  });
});

describe("the ideal move against weighted least squares of ml-matrix", () => {
  const offset = fc.double({ min: -2, max: 2, noNaN: true });
  const part = fc
    .record({
      stations: fc.array(
        fc.record({
          step: fc.double({ min: 20, max: 800, noNaN: true }),
          h: offset,
          v: offset,
          tolerance: fc.double({ min: 0.01, max: 0.5, noNaN: true }),
        }),
        { minLength: 2, maxLength: 8 },
      ),
      supports: fc.array(fc.double({ min: 100, max: 2000, noNaN: true }), { minLength: 2, maxLength: 5 }),
    })
    .map(({ stations, supports }) => {
      let at = -1500;
      const all = stations.map(({ step, h, v, tolerance }, i) =>
        stationOff(`s${i}`, (at += step), h, v, tolerance),
      );
      let z = -2000;
      return { stations: all, supports: supports.map((step, i) => feetAt(`f${i}`, (z += step))) };
    });

  it("agrees with it in both planes when no limit binds", () => {
    fc.assert(
      fc.property(part, ({ stations, supports }) => {
        const { answer } = solvePart(
          stations,
          supports.map((support) => ({ ...support, stacks: {} })),
        );
        const weights = stations.map(({ tolerance }) =>
          tolerance?.form === "radial" ? 1 / tolerance.halfWidthMm : 0,
        );
        const design = new Matrix(stations.map(({ zMm }, i) => [weights[i]!, (weights[i]! * zMm) / 1000]));
        const off = new Matrix(
          stations.map(({ deviation }, i) => [-deviation.hMm * weights[i]!, -deviation.vMm * weights[i]!]),
        );
        const line = solve(design, off, true).to2DArray();
        answer.ideal.forEach(({ hMm, vMm }, k) => {
          const z = supports[k]!.zMm / 1000;
          // Stations 20 mm apart steer supports metres away: rounding grows by some hundreds.
          near(hMm, line[0]![0]! + line[1]![0]! * z, 1e-9);
          near(vMm, line[0]![1]! + line[1]![1]! * z, 1e-9);
        });
      }),
    );
  });
});
