import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { lineOf, optimalCases, solveOptimal, survey } from "../../../tests/support/optimal-axes.ts";
import type { PlaneVector } from "../plane.ts";
import type { AxisStation } from "./axis-input.ts";
import type { AxisDeviations } from "./axis-result.ts";

/** mm. Contacts may stand 50 mm apart and other stations metres away, which enlarges rounding. */
const roundingMm = 1e-9;
const near = (got: number, wanted: number, within = roundingMm) =>
  expect(Math.abs(got - wanted)).toBeLessThan(within);

const turnRad = fc.double({ min: 0, max: 2 * Math.PI, noNaN: true });
const offset = fc.double({ min: -2, max: 2, noNaN: true });
const stationsAny = fc.oneof(survey(), survey({ weighted: true }));

const withCentre = (
  one: AxisStation,
  change: (centre: PlaneVector, zMm: number) => PlaneVector,
): AxisStation => ({
  ...one,
  centre: change(one.centre, one.zMm),
});

function expectDeviations(
  after: AxisDeviations,
  before: AxisDeviations,
  change: (deviation: PlaneVector) => PlaneVector = (deviation) => deviation,
): void {
  before.stations.forEach(({ deviation }, i) => {
    const wanted = change(deviation);
    near(after.stations[i]!.deviation.hMm, wanted.hMm);
    near(after.stations[i]!.deviation.vMm, wanted.vMm);
  });
}

describe.each(optimalCases)("deviationsFromAxis: %s, %s", (method, zone) => {
  const solve = (stations: readonly AxisStation[]) => solveOptimal(method, zone, stations);
  /** Solves before and after; surveys with several best axes are left out, since any of those may be answered. */
  const solveUnique = (stations: readonly AxisStation[]) => {
    const found = solve(stations);
    fc.pre(!found.axis.warnings.some(({ code }) => code === "axis_not_unique"));
    return found;
  };

  it("does not feel a shift and tilt of the whole survey, which the axis takes up", () => {
    fc.assert(
      fc.property(stationsAny, offset, offset, offset, (stations, h, v, tilt) => {
        const slope = tilt * 1e-3;
        const before = solveUnique(stations);
        const after = solve(
          stations.map((one) =>
            withCentre(one, ({ hMm, vMm }, z) => ({ hMm: hMm + h + slope * z, vMm: vMm + v - slope * z })),
          ),
        );
        expectDeviations(after, before);
        near(after.axis.h.slope - before.axis.h.slope, slope, 1e-11);
      }),
    );
  });

  it("does not feel where z = 0 was put", () => {
    fc.assert(
      fc.property(stationsAny, fc.double({ min: -1e5, max: 1e5, noNaN: true }), (stations, along) => {
        const before = solveUnique(stations);
        expectDeviations(solve(stations.map((one) => ({ ...one, zMm: one.zMm + along }))), before);
      }),
    );
  });

  it("looks the same from the other side and from the other end", () => {
    fc.assert(
      fc.property(stationsAny, (stations) => {
        const before = solveUnique(stations);
        const mirrored = stations.map((one) => withCentre(one, ({ hMm, vMm }) => ({ hMm: -hMm, vMm })));
        expectDeviations(solve(mirrored), before, ({ hMm, vMm }) => ({ hMm: -hMm, vMm }));
        expectDeviations(solve(stations.map((one) => ({ ...one, zMm: -one.zMm }))), before);
      }),
    );
  });

  it("scales with its offsets, and its weights only count beside each other", () => {
    fc.assert(
      fc.property(stationsAny, fc.constantFrom(1e-6, 0.0254, 25.4, 1e4), (stations, factor) => {
        const before = solveUnique(stations);
        const times = ({ hMm, vMm }: PlaneVector) => ({ hMm: hMm * factor, vMm: vMm * factor });
        const after = solve(stations.map((one) => withCentre(one, times)));
        before.stations.forEach(({ deviation }, i) => {
          near(after.stations[i]!.deviation.hMm / factor, deviation.hMm);
          near(after.stations[i]!.deviation.vMm / factor, deviation.vMm);
        });
        expectDeviations(
          solve(stations.map((one) => ({ ...one, weight: (one.weight ?? 1) * factor }))),
          before,
        );
      }),
    );
  });

  it("does not mind the order of the stations", () => {
    fc.assert(
      fc.property(stationsAny, (stations) => {
        const before = solveUnique(stations);
        const after = solve([...stations].reverse());
        expectDeviations({ ...after, stations: [...after.stations].reverse() }, before);
        lineOf(after).forEach((value, i) => near(value, lineOf(before)[i]!));
      }),
    );
  });

  it("counts a target as it counts the centre, the other way", () => {
    fc.assert(
      fc.property(stationsAny, offset, offset, (stations, h, v) => {
        const before = solveUnique(stations);
        const aimed = stations.map((one, i) => ({
          ...withCentre(one, ({ hMm, vMm }) => ({ hMm: hMm + h * i, vMm: vMm + v * i * i })),
          target: { hMm: h * i, vMm: v * i * i },
        }));
        expectDeviations(solve(aimed), before);
      }),
    );
  });

  if (zone === "cylinder") {
    it("turns with the cross-section", () => {
      fc.assert(
        fc.property(stationsAny, turnRad, (stations, angle) => {
          const turn = ({ hMm, vMm }: PlaneVector) => ({
            hMm: Math.cos(angle) * hMm + Math.sin(angle) * vMm,
            vMm: Math.cos(angle) * vMm - Math.sin(angle) * hMm,
          });
          const before = solveUnique(stations);
          expectDeviations(solve(stations.map((one) => withCentre(one, turn))), before, turn);
        }),
      );
    });
  }
});
