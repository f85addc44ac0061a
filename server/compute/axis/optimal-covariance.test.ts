import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { axisInput, evenCovariance, stationAt } from "../../../tests/support/axis-stations.ts";
import {
  evidenceOf,
  lineOf,
  optimalCases,
  solveOptimal,
  survey,
} from "../../../tests/support/optimal-axes.ts";
import { seededRandom } from "../../../tests/support/seeded-random.ts";
import type { AxisStation } from "./axis-input.ts";
import { deviationsFromAxis } from "./deviations-from-axis.ts";

const stepMm = 1e-6;
const planes = ["hMm", "vMm"] as const;

/** d(answer)/d(centre of station j in one plane), by central differences of the whole computation. */
function differenced(
  stations: readonly AxisStation[],
  solve: (stations: readonly AxisStation[]) => readonly number[],
) {
  return stations.map((_, j) =>
    planes.map((plane) => {
      const moved = (by: number) =>
        solve(
          stations.map((one, i) =>
            i === j ? { ...one, centre: { ...one.centre, [plane]: one.centre[plane] + by } } : one,
          ),
        );
      const [up, down] = [moved(stepMm), moved(-stepMm)];
      return up.map((value, k) => (value - down[k]!) / (2 * stepMm));
    }),
  );
}

/** J·Σ·Jᵀ, written down plainly. */
function propagated(
  jacobian: readonly (readonly (readonly number[])[])[],
  stations: readonly AxisStation[],
  a: number,
  b: number,
) {
  return jacobian.reduce((sum, [h, v], j) => {
    const { hhMm2, hvMm2, vvMm2 } = stations[j]!.covariance!;
    return (
      sum + h![a]! * h![b]! * hhMm2 + (h![a]! * v![b]! + v![a]! * h![b]!) * hvMm2 + v![a]! * v![b]! * vvMm2
    );
  }, 0);
}

const covariances = fc.array(
  fc.record({
    h: fc.double({ min: 1e-3, max: 0.05, noNaN: true }),
    v: fc.double({ min: 1e-3, max: 0.05, noNaN: true }),
    r: fc.double({ min: -0.9, max: 0.9, noNaN: true }),
  }),
  { minLength: 9, maxLength: 9 },
);

describe.each(optimalCases)("the covariance of %s, %s", (method, zone) => {
  it("is what finite differences of the whole computation carry from the centres to the axis and the deviations", () => {
    let compared = 0;
    fc.assert(
      fc.property(survey({ weighted: true, most: 9 }), covariances, (plain, known) => {
        const stations = plain.map((one, i) => {
          const { h, v, r } = known[i]!;
          return { ...one, covariance: { hhMm2: h * h, hvMm2: r * h * v, vvMm2: v * v } };
        });
        const contactsOf = (one: readonly AxisStation[]) => {
          const { h, v } = evidenceOf(solveOptimal(method, zone, one));
          return JSON.stringify([h.contacts, v.contacts]);
        };
        const contacts = contactsOf(stations);
        const answer = (one: readonly AxisStation[]) => {
          // The derivative is that at fixed contacts: a step that changes them is not compared.
          fc.pre(contactsOf(one) === contacts);
          const found = solveOptimal(method, zone, one);
          return [
            ...lineOf(found),
            ...found.stations.flatMap(({ deviation }) => [deviation.hMm, deviation.vMm]),
          ];
        };
        const jacobian = differenced(stations, answer);
        const { axis, stations: answered } = solveOptimal(method, zone, stations);
        const sizes = [0, 1, 2, 3].map((k) => Math.sqrt(propagated(jacobian, stations, k, k)));
        const { h, v, hv } = axis.covariance!;
        const blocks = [
          [h[0][0], h[0][1], hv[0][0], hv[0][1]],
          [h[1][0], h[1][1], hv[1][0], hv[1][1]],
          [hv[0][0], hv[1][0], v[0][0], v[0][1]],
          [hv[0][1], hv[1][1], v[1][0], v[1][1]],
        ];
        blocks.forEach((row, a) =>
          row.forEach((value, b) => {
            const wanted = propagated(jacobian, stations, a, b);
            expect(Math.abs(value - wanted)).toBeLessThanOrEqual(1e-4 * sizes[a]! * sizes[b]!);
          }),
        );
        answered.forEach(({ covariance }, i) => {
          const [a, b] = [4 + 2 * i, 5 + 2 * i];
          const scale = 1e-4 * (sizes[0]! ** 2 + sizes[2]! ** 2 + covariance!.hhMm2 + covariance!.vvMm2);
          expect(Math.abs(covariance!.hhMm2 - propagated(jacobian, stations, a, a))).toBeLessThanOrEqual(
            scale,
          );
          expect(Math.abs(covariance!.hvMm2 - propagated(jacobian, stations, a, b))).toBeLessThanOrEqual(
            scale,
          );
          expect(Math.abs(covariance!.vvMm2 - propagated(jacobian, stations, b, b))).toBeLessThanOrEqual(
            scale,
          );
        });
        compared += 1;
      }),
      { numRuns: 40 },
    );
    expect(compared).toBeGreaterThanOrEqual(30);
  });

  it("is the scatter of surveys taken again and again", () => {
    // Spread so that readings good to a micrometre or two do not change which stations touch.
    const h = [0.3, -0.2, 0.35, -0.4, 0.1, 0.28];
    const v = [-0.1, 0.25, -0.3, -0.2, 0.4, -0.35];
    const uMm = [0.0008, 0.0012, 0.001, 0.0015, 0.0009, 0.0011];
    const measured = h.map((value, i) =>
      stationAt(900 * i + 40 * i * i, value, v[i]!, { covariance: evenCovariance(uMm[i]!) }),
    );
    const stated = solveOptimal(method, zone, measured);
    const random = seededRandom(41);
    const rounds = 3000;
    const sums = measured.map(() => ({ hh: 0, hv: 0, vv: 0 }));
    for (let round = 0; round < rounds; round += 1) {
      const again = measured.map((one, i) => ({
        ...one,
        centre: {
          hMm: one.centre.hMm + uMm[i]! * random.normal(),
          vMm: one.centre.vMm + uMm[i]! * random.normal(),
        },
      }));
      solveOptimal(method, zone, again).stations.forEach(({ deviation }, i) => {
        const before = stated.stations[i]!.deviation;
        const [dh, dv] = [deviation.hMm - before.hMm, deviation.vMm - before.vMm];
        sums[i]!.hh += (dh * dh) / rounds;
        sums[i]!.hv += (dh * dv) / rounds;
        sums[i]!.vv += (dv * dv) / rounds;
      });
    }
    stated.stations.forEach(({ covariance }, i) => {
      const { hhMm2, hvMm2, vvMm2 } = covariance!;
      const { hh, hv, vv } = sums[i]!;
      // A variance from 3,000 rounds is known to √(2/3000) = 2.6 %: three standard errors, and 2 % for curvature.
      const within = 0.1 * (hhMm2 + vvMm2) + 1e-12;
      expect(Math.abs(hh - hhMm2)).toBeLessThan(within);
      expect(Math.abs(hv - hvMm2)).toBeLessThan(within);
      expect(Math.abs(vv - vvMm2)).toBeLessThan(within);
    });
  });
});

describe("the covariance of minimum_zone and least_absolute", () => {
  const u = (uMm: number) => ({ covariance: evenCovariance(uMm) });

  it("is that of the line through the two passed stations, for least_absolute", () => {
    const stations = [
      stationAt(0, 0, 0, u(0.003)),
      stationAt(500, 0.4, 0.1, u(0.004)),
      stationAt(800, -0.3, 0.2, u(0.004)),
      stationAt(1000, 0, 0, u(0.005)),
      stationAt(250, 0, 0, u(0.002)),
    ];
    const found = deviationsFromAxis(axisInput("least_absolute", [0, 1, 3], stations));
    const two = deviationsFromAxis(axisInput("two_station", [0, 3], stations));
    expect(found.axis.covariance).toEqual(two.axis.covariance);
    expect(found.stations[0]!.covariance).toEqual({ hhMm2: 0, hvMm2: 0, vvMm2: 0 });
    // By hand: 0.002² + 0.75²·0.003² + 0.25²·0.005²
    expect(
      Math.abs(found.stations[4]!.covariance!.hhMm2 - (4e-6 + 0.5625 * 9e-6 + 0.0625 * 25e-6)),
    ).toBeLessThan(1e-18);
    expect(found.axis.chiSquare).toBeNull();
    expect(found.axis.dof).toBeNull();
    expect(found.axis.scatterMm).toBeNull();
  });

  it("weighs the three contacts of a zone a quarter, a half and a quarter at its middle", () => {
    const stations = [
      stationAt(0, 0, 0, u(0.002)),
      stationAt(500, 1, -1, u(0.003)),
      stationAt(1000, 0, 0, u(0.004)),
      stationAt(500, 0, 0, u(0.001)),
    ];
    const found = deviationsFromAxis(axisInput("minimum_zone", [0, 1, 2], stations));
    // By hand: the axis at the middle is (h₀ + 2·h₁ + h₂)/4.
    const wanted = 1e-6 + (4e-6 + 4 * 9e-6 + 16e-6) / 16;
    expect(Math.abs(found.stations[3]!.covariance!.hhMm2 - wanted)).toBeLessThan(1e-18);
    // A contact and the zone's width move together: each contact is left with the same ±(h₀ − 2·h₁ + h₂)/4.
    for (const { covariance } of found.stations.slice(0, 3)) {
      expect(Math.abs(covariance!.hhMm2 - (4e-6 + 4 * 9e-6 + 16e-6) / 16)).toBeLessThan(1e-18);
    }
  });

  it("needs the covariances of the contacts alone, and is unknown without one of them", () => {
    const h = [0, 1, 0.1, 0];
    const stations = h.map((value, i) => stationAt(500 * i, value, value, u(0.002)));
    const without = (index: number) =>
      stations.map((one, i) => (i === index ? { ...one, covariance: null } : one));
    const { contacts } = evidenceOf(solveOptimal("minimum_zone", "planes", stations)).h;
    const spare = [0, 1, 2, 3].find((place) => !contacts.includes(place))!;
    const known = solveOptimal("minimum_zone", "planes", without(spare));
    expect(known.axis.covariance).toEqual(solveOptimal("minimum_zone", "planes", stations).axis.covariance);
    expect(known.axis.warnings).toEqual([]);
    expect(known.stations[spare]!.covariance).toBeNull();
    expect(known.stations[contacts[0]!]!.covariance).not.toBeNull();
    const unknown = solveOptimal("minimum_zone", "planes", without(contacts[1]!));
    expect(unknown.axis.covariance).toBeNull();
    expect(unknown.axis.warnings.map(({ code }) => code)).toEqual(["uncertainty_unknown"]);
  });

  it("warns where more stations touch than set the axis", () => {
    const stations = [0, 1, 0, 1, 0].map((h, i) => stationAt(100 * i, h, 0.01 * i * i, u(0.002)));
    for (const method of ["minimum_zone", "least_absolute"] as const) {
      const { axis } = solveOptimal(method, "planes", stations);
      const told = axis.warnings.filter(({ code }) => code === "contacts_not_unique");
      expect(told.map(({ detail }) => detail.slice(0, 5))).toEqual(["In h "]);
    }
  });
});
