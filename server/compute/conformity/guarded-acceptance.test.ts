import { describe, expect, it } from "vitest";
import { seededRandom } from "../../../tests/support/seeded-random.ts";
import { radialMm } from "../plane.ts";
import { studentFactor } from "../statistics/student-t.ts";
import { judge } from "./judge.ts";

const level = 0.95;
const draws = 6_000;
/** Three standard errors of a proportion near p. */
const threeSigma = (p: number) => 3 * Math.sqrt((p * (1 - p)) / draws);

/** A bore measured again and again: standard uncertainties, correlation, degrees of freedom of their estimate. */
interface Survey {
  readonly uHMm: number;
  readonly uVMm: number;
  readonly correlation: number;
  readonly dof: number | null;
}

const surveys: Record<string, Survey> = {
  "equal uncertainties, known": { uHMm: 0.004, uVMm: 0.004, correlation: 0, dof: null },
  "equal uncertainties, 4 degrees of freedom": { uHMm: 0.004, uVMm: 0.004, correlation: 0, dof: 4 },
  "correlated uncertainties, known": { uHMm: 0.003, uVMm: 0.005, correlation: 0.6, dof: null },
  "correlated uncertainties, 12 degrees of freedom": { uHMm: 0.006, uVMm: 0.002, correlation: -0.7, dof: 12 },
};

/** Measured deviations of a bore that truly deviates by (trueHMm, 0), with the covariance that the survey states of each. */
function measureAgainAndAgain({ uHMm, uVMm, correlation, dof }: Survey, trueHMm: number) {
  const random = seededRandom(20_261_201);
  return Array.from({ length: draws }, () => {
    const first = random.normal();
    const second = correlation * first + Math.sqrt(1 - correlation ** 2) * random.normal();
    const scale = dof === null ? 1 : random.chiSquare(dof) / dof;
    return {
      deviation: { hMm: trueHMm + uHMm * first, vMm: uVMm * second },
      covariance: {
        hhMm2: scale * uHMm ** 2,
        hvMm2: scale * correlation * uHMm * uVMm,
        vvMm2: scale * uVMm ** 2,
      },
    };
  });
}

const share = (events: readonly boolean[]) => events.filter(Boolean).length / events.length;

describe("guarded radial acceptance", () => {
  for (const [name, survey] of Object.entries(surveys)) {
    it(`calls a bore that is where it should be wrong in at most 5 % of surveys: ${name}`, () => {
      const tolerance = { form: "radial", halfWidthMm: 1e-9 } as const;
      const wrong = measureAgainAndAgain(survey, 0).map(
        (measured) =>
          judge({ ...measured, dof: survey.dof, tolerance, level, rule: "guarded" }).verdict === "exceeds",
      );
      expect(share(wrong)).toBeLessThan(0.05 + threeSigma(0.05));
    });

    it(`accepts a bore just out of tolerance in at most 5 % of surveys: ${name}`, () => {
      for (const halfWidthMm of [0.002, 0.01, 0.05]) {
        const tolerance = { form: "radial", halfWidthMm } as const;
        const wrong = measureAgainAndAgain(survey, halfWidthMm * 1.0001).map(
          (measured) =>
            judge({ ...measured, dof: survey.dof, tolerance, level, rule: "guarded" }).verdict === "conforms",
        );
        expect(share(wrong)).toBeLessThan(0.05 + threeSigma(0.05));
      }
    });
  }

  it("promises no more than it must: with equal uncertainties the 5 % are reached", () => {
    for (const name of ["equal uncertainties, known", "equal uncertainties, 4 degrees of freedom"]) {
      const survey = surveys[name]!;
      const outside = measureAgainAndAgain(survey, 0).map(({ deviation, covariance }) => {
        const tolerance = { form: "radial", halfWidthMm: 1 } as const;
        const { expandedUncertainty } = judge({
          deviation,
          covariance,
          dof: survey.dof,
          tolerance,
          level,
          rule: "guarded",
        });
        return radialMm(deviation) > expandedUncertainty!.radialMm;
      });
      expect(Math.abs(share(outside) - 0.05)).toBeLessThan(threeSigma(0.05));
    }
  });

  it("would break the promise with the one-dimensional factor: 15 % wrong instead of 5 %", () => {
    const survey = surveys["equal uncertainties, known"]!;
    const reach = studentFactor(level, null) * survey.uHMm;
    const wrong = measureAgainAndAgain(survey, 0).map(({ deviation }) => radialMm(deviation) > reach);
    // exp(−1.96²/2): the tail of the Rayleigh distribution
    const expected = Math.exp(-(studentFactor(level, null) ** 2) / 2);
    expect(Math.abs(expected - 0.1465)).toBeLessThan(1e-4);
    expect(Math.abs(share(wrong) - expected)).toBeLessThan(threeSigma(expected));
  });
});

describe("guarded acceptance in h and v", () => {
  it("keeps each plane's 95 % with the one-dimensional factor", () => {
    const survey = surveys["equal uncertainties, 4 degrees of freedom"]!;
    const wide = { minMm: -1, maxMm: 1 };
    const tolerance = { form: "planes", h: { minMm: -1e-9, maxMm: 1e-9 }, v: wide } as const;
    const wrong = measureAgainAndAgain(survey, 0).map(
      (measured) =>
        judge({ ...measured, dof: survey.dof, tolerance, level, rule: "guarded" }).verdict === "exceeds",
    );
    expect(Math.abs(share(wrong) - 0.05)).toBeLessThan(threeSigma(0.05));
  });
});
