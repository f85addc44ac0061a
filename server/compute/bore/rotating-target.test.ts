import fc from "fast-check";
import { inverse, Matrix, solve } from "ml-matrix";
import { describe, expect, it } from "vitest";
import { clockAngles, refusalOf, targetInput } from "../../../tests/support/bore-inputs.ts";
import { seededRandom } from "../../../tests/support/seeded-random.ts";
import type { RotatingTargetInput, TargetSpot } from "./bore-input.ts";
import { fitBore } from "./fit-bore.ts";

const near = (got: number, wanted: number, within: number) =>
  expect(Math.abs(got - wanted)).toBeLessThan(within);

/** The model written out: spot = c + (e·ĥ, e·v̂), ĥ = (cos t, −sin t), v̂ = (sin t, cos t); unknowns c, then e. */
function rowsOf(clockDeg: number): number[][] {
  const angle = (clockDeg * Math.PI) / 180;
  const [sin, cos] = [Math.sin(angle), Math.cos(angle)];
  return [
    [1, 0, cos, -sin],
    [0, 1, sin, cos],
  ];
}

/** Solves the design directly in ml-matrix, all four unknowns at once: nothing of the engine's closed form. */
function solveDirectly(spots: readonly TargetSpot[]) {
  const weighted = (spot: TargetSpot, row: number[]) => row.map((entry) => entry / (spot.uMm ?? 1));
  const design = new Matrix(spots.flatMap((spot) => rowsOf(spot.clockDeg).map((row) => weighted(spot, row))));
  const read = Matrix.columnVector(spots.flatMap((spot) => weighted(spot, [spot.hMm, spot.vMm])));
  const found = solve(design, read);
  const squares = Matrix.sub(read, design.mmul(found)).norm() ** 2;
  return { unknowns: found.getColumn(0), cofactors: inverse(design.transpose().mmul(design)), squares };
}

const bounded = (size: number) => fc.double({ min: -size, max: size, noNaN: true });
const anySpots = fc
  .record({
    mount: fc.tuple(bounded(3), bounded(3)),
    beam: fc.tuple(bounded(3), bounded(3)),
    extra: fc.array(bounded(360), { minLength: 1, maxLength: 12 }),
    stated: fc.boolean(),
    seed: fc.integer({ min: 1, max: 1e6 }),
  })
  .map(({ mount, beam, extra, stated, seed }): TargetSpot[] => {
    const random = seededRandom(seed);
    return [0, 100, ...extra].map((clockDeg) => {
      const uMm = 0.002 + 0.02 * random.uniform();
      const [h, v] = rowsOf(clockDeg).map((row) =>
        row.reduce((sum, entry, k) => sum + entry * [...mount, ...beam][k]!, 0),
      );
      return {
        clockDeg,
        hMm: h! + uMm * random.normal(),
        vMm: v! + uMm * random.normal(),
        uMm: stated ? uMm : null,
      };
    });
  });

describe("a rotating target", () => {
  it("answers what direct linear least squares answers: −e, its covariance, its residuals", () => {
    fc.assert(
      fc.property(anySpots, (spots) => {
        const fit = fitBore(targetInput({ spots }));
        const { unknowns, cofactors, squares } = solveDirectly(spots);
        near(fit.centre.hMm, -unknowns[2]!, 1e-11);
        near(fit.centre.vMm, -unknowns[3]!, 1e-11);
        const stated = spots[0]!.uMm !== null;
        const ratio = squares / (2 * spots.length - 4);
        const scale = stated ? Math.max(1, ratio) : ratio;
        const variance = scale * cofactors.get(2, 2);
        near(fit.covariance!.hhMm2 / variance, 1, 1e-8);
        near(fit.covariance!.vvMm2 / (scale * cofactors.get(3, 3)), 1, 1e-8);
        near(fit.covariance!.hvMm2, scale * cofactors.get(2, 3), 1e-8 * variance);
        fit.residualsMm.forEach(({ hMm, vMm }, i) => {
          const [h, v] = rowsOf(spots[i]!.clockDeg).map((row) =>
            row.reduce((sum, entry, k) => sum + entry * unknowns[k]!, 0),
          );
          near(hMm, spots[i]!.hMm - h!, 1e-11);
          near(vMm, spots[i]!.vMm - v!, 1e-11);
        });
        if (stated) near(fit.statistics.chiSquare! / squares, 1, 1e-8);
      }),
    );
  });

  it("separates the beam from the mounting by hand: two spots half a turn apart", () => {
    // Sum of the spots is twice the mounting error, their difference twice the beam: bore = minus the beam.
    const spots = [
      { clockDeg: 0, hMm: 0.5, vMm: -0.2, uMm: null },
      { clockDeg: 180, hMm: 0.1, vMm: 0.4, uMm: null },
    ];
    const fit = fitBore(targetInput({ spots }));
    near(fit.centre.hMm, -0.2, 1e-15);
    near(fit.centre.vMm, 0.3, 1e-15);
    expect(fit.covariance).toBeNull();
    expect(fit.warnings.map(({ code }) => code)).toEqual(["no_redundancy"]);
    const stated = fitBore(targetInput({ spots, readingUncertaintyMm: 0.01 }));
    near(stated.covariance!.hhMm2, 0.01 ** 2 / 2, 1e-18);
    expect(stated.expandedUncertainty).toMatchObject({ dof: null, diameterMm: null });
    expect(stated.warnings.map(({ code }) => code)).toEqual(["no_redundancy"]);
  });

  it("finds the bore to the upper right of a beam that strikes lower left at 12 o'clock", () => {
    const spots = clockAngles(4).map((clockDeg): TargetSpot => {
      const [h, v] = rowsOf(clockDeg).map((row) => -0.3 * row[2]! - 0.7 * row[3]!);
      return { clockDeg, hMm: h!, vMm: v!, uMm: null };
    });
    expect(spots[0]).toMatchObject({ hMm: -0.3, vMm: -0.7 });
    const { centre } = fitBore(targetInput({ spots }));
    near(centre.hMm, 0.3, 1e-14);
    near(centre.vMm, 0.7, 1e-14);
  });

  it("takes the target's place from the spot as the spot's place negated", () => {
    fc.assert(
      fc.property(anySpots, (spots) => {
        const negated = spots.map((spot) => ({ ...spot, hMm: -spot.hMm, vMm: -spot.vMm }));
        expect(fitBore(targetInput({ spots: negated, sense: "target_from_spot" }))).toEqual(
          fitBore(targetInput({ spots })),
        );
      }),
    );
  });

  it("read from the other end, h and clock angle mirrored, is the same bore", () => {
    fc.assert(
      fc.property(anySpots, (spots) => {
        const mirrored = spots.map((spot) => ({ ...spot, hMm: -spot.hMm, clockDeg: -spot.clockDeg }));
        const wanted = fitBore(targetInput({ spots }));
        const got = fitBore(targetInput({ spots: mirrored, seen: "upstream" }));
        near(got.centre.hMm, wanted.centre.hMm, 1e-12);
        near(got.centre.vMm, wanted.centre.vMm, 1e-12);
        got.residualsMm.forEach(({ hMm, vMm }, i) => {
          near(hMm, wanted.residualsMm[i]!.hMm, 1e-12);
          near(vMm, wanted.residualsMm[i]!.vMm, 1e-12);
        });
      }),
    );
  });

  it("warns of angles close together: centre known over three times worse than over a turn", () => {
    const over = (deg: number) =>
      fitBore(
        targetInput({
          readingUncertaintyMm: 0.01,
          spots: [0, deg].map((clockDeg) => ({ clockDeg, hMm: 0, vMm: 0, uMm: null })),
        }),
      );
    // Two spots t apart: Σ|φ − φ̄|² = 2·sin²(t/2), dilution 1/sin(t/2): 3 at 38.94 degrees.
    expect(over(39.5).warnings.map(({ code }) => code)).toEqual(["no_redundancy"]);
    expect(over(38.5).warnings.map(({ code }) => code)).toEqual(["weak_angles", "no_redundancy"]);
    near(over(60).statistics.dilution, 2, 1e-12);
  });

  it("refuses one spot, spots all at one angle (a whole turn apart too), and u of some only", () => {
    const at = (angles: number[], u: (number | null)[] = []): RotatingTargetInput =>
      targetInput({ spots: angles.map((clockDeg, i) => ({ clockDeg, hMm: i, vMm: 0, uMm: u[i] ?? null })) });
    expect(refusalOf(at([]))).toEqual({ code: "too_few_points", at: "spots" });
    expect(refusalOf(at([30]))).toEqual({ code: "too_few_points", at: "spots" });
    expect(refusalOf(at([30, 30, 30]))).toEqual({ code: "angles_insufficient", at: "spots" });
    expect(refusalOf(at([-330, 30]))).toEqual({ code: "angles_insufficient", at: "spots" });
    expect(refusalOf(at([0, 90, 180], [0.1, null, 0.1]))).toEqual({
      code: "uncertainty_incomplete",
      at: "spots",
    });
  });
});
