import { describe, expect, it } from "vitest";
import { stationAt, stationsOnLine } from "../../../tests/support/axis-stations.ts";
import { evidenceOf, lineOf, optimalCases, solveOptimal } from "../../../tests/support/optimal-axes.ts";
import { verifyLine, type LineClaim } from "./verify-line.ts";

const near = (got: number, wanted: number, within = 1e-12) =>
  expect(Math.abs(got - wanted)).toBeLessThan(within); // mm

describe("deviationsFromAxis against optima known in closed form", () => {
  const eighths = Array.from({ length: 9 }, (_, k) => k / 8);
  const parabola = stationsOnLine(
    eighths,
    eighths.map((z) => z * z),
    null,
  );

  it("finds x − 1/8 as the line nearest x² on [0, 1] (Chebyshev; any text on approximation), in both planes", () => {
    for (const zone of ["planes", "cylinder"] as const) {
      const found = solveOptimal("minimum_zone", zone, parabola);
      const [a, b, c, d] = lineOf(found);
      near(a, -1 / 8);
      near(b, 1);
      near(c, 1 / 8);
      near(d, -1);
      // In both planes alike the distances are √2 times as long.
      near(evidenceOf(found).h.extentMm, zone === "planes" ? 1 / 4 : Math.SQRT2 / 4);
      expect(evidenceOf(found).h.contacts).toEqual([0, 4, 8]);
      expect(evidenceOf(found).h.multipliers.map(({ place }) => place)).toEqual([0, 4, 8]);
    }
    // Multipliers of a zone over three evenly spaced stations: a quarter, a half, a quarter, with signs in turn.
    const { multipliers } = evidenceOf(solveOptimal("minimum_zone", "planes", parabola)).h;
    multipliers.forEach(({ h }, i) => near(h, [1 / 4, -1 / 2, 1 / 4][i]!));
  });

  it("finds the lines of S. Dasgupta, C. Papadimitriou, U. Vazirani, Algorithms (2006), exercise 7.8 (answers: exact fractions)", () => {
    const stations = stationsOnLine([1, 2, 3, 5, 7, 8, 10], [3, 5, 7, 11, 14, 15, 19], null);
    const zone = solveOptimal("minimum_zone", "planes", stations);
    near(zone.axis.h.slope, 12 / 7);
    near(zone.axis.h.at0Mm, 13 / 7);
    near(evidenceOf(zone).h.extentMm, 8 / 7);
    near(evidenceOf(solveOptimal("least_absolute", "planes", stations)).v.extentMm, 2);
  });

  it("leaves six of nine stations where A. Siegel's example bends least squares (Rousseeuw and Leroy 1987, p. 60; answer: exact fractions)", () => {
    const stations = stationsOnLine([-4, -3, -2, -1, 0, 1, 2, 3, 12], [0, 0, 0, 0, 0, 0, -5, 5, 1], null);
    const found = solveOptimal("least_absolute", "planes", stations);
    near(found.axis.h.at0Mm, 1 / 7);
    near(found.axis.h.slope, 1 / 14);
    near(evidenceOf(found).h.extentMm, 74 / 7);
    expect(evidenceOf(found).h.unique).toBe(true);
  });

  it("finds a cylinder held by two zones across each other, all of whose stations touch", () => {
    // h alternates at −3, −1, 1 and v at −2, 0, 2; the axis is 0 since each plane's three balance (1 : 2 : 1).
    const stations = [
      stationAt(-3, 0.5, 0),
      stationAt(-2, 0, -0.5),
      stationAt(-1, -0.5, 0),
      stationAt(0, 0, 0.5),
      stationAt(1, 0.5, 0),
      stationAt(2, 0, -0.5),
    ];
    const found = solveOptimal("minimum_zone", "cylinder", stations);
    for (const value of lineOf(found)) near(value, 0);
    near(evidenceOf(found).h.extentMm, 1);
    expect(evidenceOf(found).h.contacts).toEqual([0, 1, 2, 3, 4, 5]);
    expect(evidenceOf(found).h.unique).toBe(true);
  });

  it("finds the smallest circle where stations round one z need the widest cylinder", () => {
    const clock = [90, 210, 330].map((deg) => (deg * Math.PI) / 180);
    const ring = clock.map((rad) => stationAt(100, 2 * Math.sin(rad) + 0.1, 2 * Math.cos(rad)));
    const far = [stationAt(0, 0.3, 0), stationAt(300, 0.1, 0.5)];
    const found = solveOptimal("minimum_zone", "cylinder", [...ring, ...far]);
    near(evidenceOf(found).h.extentMm, 4);
    near(found.axis.h.at0Mm + 100 * found.axis.h.slope, 0.1);
    expect(evidenceOf(found).h.unique).toBe(false);
    // Of the open slope, by hand: h 0.2 at −100 and 0 at 200, v 0 and 0.5, from the centre of the ring. The two
    // distances |d₁ + 100 s| and |d₂ − 200 s| are least when both point one way: (2·d₁ + d₂)/3 long each.
    const reach = Math.hypot(0.4, 0.5) / 3;
    near(Math.hypot(found.stations[3]!.deviation.hMm, found.stations[3]!.deviation.vMm), reach);
    near(Math.hypot(found.stations[4]!.deviation.hMm, found.stations[4]!.deviation.vMm), reach);
  });

  it("leaves the most stations untouched: five on a line in space, and three far off it", () => {
    const onLine = [0, 700, 1500, 2100, 3000].map((z) => stationAt(z, 0.2 + 1e-4 * z, -0.1 - 2e-4 * z));
    const off = [stationAt(300, 2, 1), stationAt(1200, -1, 0.5), stationAt(2600, 0.5, -3)];
    for (const zone of ["planes", "cylinder"] as const) {
      const found = solveOptimal("least_absolute", zone, [...onLine, ...off]);
      const [a, b, c, d] = lineOf(found);
      near(a, 0.2);
      near(b, 1e-4, 1e-15);
      near(c, -0.1);
      near(d, -2e-4, 1e-15);
      expect(evidenceOf(found).h.contacts).toEqual([0, 1, 2, 3, 4]);
    }
  });

  it("passes through the outer two of three stations, in space as in each plane", () => {
    const stations = [stationAt(0, 0.1, 0.2), stationAt(400, 0.7, -0.9), stationAt(1000, -0.3, 0.5)];
    for (const zone of ["planes", "cylinder"] as const) {
      const found = solveOptimal("least_absolute", zone, stations);
      expect(found.stations[0]!.deviation).toEqual({ hMm: 0, vMm: 0 });
      expect(found.stations[2]!.deviation).toEqual({ hMm: 0, vMm: 0 });
    }
  });

  it("draws the axis to a station by its weight", () => {
    // Of three stations 0, 1, 0 with weight w at the middle: distances d, 1/w-fold there: by hand d·(1 + 1/w) = 1.
    for (const weight of [0.25, 1, 4, 100]) {
      const stations = [0, 1, 0].map((h, i) => stationAt(i, h, 0, { weight: i === 1 ? weight : 1 }));
      const found = solveOptimal("minimum_zone", "planes", stations);
      near(Math.abs(found.stations[0]!.deviation.hMm), weight / (weight + 1));
      near(Math.abs(found.stations[1]!.deviation.hMm), 1 / (weight + 1));
      near(evidenceOf(found).h.extentMm, (2 * Math.max(weight, 1)) / (weight + 1));
      near(evidenceOf(found).h.objectiveMm, weight / (weight + 1));
    }
    // A sum passes through the middle once it outweighs what the ends can hold: 2·weight > 2 there.
    const sum = (weight: number) =>
      solveOptimal(
        "least_absolute",
        "planes",
        [0, 1, 0].map((h, i) => stationAt(i, h, 0, { weight: i === 1 ? weight : 1 })),
      );
    expect(sum(1.9).stations[1]!.deviation.hMm).not.toBe(0);
    expect(sum(2.1).stations[1]!.deviation.hMm).toBe(0);
  });
});

describe("verifyLine", () => {
  const good: LineClaim = {
    aim: "largest",
    along: Float64Array.of(-1, 0, 1),
    deviationsMm: [Float64Array.of(0.5, -0.5, 0.5)],
    weights: [1, 1, 1],
    multipliers: [Float64Array.of(1, -2, 1)],
    roundingMm: 0,
  };
  const refused = expect.objectContaining({ code: "not_converged" }) as Error;

  it("sizes the multipliers and finds the bound", () => {
    const { objectiveMm, lowerBoundMm, multipliers } = verifyLine(good);
    expect({ objectiveMm, lowerBoundMm }).toEqual({ objectiveMm: 0.5, lowerBoundMm: 0.5 });
    expect([...multipliers[0]!]).toEqual([0.25, -0.5, 0.25]);
  });

  it("refuses a line that is not the best by one part in ten million", () => {
    const deviationsMm = [Float64Array.of(0.5, -0.5, 0.5 + 1e-7)];
    expect(() => verifyLine({ ...good, deviationsMm })).toThrow(refused);
    expect(() => verifyLine({ ...good, deviationsMm, roundingMm: 1e-6 })).not.toThrow();
  });

  it("refuses multipliers that feel a straight line, or that say nothing", () => {
    expect(() => verifyLine({ ...good, multipliers: [Float64Array.of(1, -2, 1.001)] })).toThrow(refused);
    expect(() => verifyLine({ ...good, multipliers: [Float64Array.of(0, 0, 0)] })).toThrow(refused);
    expect(() => verifyLine({ ...good, multipliers: [Float64Array.of(-1, 2, -1)] })).toThrow(refused);
    expect(() => verifyLine({ ...good, multipliers: [Float64Array.of(NaN, 2, -1)] })).toThrow(refused);
  });

  it("refuses, for a sum, a pull at a passed station that is longer than its weight", () => {
    // Σ of |d| with d = 0, 1, 0: at the ends pulls of ½ balance the middle's 1; at the middle alone nothing can.
    const sum: LineClaim = {
      ...good,
      aim: "sum",
      deviationsMm: [Float64Array.of(0, 1, 0)],
      multipliers: [Float64Array.of(-0.5, 1, -0.5)],
    };
    expect(verifyLine(sum).lowerBoundMm).toBe(1);
    const weights = [0.4, 1, 1];
    expect(() => verifyLine({ ...sum, weights })).toThrow(refused);
  });
});

describe.each(optimalCases)("deviationsFromAxis: %s, %s, with three stations", (method, zone) => {
  it("answers the deviations of a bend: half of it in the middle, or all of it", () => {
    const stations = [stationAt(0, 0, 0), stationAt(1, 0.03, 0.04), stationAt(2, 0, 0)];
    const [first, middle] = solveOptimal(method, zone, stations).stations;
    const share = method === "minimum_zone" ? 1 / 2 : 1;
    near(middle!.deviation.hMm, 0.03 * share);
    near(middle!.deviation.vMm, 0.04 * share);
    near(first!.deviation.hMm, 0.03 * (share - 1));
  });
});
