import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { denseLine } from "../../../tests/support/dense-line.ts";
import { seededRandom } from "../../../tests/support/seeded-random.ts";
import { deviationsFromAxis } from "../axis/deviations-from-axis.ts";
import type { PlaneCovariance } from "../plane.ts";
import { chiSquareQuantile } from "../statistics/chi-square.ts";
import { radialFactor } from "../statistics/radial-factor.ts";
import { welchSatterthwaite } from "../statistics/welch-satterthwaite.ts";
import { fitCommonLine } from "./common-line.ts";
import { fixedFrame, lineFrame } from "./frame.ts";
import { changeOf, type ComparedStation, type StationChange } from "./survey-change.ts";

const unchanged = { hMm: 0, vMm: 0 };
const round = (u: number): PlaneCovariance => ({ hhMm2: u * u, hvMm2: 0, vvMm2: u * u });

function stationAt(
  zMm: number,
  hMm: number,
  vMm: number,
  { before = round(0.005), after = round(0.005), dof = null as number | null } = {},
): ComparedStation {
  return {
    zMm,
    before: { centre: { hMm: 0.1, vMm: -0.2 }, covariance: before, dof },
    after: { centre: { hMm: 0.1 + hMm, vMm: -0.2 + vMm }, covariance: after, dof },
  };
}

/** A covariance of any shape: from u₁, u₂ in (0.001, 0.02) and a correlation. */
const covariance = fc
  .tuple(
    fc.integer({ min: 10, max: 200 }),
    fc.integer({ min: 10, max: 200 }),
    fc.integer({ min: -90, max: 90 }),
  )
  .map(([a, b, r]) => ({ hhMm2: a * a * 1e-8, hvMm2: (a * b * r) / 1e10, vvMm2: b * b * 1e-8 }));
const survey = fc
  .uniqueArray(fc.integer({ min: 0, max: 70 }), { minLength: 5, maxLength: 9 })
  .chain((places) =>
    fc.tuple(
      ...places.map((place) =>
        fc
          .record({
            h: fc.integer({ min: -300, max: 300 }),
            v: fc.integer({ min: -300, max: 300 }),
            before: covariance,
            after: covariance,
            dofs: fc.tuple(fc.integer({ min: 1, max: 40 }), fc.integer({ min: 1, max: 40 })),
          })
          .map(({ h, v, before, after, dofs }): ComparedStation => {
            const station = stationAt(place * 100, h / 1000, v / 1000, { before, after });
            return {
              ...station,
              before: { ...station.before, dof: dofs[0] },
              after: { ...station.after, dof: dofs[1] },
            };
          }),
      ),
    ),
  )
  .map((stations) => stations.map(changeOf));

describe("fitCommonLine and lineFrame", () => {
  it("agree with whole matrices: line, covariance, statistic, degrees of freedom, at every station", () => {
    fc.assert(
      fc.property(survey, (changes) => {
        const through = [0, 1, 2, 3];
        const dense = denseLine(changes, through);
        const line = fitCommonLine(changes, through)!;
        const near = (got: number, wanted: number, size: number) =>
          expect(Math.abs(got - wanted)).toBeLessThan(1e-8 * size);
        for (const plane of ["h", "v"] as const) {
          near(line[plane].at0Mm, dense.parameters[plane].at0Mm, 10);
          near(line[plane].slope * 1000, dense.parameters[plane].slope * 1000, 10);
        }
        const frame = lineFrame(changes, line);
        for (let index = 0; index < changes.length; index += 1) {
          const wanted = dense.covarianceOf(index);
          const got = frame.covarianceOf(index)!;
          const size = changes[index]!.error!.total.hhMm2 + changes[index]!.error!.total.vvMm2;
          near(got.hhMm2, wanted.get(0, 0), size);
          near(got.hvMm2, wanted.get(0, 1), size);
          near(got.vvMm2, wanted.get(1, 1), size);
          const test = frame.test(index, unchanged, 0.95);
          // Where the line leaves next to nothing of a station's error both ways of counting lose their digits.
          if (!test || got.hhMm2 < 1e-4 * size || got.vvMm2 < 1e-4 * size) continue;
          const { hMm, vMm } = frame.changeOf(index);
          const w = dense.solve(wanted, [hMm, vMm]);
          const direction = [w.get(0, 0), w.get(1, 0)] as const;
          const statistic = direction[0] * hMm + direction[1] * vMm;
          expect(Math.abs(test.statistic - statistic)).toBeLessThan(1e-4 * (1 + statistic));
          const parts = dense.variancesAlong(index, direction);
          const dof = welchSatterthwaite(
            parts.map(({ variance }) => variance),
            parts.map((part) => part.dof),
          )!;
          expect(Math.abs(test.dof! / dof - 1)).toBeLessThan(1e-3);
        }
      }),
      { numRuns: 150 },
    );
  });

  it("find a shift and a tilt that all share, and leave nothing of it", () => {
    const at = [0, 1240, 2480, 5150, 6900];
    const changes = at.map((z) => changeOf(stationAt(z, 0.3 - 4e-5 * z, -0.2 + 3e-5 * z)));
    const line = fitCommonLine(changes, [0, 3, 4])!;
    expect(Math.abs(line.h.at0Mm - 0.3)).toBeLessThan(1e-12);
    expect(Math.abs(line.v.slope - 3e-5)).toBeLessThan(1e-15);
    const frame = lineFrame(changes, line);
    for (const index of at.keys()) {
      expect(Math.hypot(frame.changeOf(index).hMm, frame.changeOf(index).vMm)).toBeLessThan(1e-12);
    }
  });

  it("compare deviations from each survey's own axis, where both weigh their stations alike", () => {
    const random = seededRandom(12);
    const zMm = [0, 620, 2480, 5150, 6900];
    const centres = () => zMm.map(() => ({ hMm: random.normal(), vMm: random.normal() }));
    const [before, after] = [centres(), centres()];
    const axisOf = (survey: { hMm: number; vMm: number }[]) =>
      deviationsFromAxis({
        method: "least_squares",
        reference: [0, 2, 3, 4],
        stations: survey.map((centre, i) => ({
          zMm: zMm[i]!,
          centre,
          covariance: round(0.004 + 0.001 * i),
          dof: null,
          target: unchanged,
          targetUncertainty: unchanged,
          tolerance: null,
        })),
        level: 0.95,
        rule: "guarded",
      });
    const [one, other] = [axisOf(before), axisOf(after)];
    const changes = zMm.map((z, i) =>
      changeOf({
        zMm: z,
        before: { centre: before[i]!, covariance: round(0.004 + 0.001 * i), dof: null },
        after: { centre: after[i]!, covariance: round(0.004 + 0.001 * i), dof: null },
      }),
    );
    const frame = lineFrame(changes, fitCommonLine(changes, [0, 2, 3, 4])!);
    for (const index of zMm.keys()) {
      const [a, b] = [other.stations[index]!, one.stations[index]!];
      expect(Math.abs(frame.changeOf(index).hMm - (a.deviation.hMm - b.deviation.hMm))).toBeLessThan(1e-12);
      expect(Math.abs(frame.changeOf(index).vMm - (a.deviation.vMm - b.deviation.vMm))).toBeLessThan(1e-12);
      const sum = a.covariance!.hhMm2 + b.covariance!.hhMm2;
      expect(Math.abs(frame.covarianceOf(index)!.hhMm2 - sum)).toBeLessThan(1e-16);
    }
  });

  it("keep to the line where one station is known a million times better than the others", () => {
    const changes = [0, 1000, 2000, 3000].map((z, i) =>
      changeOf(
        stationAt(z, i === 1 ? 0.5 : 0.1, 0, i === 1 ? { before: round(1e-9), after: round(1e-9) } : {}),
      ),
    );
    const line = fitCommonLine(changes, [0, 1, 2, 3])!;
    expect(Math.abs(line.at(1000).hMm - 0.5)).toBeLessThan(1e-9);
    // The station that holds the line shows no change of its own.
    expect(lineFrame(changes, line).test(1, unchanged, 0.95)).toBeNull();
    expect(lineFrame(changes, line).test(0, unchanged, 0.95)).not.toBeNull();
  });

  it("see no change of a station that alone holds one end, and none of two that hold the line", () => {
    const changes = [0, 0, 5000].map((z, i) => changeOf(stationAt(z, i * 0.1, 0)));
    const frame = lineFrame(changes, fitCommonLine(changes, [0, 1, 2])!);
    expect([0, 1, 2].map((index) => frame.test(index, unchanged, 0.95) === null)).toEqual([
      false,
      false,
      true,
    ]);
    const two = lineFrame(changes, fitCommonLine(changes, [0, 2])!);
    expect(two.changeOf(2)).toEqual(unchanged);
    expect(two.test(2, unchanged, 0.95)).toBeNull();
    expect(fitCommonLine(changes, [0, 1])).toBeNull();
  });
});

describe("the test of a change", () => {
  const testOf = (station: ComparedStation, level = 0.95) =>
    fixedFrame([changeOf(station)]).test(0, unchanged, level)!;

  it("is ΔᵀΣ⁻¹Δ against χ²(level; 2) where the covariances are known", () => {
    // Σ = 2·0.005²: a change of 0.012 in h and 0.005 in v is (0.012² + 0.005²)/(2·0.005²) = 3.38
    const test = testOf(stationAt(0, 0.012, 0.005));
    expect(Math.abs(test.statistic - 3.38)).toBeLessThan(1e-9);
    expect(test.limit / chiSquareQuantile(0.95, 2) - 1).toBeLessThan(1e-13);
    // χ²(0.95; 2) = 5.991: NIST/SEMATECH e-Handbook 1.3.6.7.4
    expect(Math.abs(test.limit - 5.991)).toBeLessThan(0.001);
    expect(test).toMatchObject({ dof: null, within: true });
    expect(testOf(stationAt(0, 0.018, 0)).within).toBe(false);
  });

  it("holds the correlation of h and v against the change", () => {
    // Σ = [[2, 1.2], [1.2, 2]]·1e-4, Σ⁻¹ = [[2, −1.2], [−1.2, 2]]/(2.56e-4): along (1, 1) 2·0.8/2.56, across 2·3.2/2.56
    const tilted = { hhMm2: 1e-4, hvMm2: 0.6e-4, vvMm2: 1e-4 };
    const of = (v: number) => testOf(stationAt(0, 0.01, v, { before: tilted, after: tilted })).statistic;
    expect(Math.abs(of(0.01) - 0.625)).toBeLessThan(1e-9);
    expect(Math.abs(of(-0.01) - 2.5)).toBeLessThan(1e-9);
  });

  it("takes 2·F(level; 2, ν) where they were estimated, ν by Welch and Satterthwaite", () => {
    const test = testOf(stationAt(0, 0.01, 0.002, { dof: 9 }));
    // Two alike: 18. F(0.95; 2, 18) = 3.555: NIST/SEMATECH e-Handbook 1.3.6.7.3, from memory
    expect(Math.abs(test.dof! - 18)).toBeLessThan(1e-9);
    expect(Math.abs(test.limit - 2 * 3.555)).toBeLessThan(0.002);
    expect(test.limit).toBe(radialFactor(0.95, test.dof) ** 2);
  });

  it("turns with the cross-section and does not depend on the unit", () => {
    fc.assert(
      fc.property(survey, fc.double({ min: 0, max: 6.28, noNaN: true }), (changes, angle) => {
        const [c, s] = [Math.cos(angle), Math.sin(angle)];
        const turn = ({ hhMm2, hvMm2, vvMm2 }: PlaneCovariance) => ({
          hhMm2: c * c * hhMm2 - 2 * c * s * hvMm2 + s * s * vvMm2,
          hvMm2: c * s * (hhMm2 - vvMm2) + (c * c - s * s) * hvMm2,
          vvMm2: s * s * hhMm2 + 2 * c * s * hvMm2 + c * c * vvMm2,
        });
        const turned = changes.map(({ zMm, change: { hMm, vMm }, error }) =>
          changeOf({
            zMm: 25.4 * zMm,
            before: {
              centre: unchanged,
              covariance: turn(error!.parts[0]!.covariance),
              dof: error!.parts[0]!.dof,
            },
            after: {
              centre: { hMm: c * hMm - s * vMm, vMm: s * hMm + c * vMm },
              covariance: turn(error!.parts[1]!.covariance),
              dof: error!.parts[1]!.dof,
            },
          }),
        );
        const through = [0, 1, 2, 3];
        const frames = [changes, turned].map((each) => lineFrame(each, fitCommonLine(each, through)!));
        for (const index of changes.keys()) {
          const [one, other] = frames.map((frame) => frame.test(index, unchanged, 0.95));
          const size = changes[index]!.error!.total;
          const left = frames[0]!.covarianceOf(index)!;
          if (!one || !other || left.hhMm2 < 1e-3 * size.hhMm2 || left.vvMm2 < 1e-3 * size.vvMm2) continue;
          expect(Math.abs(one.statistic - other.statistic)).toBeLessThan(1e-6 * (1 + one.statistic));
          expect(Math.abs(one.dof! / other.dof! - 1)).toBeLessThan(1e-5);
        }
      }),
      { numRuns: 60 },
    );
  });

  it("raises as many false alarms as its level says, in drawings with a fixed seed", () => {
    const random = seededRandom(77);
    const draws = 8_000;
    const u = 0.005;
    /** A station whose covariance was estimated: of known shape, its size scattering as χ²/ν. */
    const drawn = (zMm: number, dof: number): StationChange => {
      const centre = (scale: number) => {
        const [a, b] = [scale * u * random.normal(), scale * u * random.normal()];
        return { hMm: a, vMm: 0.8 * a + 0.6 * b };
      };
      const sized = () => {
        const factor = (random.chiSquare(dof) / dof) * u * u;
        return { hhMm2: factor, hvMm2: 0.8 * factor, vvMm2: factor };
      };
      return changeOf({
        zMm,
        before: { centre: centre(1), covariance: sized(), dof },
        after: { centre: centre(1), covariance: sized(), dof },
      });
    };
    const alarms = { fixed: 0, reference: 0, other: 0 };
    for (let draw = 0; draw < draws; draw += 1) {
      const changes = [0, 2000, 4000, 7000, 9000].map((z) => drawn(z, 12));
      const line = lineFrame(changes, fitCommonLine(changes, [0, 1, 2, 3])!);
      if (!fixedFrame(changes).test(0, unchanged, 0.95)!.within) alarms.fixed += 1;
      if (!line.test(1, unchanged, 0.95)!.within) alarms.reference += 1;
      if (!line.test(4, unchanged, 0.95)!.within) alarms.other += 1;
    }
    // Three standard errors, and a percentage point for what Welch and Satterthwaite approximate.
    const allowed = 3 * Math.sqrt((0.05 * 0.95) / draws) + 0.01;
    for (const count of Object.values(alarms)) expect(Math.abs(count / draws - 0.05)).toBeLessThan(allowed);
  });
});
