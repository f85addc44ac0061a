import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { axisInput, stationAt } from "../../../tests/support/axis-stations.ts";
import {
  byHighs,
  largestOf,
  linesOfPairs,
  sumOf,
  sumOfPairs,
  zoneOfTriples,
  type OracleLine,
} from "../../../tests/support/line-oracles.ts";
import {
  coarseSurvey,
  evidenceOf,
  inPlane,
  lineOf,
  solveOptimal,
  survey,
  toOracle,
} from "../../../tests/support/optimal-axes.ts";
import { deviationsFromAxis } from "./deviations-from-axis.ts";

const near = (got: number, wanted: number, within = 1e-12) =>
  expect(Math.abs(got - wanted)).toBeLessThan(within); // mm
const planes = ["h", "v"] as const;

describe("deviationsFromAxis: minimum_zone in each plane", () => {
  it("finds the zone of the three stations, or two at one z, that need the widest: brute force", () => {
    fc.assert(
      fc.property(fc.oneof(survey(), survey({ weighted: true }), coarseSurvey), (stations) => {
        const evidence = evidenceOf(solveOptimal("minimum_zone", "planes", stations));
        for (const plane of planes) {
          near(evidence[plane].objectiveMm, zoneOfTriples(inPlane(toOracle(stations), plane)));
        }
      }),
      { numRuns: 150 },
    );
  });

  it("finds the zone that HiGHS finds as a linear program", async () => {
    await fc.assert(
      fc.asyncProperty(survey({ weighted: true, most: 60 }), async (stations) => {
        const evidence = evidenceOf(solveOptimal("minimum_zone", "planes", stations));
        near(evidence.h.objectiveMm, await byHighs("largest", inPlane(toOracle(stations), "h")), 1e-7);
      }),
      { numRuns: 25 },
    );
  });

  it("touches at three stations at least, on one side and the other in turn along z", () => {
    fc.assert(
      fc.property(survey(), (stations) => {
        const found = solveOptimal("minimum_zone", "planes", stations);
        const { contacts, extentMm } = evidenceOf(found).h;
        fc.pre(extentMm > 1e-6);
        const sides = contacts.map((place) => found.stations[place]!.deviation.hMm);
        expect(contacts.length).toBeGreaterThanOrEqual(3);
        for (const side of sides) near(2 * Math.abs(side), extentMm);
        const turns = sides.filter((side, i) => i > 0 && side * sides[i - 1]! < 0);
        expect(turns.length).toBeGreaterThanOrEqual(2);
      }),
    );
  });

  it("is no wider than the zone about the least-squares axis", () => {
    fc.assert(
      fc.property(survey(), (stations) => {
        const squares = deviationsFromAxis(axisInput("least_squares", [...stations.keys()], stations));
        const zone = evidenceOf(solveOptimal("minimum_zone", "cylinder", stations)).h.objectiveMm;
        expect(zone).toBeLessThanOrEqual(largestOf(toOracle(stations), lineOf(squares)) * (1 + 1e-12));
      }),
    );
  });

  it("takes the slope nearest the other stations where the widest place stands at one z, and says so", () => {
    // ±1 at z = 0 leaves the slope open; 0.3 and 0.5 at 100 and 200: the line that misses both by a tenth... by hand:
    // least largest |0.3 − 100s|, |0.5 − 200s| is where they are equal and opposite: s = 0.8/300, distance 1/30.
    const stations = [
      stationAt(0, 1, 0),
      stationAt(0, -1, 0),
      stationAt(100, 0.3, 0),
      stationAt(200, 0.5, 0),
    ];
    const found = solveOptimal("minimum_zone", "planes", stations);
    near(found.axis.h.slope, 0.8 / 300, 1e-15);
    near(found.stations[2]!.deviation.hMm, 1 / 30);
    near(found.stations[3]!.deviation.hMm, -1 / 30);
    const { contacts, extentMm, unique } = evidenceOf(found).h;
    expect({ contacts, extentMm, unique }).toEqual({ contacts: [0, 1], extentMm: 2, unique: false });
    expect(found.axis.warnings.map(({ code }) => code)).toContain("axis_not_unique");
    expect(found.axis.warnings[0]!.detail).toBe(
      "A reference station that sets the axis states no covariance: nothing shows how well the axis is known.",
    );
    expect(found.axis.warnings[1]!.detail).toMatch(/^In h all reference stations that touch/);
  });
});

describe("deviationsFromAxis: least_absolute in each plane", () => {
  it("finds the least sum of all lines through two stations: brute force", () => {
    fc.assert(
      fc.property(fc.oneof(survey(), survey({ weighted: true }), coarseSurvey), (stations) => {
        const evidence = evidenceOf(solveOptimal("least_absolute", "planes", stations));
        for (const plane of planes) {
          near(evidence[plane].objectiveMm, sumOfPairs(inPlane(toOracle(stations), plane)), 1e-11);
        }
      }),
      { numRuns: 150 },
    );
  });

  it("finds the sum that HiGHS finds as a linear program", async () => {
    await fc.assert(
      fc.asyncProperty(survey({ weighted: true, most: 60 }), async (stations) => {
        const evidence = evidenceOf(solveOptimal("least_absolute", "planes", stations));
        near(evidence.h.objectiveMm, await byHighs("sum", inPlane(toOracle(stations), "h")), 1e-6);
      }),
      { numRuns: 25 },
    );
  });

  it("passes through two stations at least, whose deviations are exactly 0", () => {
    fc.assert(
      fc.property(survey({ weighted: true }), (stations) => {
        const found = solveOptimal("least_absolute", "planes", stations);
        const { contacts } = evidenceOf(found).v;
        const exact = contacts.filter((place) => found.stations[place]!.deviation.vMm === 0);
        expect(exact.length).toBeGreaterThanOrEqual(2);
      }),
    );
  });

  it("takes, of the lines through two stations with one least sum, that of least squares: brute force", () => {
    let several = 0;
    fc.assert(
      fc.property(coarseSurvey, (stations) => {
        const found = evidenceOf(solveOptimal("least_absolute", "planes", stations)).h;
        const oracle = inPlane(toOracle(stations), "h");
        const squares = (line: OracleLine) => oracle.reduce((sum, one) => sum + sumOf([one], line) ** 2, 0);
        const equal = linesOfPairs(oracle).filter((line) => sumOf(oracle, line) <= found.objectiveMm + 1e-9);
        const { axis } = solveOptimal("least_absolute", "planes", stations);
        const answered = squares([axis.h.at0Mm, axis.h.slope, 0, 0]);
        near(answered, Math.min(...equal.map(squares)), 1e-9);
        const ends = (line: OracleLine) => [line[0], line[0] + 500 * line[1]];
        const differ = (one: OracleLine, other: OracleLine) =>
          ends(one).some((value, i) => Math.abs(value - ends(other)[i]!) > 1e-6);
        const apart = equal.some((one) => differ(one, equal[0]!));
        expect(found.unique).toBe(!apart);
        if (apart) several += 1;
      }),
      { numRuns: 300 },
    );
    expect(several).toBeGreaterThan(20);
  });

  it("takes the least squares of the lines with one least sum, and says so", () => {
    // Evenly spaced, 0 1 1 0 in h: the sum is 2 for every line between v = 0 and v = 1; by hand the lines through two
    // stations with the sum 2 are v = 0, v = 1, z, and 3 − z (in steps of z), with squares 2, 2, 5 and 5.
    const stations = [0, 1, 1, 0].map((h, i) => stationAt(i, h, 0));
    const found = solveOptimal("least_absolute", "planes", stations);
    expect(evidenceOf(found).h.unique).toBe(false);
    near(evidenceOf(found).h.objectiveMm, 2);
    near(found.axis.h.slope, 0);
    expect(found.axis.warnings.map(({ detail }) => detail)).toContainEqual(
      expect.stringContaining("In h several axes have the same least sum"),
    );
  });
});
