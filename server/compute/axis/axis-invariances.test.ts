import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { axisInput, evenCovariance, stationAt } from "../../../tests/support/axis-stations.ts";
import type { AxisInput, AxisStation } from "./axis-input.ts";
import type { AxisDeviations } from "./axis-result.ts";
import { deviationsFromAxis } from "./deviations-from-axis.ts";

/** A machine: stations at least 50 mm apart over some metres, the first `count` of them reference. */
interface Machine {
  readonly stations: readonly AxisStation[];
  readonly references: number;
}

const offset = fc.double({ min: -2, max: 2, noNaN: true });
const standard = fc.double({ min: 1e-4, max: 0.05, noNaN: true });

const covariance = fc
  .record({ h: standard, v: standard, r: fc.double({ min: -0.95, max: 0.95, noNaN: true }) })
  .map(({ h, v, r }) => ({ hhMm2: h * h, hvMm2: r * h * v, vvMm2: v * v }));

const station = fc.record({
  step: fc.double({ min: 50, max: 900, noNaN: true }),
  centre: fc.record({ hMm: offset, vMm: offset }),
  covariance,
  dof: fc.option(fc.integer({ min: 3, max: 60 }), { nil: null }),
  target: fc.record({ hMm: offset, vMm: offset }),
  targetUncertainty: fc.record({ hMm: standard, vMm: standard }),
});

function machine(even: boolean, stated: boolean): fc.Arbitrary<Machine> {
  return fc
    .record({
      parts: fc.array(station, { minLength: 3, maxLength: 9 }),
      references: fc.integer({ min: 2, max: 6 }),
      u: standard,
    })
    .map(({ parts, references, u }) => {
      let zMm = -1000;
      const stations = parts.map(({ step, ...part }) => {
        zMm += step;
        const known = even
          ? { covariance: evenCovariance(u), dof: null, targetUncertainty: { hMm: 0, vMm: 0 } }
          : {};
        const whole = stationAt(zMm, 0, 0, { ...part, ...known });
        return stated ? whole : { ...whole, covariance: null };
      });
      return { stations, references: Math.min(references, stations.length) };
    });
}

const anyMachine = fc.oneof(machine(false, true), machine(false, false));

const inputOf = ({ stations, references }: Machine): AxisInput =>
  axisInput(
    references === 2 ? "two_station" : "least_squares",
    Array.from({ length: references }, (_, i) => i),
    stations,
  );

/** Solves the machine before and after a change of its stations. */
function solveBoth(
  one: Machine,
  change: (station: AxisStation, index: number) => AxisStation,
): [AxisDeviations, AxisDeviations] {
  return [
    deviationsFromAxis(inputOf(one)),
    deviationsFromAxis(inputOf({ ...one, stations: one.stations.map(change) })),
  ];
}

const near = (got: number, wanted: number, within: number) =>
  expect(Math.abs(got - wanted)).toBeLessThan(within);
/** A picometre: reference stations may stand 50 mm apart and others metres away, which enlarges the rounding of z. */
const roundingMm = 1e-9;
/** Of a variance, as a share of it. */
const roundingShare = 1e-9;

function expectSameDeviations(before: AxisDeviations, after: AxisDeviations): void {
  before.stations.forEach(({ deviation, covariance: known }, i) => {
    const other = after.stations[i]!;
    near(other.deviation.hMm, deviation.hMm, roundingMm);
    near(other.deviation.vMm, deviation.vMm, roundingMm);
    expect(other.covariance === null).toBe(known === null);
    if (!known) return;
    const within = roundingShare * (known.hhMm2 + known.vvMm2) + 1e-20;
    near(other.covariance!.hhMm2, known.hhMm2, within);
    near(other.covariance!.hvMm2, known.hvMm2, within);
    near(other.covariance!.vvMm2, known.vvMm2, within);
  });
}

const moved = (one: AxisStation, hMm: number, vMm: number): AxisStation => ({
  ...one,
  centre: { hMm: one.centre.hMm + hMm, vMm: one.centre.vMm + vMm },
});

describe("deviationsFromAxis", () => {
  it("does not feel a shift and tilt of the whole survey, which the axis takes up", () => {
    fc.assert(
      fc.property(anyMachine, offset, offset, offset, (one, h, v, tilt) => {
        const slope = tilt * 1e-3;
        const [before, after] = solveBoth(one, (s) => moved(s, h + slope * s.zMm, v - slope * s.zMm));
        expectSameDeviations(before, after);
        near(after.axis.h.slope - before.axis.h.slope, slope, 1e-14);
        near(after.axis.v.at0Mm - before.axis.v.at0Mm, v, 1e-10);
      }),
    );
  });

  it("does not feel where z = 0 was put", () => {
    fc.assert(
      fc.property(anyMachine, fc.double({ min: -1e5, max: 1e5, noNaN: true }), (one, along) => {
        const [before, after] = solveBoth(one, (s) => ({ ...s, zMm: s.zMm + along }));
        expectSameDeviations(before, after);
        const back = after.axis.h.at0Mm + after.axis.h.slope * along;
        near(back, before.axis.h.at0Mm, 1e-7);
      }),
    );
  });

  it("looks the same from the other side: h changes sign, and with it the h–v terms", () => {
    fc.assert(
      fc.property(anyMachine, (one) => {
        const [before, after] = solveBoth(one, (s) => ({
          ...s,
          centre: { ...s.centre, hMm: -s.centre.hMm },
          target: { ...s.target, hMm: -s.target.hMm },
          covariance: s.covariance && { ...s.covariance, hvMm2: -s.covariance.hvMm2 },
        }));
        before.stations.forEach(({ deviation, covariance: known }, i) => {
          const other = after.stations[i]!;
          near(other.deviation.hMm, -deviation.hMm, roundingMm);
          near(other.deviation.vMm, deviation.vMm, roundingMm);
          if (known) near(other.covariance!.hvMm2, -known.hvMm2, 1e-20);
        });
      }),
    );
  });

  it("turns with the cross-section when h and v are known alike", () => {
    fc.assert(
      fc.property(
        machine(true, true),
        fc.double({ min: 0, max: 2 * Math.PI, noNaN: true }),
        (one, angleRad) => {
          const [sin, cos] = [Math.sin(angleRad), Math.cos(angleRad)];
          const turn = ({ hMm, vMm }: { hMm: number; vMm: number }) => ({
            hMm: cos * hMm + sin * vMm,
            vMm: cos * vMm - sin * hMm,
          });
          const [before, after] = solveBoth(one, (s) => ({
            ...s,
            centre: turn(s.centre),
            target: turn(s.target),
          }));
          before.stations.forEach(({ deviation, expandedUncertainty }, i) => {
            const wanted = turn(deviation);
            const other = after.stations[i]!;
            near(other.deviation.hMm, wanted.hMm, roundingMm);
            near(other.deviation.vMm, wanted.vMm, roundingMm);
            near(other.expandedUncertainty!.radialMm, expandedUncertainty!.radialMm, roundingMm);
          });
        },
      ),
    );
  });

  it("scales: offsets as their factor, variances as its square, z not at all, factors k never", () => {
    fc.assert(
      fc.property(anyMachine, fc.constantFrom(1e-6, 0.0254, 25.4, 1e4), (one, factor) => {
        const times = ({ hMm, vMm }: { hMm: number; vMm: number }) => ({
          hMm: hMm * factor,
          vMm: vMm * factor,
        });
        const [before, after] = solveBoth(one, (s) => ({
          ...s,
          centre: times(s.centre),
          target: times(s.target),
          targetUncertainty: times(s.targetUncertainty),
          covariance: s.covariance && {
            hhMm2: s.covariance.hhMm2 * factor ** 2,
            hvMm2: s.covariance.hvMm2 * factor ** 2,
            vvMm2: s.covariance.vvMm2 * factor ** 2,
          },
        }));
        before.stations.forEach(({ deviation, expandedUncertainty }, i) => {
          const other = after.stations[i]!;
          near(other.deviation.vMm / factor, deviation.vMm, roundingMm);
          if (!expandedUncertainty) return;
          near(other.expandedUncertainty!.radialMm / factor, expandedUncertainty.radialMm, 1e-9);
        });
      }),
    );
  });

  it("does not mind the order of the stations, nor that of the reference stations", () => {
    fc.assert(
      fc.property(anyMachine, (one) => {
        const input = inputOf(one);
        const before = deviationsFromAxis(input);
        const last = one.stations.length - 1;
        const after = deviationsFromAxis({
          ...input,
          stations: [...one.stations].reverse(),
          reference: input.reference.map((index) => last - index),
        });
        expectSameDeviations(before, { ...after, stations: [...after.stations].reverse() });
        const turned = deviationsFromAxis({ ...input, reference: [...input.reference].reverse() });
        expectSameDeviations(before, turned);
        near(turned.axis.h.at0Mm, before.axis.h.at0Mm, roundingMm);
      }),
    );
  });

  it("always answers variances of 0 or more and a correlation within plus or minus 1", () => {
    fc.assert(
      fc.property(anyMachine, (one) => {
        for (const { covariance: known } of deviationsFromAxis(inputOf(one)).stations) {
          if (!known) continue;
          const { hhMm2, hvMm2, vvMm2 } = known;
          expect(hhMm2).toBeGreaterThanOrEqual(0);
          expect(vvMm2).toBeGreaterThanOrEqual(0);
          expect(hvMm2 ** 2).toBeLessThanOrEqual(hhMm2 * vvMm2 * (1 + 1e-9) + 1e-40);
        }
      }),
    );
  });

  it("never answers NaN or infinity: it answers finite numbers or refuses by code", () => {
    const wild = fc.double({ noDefaultInfinity: true, noNaN: true });
    const wildStation = fc.record({
      zMm: wild,
      centre: fc.record({ hMm: wild, vMm: wild }),
      covariance: fc.option(fc.record({ hhMm2: wild, hvMm2: wild, vvMm2: wild }), { nil: null }),
      dof: fc.option(fc.double({ min: Number.MIN_VALUE, noNaN: true, noDefaultInfinity: true }), {
        nil: null,
      }),
      target: fc.record({ hMm: wild, vMm: wild }),
      targetUncertainty: fc.record({ hMm: wild, vMm: wild }),
      tolerance: fc.option(fc.record({ form: fc.constant("radial" as const), halfWidthMm: wild }), {
        nil: null,
      }),
      weight: fc.option(fc.double({ min: 1e-12, max: 1e12, noNaN: true }), { nil: null }),
    });
    const finite = (value: unknown): boolean =>
      typeof value === "number"
        ? Number.isFinite(value)
        : typeof value !== "object" || value === null || Object.values(value).every(finite);
    fc.assert(
      fc.property(
        fc.array(wildStation, { minLength: 2, maxLength: 6 }),
        fc.constantFrom("two_station", "least_squares", "minimum_zone", "least_absolute", "line_of_sight"),
        fc.constantFrom("planes", "cylinder"),
        (stations, method, zone) => {
          const count = { two_station: 2, line_of_sight: 0 }[method as string] ?? stations.length;
          const reference = Array.from({ length: count }, (_, i) => i);
          try {
            expect(finite(deviationsFromAxis(axisInput(method, reference, stations, { zone })))).toBe(true);
          } catch (error) {
            expect(error).toMatchObject({ name: "ComputeError" });
          }
        },
      ),
      { numRuns: 500 },
    );
  });
});
