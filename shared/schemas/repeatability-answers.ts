import { z } from "zod";
import { covarianceAnswer, warningSchema } from "./common.ts";

const perPlane = z.object({ h: z.number(), v: z.number() }).meta({ id: "PerPlane" });
const shareOfTolerance = z.union([perPlane, z.object({ radial: z.number() })]).meta({
  id: "ShareOfTolerance",
  description:
    "100 × 6 standard deviations over the whole width of the tolerance; of a round one, in the worst direction. Up to 10 % is good, over 30 % too much (common guideline of gauge studies).",
});

const probability = z.number().nullable();
const slopeTest = z
  .object({
    slope: z
      .number()
      .meta({ description: "Offset units per hour, or per reading where no times were sent." }),
    standardError: z.number(),
    t: z.number().nullable().meta({ description: "Null where the readings lie exactly on their line." }),
    pValue: probability.meta({ description: "Null where nothing varies." }),
    significant: z.boolean(),
  })
  .meta({ id: "SlopeTest" });

const driftAnswer = z
  .object({
    per: z.enum(["hour", "reading"]),
    dof: z.number().meta({ description: "n − 2." }),
    h: slopeTest,
    v: slopeTest,
    together: z.object({ square: z.number(), pValue: z.number(), significant: z.boolean() }).nullable().meta({
      description:
        "Hotelling's T² of the slope as a vector; null under four readings, or without scatter in some direction.",
    }),
  })
  .meta({
    id: "Drift",
    description:
      "Least-squares slope against time, held against 0 by Student's t (Draper & Smith, Applied Regression Analysis).",
  });

const farthestReading = z
  .object({
    index: z.number().int().meta({ description: "Place in `readings`, from 0." }),
    ratio: z.number().meta({ description: "|reading − mean| over the standard deviation." }),
    limit: z.number().meta({ description: "Grubbs' two-sided limit at the level." }),
    standsOut: z.boolean(),
  })
  .nullable()
  .meta({
    id: "FarthestReading",
    description: "Never dropped, only told. Null where nothing varies, or under three readings.",
  });

export const oneStationResult = z
  .object({
    form: z.literal("one_station"),
    station: z.string(),
    count: z.number().int(),
    mean: perPlane,
    standardDeviation: perPlane.meta({ description: "Of one reading, n − 1." }),
    covariance: covarianceAnswer.meta({ description: "Of one reading." }),
    uncertainty: perPlane.meta({ description: "Standard uncertainty of the mean, Type A: s/√n." }),
    meanCovariance: covarianceAnswer.meta({ description: "Of the mean." }),
    dof: z.number().meta({ description: "n − 1." }),
    expandedUncertainty: z
      .object({
        h: z.number(),
        v: z.number(),
        radial: z.number().nullable(),
        k: z.number().meta({ description: "Two-sided Student factor, of h and v." }),
        kRadial: z.number().nullable().meta({
          description: "Hotelling's factor, of radial; null with two readings, which bound nothing.",
        }),
      })
      .meta({ id: "MeanUncertainty", description: "Of the mean, at the call's level." }),
    drift: driftAnswer
      .nullable()
      .meta({ description: "Null under three readings, or where all were read at one time." }),
    autocorrelation: z
      .object({ h: z.number().nullable(), v: z.number().nullable() })
      .meta({ description: "Of neighbours in the order read; null where nothing varies." }),
    farthest: z.object({ h: farthestReading, v: farthestReading }),
    percentOfTolerance: shareOfTolerance.nullable().meta({ description: "Of one reading." }),
    warnings: z.array(warningSchema),
  })
  .meta({ id: "OneStationResult" });

const anovaLine = z
  .object({
    source: z.enum(["station", "person", "interaction", "repeatability", "total"]),
    sumOfSquares: z.number().meta({ description: "In the square of the offset unit." }),
    dof: z.number().int(),
    meanSquare: z.number().nullable(),
    f: z.number().nullable(),
    pValue: probability.meta({ description: "Probability that chance makes as large an F." }),
    significant: z.boolean().nullable(),
  })
  .meta({ id: "AnovaLine" });

const componentAnswer = z
  .object({
    h: z.number().meta({ description: "Standard deviation." }),
    v: z.number().meta({ description: "Standard deviation." }),
    radial: z.number().meta({ description: "Standard deviation in the worst direction." }),
    covariance: covarianceAnswer,
  })
  .meta({ id: "ScatterComponent", description: "What one source adds to a single reading." });

export const crossedResult = z
  .object({
    form: z.literal("crossed"),
    stations: z.array(z.string()),
    people: z.array(z.string()),
    repeats: z.number().int(),
    table: z.object({ h: z.array(anovaLine), v: z.array(anovaLine) }).meta({
      description:
        "Analysis of variance, stations and people both drawn at random. Pooled: without a line for the interaction.",
    }),
    interaction: z
      .object({
        pooled: z.boolean().meta({ description: "Whether its squares were put with those of the repeats." }),
        rule: z.string(),
        pValue: z.object({ h: probability, v: probability }),
      })
      .meta({ id: "StudyInteraction" }),
    components: z.object({
      repeatability: componentAnswer,
      person: componentAnswer,
      interaction: componentAnswer,
      reproducibility: componentAnswer.meta({ description: "Person and interaction together." }),
      reading: componentAnswer.meta({
        description: "Repeatability and reproducibility together: one reading by anybody.",
      }),
      station: componentAnswer.meta({ description: "How far the stations themselves lie apart." }),
    }),
    dof: z.object({
      repeatability: z.number(),
      reading: z
        .object({ h: z.number().nullable(), v: z.number().nullable() })
        .meta({ description: "By Satterthwaite; null where nothing varies." }),
    }),
    personOffsets: z
      .array(z.object({ person: z.string(), h: z.number(), v: z.number() }))
      .meta({ description: "Each person's mean less the mean of all." }),
    percentOfTolerance: z
      .object({
        repeatability: shareOfTolerance,
        reproducibility: shareOfTolerance,
        reading: shareOfTolerance,
      })
      .nullable(),
    warnings: z.array(warningSchema),
  })
  .meta({ id: "CrossedResult" });

export type OneStationResult = z.infer<typeof oneStationResult>;
export type CrossedResult = z.infer<typeof crossedResult>;
