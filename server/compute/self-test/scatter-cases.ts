import { testChange } from "../confirmation/test-change.ts";
import { analyseCrossedStudy } from "../repeatability/crossed-study.ts";
import { describeRepeats } from "../repeatability/describe-repeats.ts";
import { publishedStudy, publishedStudyPrinted as printed } from "../repeatability/published-study.ts";
import type { SelfCase } from "./self-case.ts";

const repeatsOf = (values: readonly number[], level: number) =>
  describeRepeats({
    readings: values.map((hMm) => ({ hMm, vMm: 0 })),
    times: values.map((_, index) => index),
    level,
  });

const moments = (values: readonly number[]): Readonly<Record<string, number>> => {
  const { mean, covariance, autocorrelation } = repeatsOf(values, 0.95);
  return {
    mean: mean.hMm,
    standardDeviation: Math.sqrt(covariance.hhMm2),
    autocorrelation: autocorrelation.h ?? Number.NaN,
  };
};

const uranium = [199.31, 199.53, 200.19, 200.82, 201.92, 201.95, 202.18, 245.57];
const mavro = [
  18, 17, 18, 19, 18, 17, 15, 14, 15, 15, 17, 18, 18, 19, 19, 21, 20, 16, 14, 13, 13, 15, 15, 16, 15, 14, 13,
  14, 15, 14, 15, 16, 15, 16, 19, 20, 20, 21, 22, 23, 24, 25, 27, 26, 26, 26, 27, 26, 25, 24,
].map((tenThousandths) => (20_000 + tenThousandths) / 10_000);

function studyBy(poolAbove: number | null) {
  const readings = publishedStudy.map((people) =>
    people.map((repeats) => repeats.map((hMm) => ({ hMm, vMm: hMm }))),
  );
  return analyseCrossedStudy({ readings, level: 0.95, poolAbove });
}

const lines = ["station", "person", "interaction", "repeatability", "total"] as const;

function tableFigures(): Readonly<Record<string, number>> {
  const { table } = studyBy(null);
  const lineOf = (name: string) => table.h.find((line) => line.name === name);
  return {
    ...Object.fromEntries(
      lines.map((name) => [`squares(${name})`, lineOf(name)?.sumOfSquaresMm2 ?? Number.NaN]),
    ),
    ...Object.fromEntries(
      Object.keys(printed.f).map((name) => [`F(${name})`, lineOf(name)?.f ?? Number.NaN]),
    ),
    "p(interaction)": lineOf("interaction")?.pValue ?? Number.NaN,
  };
}

function pooledFigures(): Readonly<Record<string, number>> {
  const { components, pooled } = studyBy(0.25);
  if (!pooled) return {};
  return {
    repeatability: Math.sqrt(components.repeatability.hVarianceMm2),
    reproducibility: Math.sqrt(components.person.hVarianceMm2),
    station: Math.sqrt(components.station.hVarianceMm2),
  };
}

/** The limit of a change's test where its covariance was estimated with so many degrees of freedom; null: known. */
const limitWith = (dof: number | null): number => {
  const covariance = { hhMm2: 1, hvMm2: 0, vvMm2: 1 };
  const along = dof === null ? null : () => ({ variances: [1], dof: [dof] });
  return testChange({ hMm: 3, vMm: 4 }, covariance, along, 0.95).limit;
};

/** Repeated readings, studies of people and stations, and tests of changes. */
export const scatterCases: readonly SelfCase[] = [
  {
    id: "repeats-nist-numacc1",
    area: "repeatability-study",
    source: "NIST/ITL Statistical Reference Datasets, univariate, NumAcc1, certified",
    figures: [
      { figure: "mean", expected: 10_000_002, tolerance: 1e-8 },
      { figure: "standardDeviation", expected: 1, tolerance: 1e-14 },
      { figure: "autocorrelation", expected: -0.5, tolerance: 1e-13 },
    ],
    compute: () => moments([10_000_001, 10_000_003, 10_000_002]),
  },
  {
    id: "repeats-nist-mavro",
    area: "repeatability-study",
    source: "NIST/ITL Statistical Reference Datasets, univariate, Mavro, certified",
    figures: [
      { figure: "mean", expected: 2.001856, tolerance: 1e-14 },
      // The readings as doubles, half a spacing from the decimals: 1e-15.
      { figure: "standardDeviation", expected: 0.000429123454003053, tolerance: 1e-15 },
      { figure: "autocorrelation", expected: 0.937989183438248, tolerance: 1e-11 },
    ],
    compute: () => moments(mavro),
  },
  {
    id: "repeats-grubbs-uranium",
    area: "repeatability-study",
    source:
      "NIST/SEMATECH e-Handbook of Statistical Methods, 1.3.5.17.1, Grubbs' test, one-tailed 5 % (from memory)",
    figures: [
      { figure: "ratio", expected: 2.4687, tolerance: 1e-4 },
      { figure: "limit", expected: 2.032, tolerance: 6e-4 },
      { figure: "index", expected: 7, tolerance: 1e-12 },
    ],
    compute: () => {
      // One-tailed at 5 % is two-tailed at 10 %.
      const { farthest } = repeatsOf(uranium, 0.9);
      const { ratio = Number.NaN, limit = Number.NaN, index = Number.NaN } = farthest.h ?? {};
      return { ratio, limit, index };
    },
  },
  {
    id: "study-aiag-table",
    area: "repeatability-study",
    source:
      "AIAG, Measurement Systems Analysis, 4th ed. (2010), III-B: ten parts, three people, three trials, analysis of variance",
    figures: [
      ...lines.map((name) => ({
        figure: `squares(${name})`,
        expected: printed.sumOfSquares[name],
        tolerance: 6e-5,
      })),
      ...Object.entries(printed.f).map(([name, expected]) => ({
        figure: `F(${name})`,
        expected,
        tolerance: 6e-4,
      })),
      { figure: "p(interaction)", expected: printed.interactionPValue, tolerance: 6e-4 },
    ],
    compute: tableFigures,
  },
  {
    id: "study-aiag-components",
    area: "repeatability-study",
    source:
      "AIAG, Measurement Systems Analysis, 4th ed. (2010), III-B: standard deviations with the interaction pooled",
    figures: (["repeatability", "reproducibility", "station"] as const).map((figure) => ({
      figure,
      expected: printed.pooled[figure],
      tolerance: 2e-6,
    })),
    compute: pooledFigures,
  },
  {
    id: "change-limits",
    area: "confirmation",
    source:
      "NIST/SEMATECH e-Handbook of Statistical Methods, 1.3.6.7.3 and 1.3.6.7.4: χ²(0.95; 2) = 5.991, twice F(0.95; 2, ν) = 4.103 (ν = 10) and 3.493 (20) (from memory)",
    figures: [
      { figure: "known", expected: 5.991, tolerance: 0.0006 },
      { figure: "dof10", expected: 2 * 4.103, tolerance: 0.0011 },
      { figure: "dof20", expected: 2 * 3.493, tolerance: 0.0011 },
    ],
    compute: () => ({ known: limitWith(null), dof10: limitWith(10), dof20: limitWith(20) }),
  },
];
