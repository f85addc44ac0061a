import { z } from "zod";
import { bounds, limits } from "../limits.ts";
import {
  calculationEnvelope,
  covarianceAnswer,
  covarianceSchema,
  deviationAnswer,
  dofSchema,
  jobIdSchema,
  levelSchema,
  noteSchema,
  offsetPair,
  toleranceSchema,
  unitsSchema,
  verdictSchema,
  warningSchema,
} from "./common.ts";
import { monteCarloSchema, stationMonteCarloAnswer } from "./monte-carlo.ts";
import { callerId, quantity } from "./quantity.ts";

export const axisMethods = [
  "two_station",
  "least_squares",
  "minimum_zone",
  "least_absolute",
  "line_of_sight",
] as const;
const axisMethod = z.enum(axisMethods).meta({
  description:
    "two_station: through exactly two. least_squares: two or more. line_of_sight: the beam itself, through none. " +
    "minimum_zone (three or more): the largest distance of a reference station from the axis is least. " +
    "least_absolute (three or more): the sum of their distances is least. Both by distance in each plane for itself, " +
    "or by radial distance (zone cylinder); covariances weigh nothing in them.",
});

export const axisSchema = z
  .strictObject({
    method: axisMethod,
    through: z
      .array(callerId)
      .max(limits.stationsPerCall)
      .meta({ description: "Ids of the reference stations; absent is none." })
      .optional(),
    zone: z
      .enum(["planes", "cylinder"])
      .meta({
        description: "Of minimum_zone and least_absolute: h and v apart (default), or radial distance.",
      })
      .optional(),
  })
  .meta({ id: "AxisChoice", description: "How the reference axis is set." });

const targetUncertainty = z
  .strictObject({
    h: quantity("offset", "uncertaintyOrExact", "Standard uncertainty; 0 is exact."),
    v: quantity("offset", "uncertaintyOrExact", "Standard uncertainty; 0 is exact."),
  })
  .meta({ id: "TargetUncertainty" });

export const axisStationSchema = z
  .strictObject({
    id: callerId,
    z: quantity("axial", "coordinate", "Along the bore line from one common face, increasing downstream."),
    centre: offsetPair,
    covariance: covarianceSchema
      .nullable()
      .meta({ description: "Standard covariance of the centre. Of every reference station, or of none." })
      .optional(),
    dof: dofSchema.optional(),
    target: offsetPair
      .nullable()
      .meta({
        description: "Where the centre should lie, relative to the axis. Absent: on the axis itself, (0, 0).",
      })
      .optional(),
    targetUncertainty: targetUncertainty.nullable().meta({ description: "Absent: exact." }).optional(),
    tolerance: toleranceSchema
      .nullable()
      .meta({ description: "Absent: the deviation is answered without a verdict." })
      .optional(),
    weight: z
      .number()
      .min(bounds.weight.min)
      .max(bounds.weight.max)
      .meta({
        description:
          "Of minimum_zone and least_absolute: multiplies the station's |d|. For every reference station or for none (then 1); elsewhere it is not used.",
      })
      .optional(),
  })
  .meta({ id: "AxisStation" });

export const axisDeviationRequest = z
  .strictObject({
    units: unitsSchema,
    level: levelSchema.optional(),
    axis: axisSchema,
    stations: z.array(axisStationSchema).min(1).max(limits.stationsPerCall),
    verdict: z
      .strictObject({
        rule: z
          .enum(["guarded", "simple"])
          .meta({
            description:
              "guarded (default): held back by the expanded uncertainty. simple: the deviation alone.",
          })
          .optional(),
      })
      .optional(),
    monteCarlo: monteCarloSchema.optional(),
    note: noteSchema.optional(),
    jobId: jobIdSchema.optional(),
  })
  .meta({ id: "AxisDeviationRequest" });

const lineAnswer = z
  .object({
    at0: z.number().meta({ description: "At z = 0, in the offset unit." }),
    slope: z.number().meta({ description: "Offset units per axial unit." }),
  })
  .meta({ id: "AxisLine" });

const lineCovariance = z
  .array(z.array(z.number()).min(2).max(2))
  .min(2)
  .max(2)
  .meta({ id: "LineCovariance", description: "2 × 2 covariance of (at0, slope)." });

const perPlane = z.object({ h: z.number(), v: z.number() });

const objective = z.number().meta({
  description:
    "What was least: the largest weight × |d| of a reference station, or the sum of them; offset unit.",
});
const lowerBound = z.number().meta({
  description: "No axis has a smaller objective. Within 1e-9 of it, or of the rounding of the numbers sent.",
});

const planeOptimality = z
  .object({
    objective,
    lowerBound,
    multipliers: z.array(z.object({ id: z.string(), multiplier: z.number() })),
  })
  .meta({
    id: "PlaneOptimality",
    description:
      "Proof that the axis is the best. Numbers q with Σ q = 0 and Σ q·z = 0 give Σ q·(centre − target) the same value for every axis: lowerBound. " +
      "minimum_zone: Σ |q|/weight = 1, and q is 0 but at the contacts listed; their signs alternate along z. " +
      "least_absolute: |q| ≤ weight; q is weight × sign of d, and at the contacts, where d is 0, as listed.",
  });

const cylinderOptimality = z
  .object({
    objective,
    lowerBound,
    multipliers: z.array(z.object({ id: z.string(), h: z.number(), v: z.number() })),
  })
  .meta({
    id: "CylinderOptimality",
    description:
      "As in one plane, with vectors q = (h, v) and their lengths: the lower bound is Σ (q.h·h + q.v·v) over centre − target. " +
      "least_absolute: q is weight × direction of d, and at the contacts as listed.",
  });

const axisAnswer = z
  .object({
    method: axisMethod,
    through: z.array(z.string()),
    h: lineAnswer,
    v: lineAnswer,
    covariance: z
      .object({ h: lineCovariance, v: lineCovariance, hv: lineCovariance })
      .nullable()
      .meta({ description: "Null when it cannot be known. hv: rows of the h line, columns of the v line." }),
    chiSquare: perPlane
      .meta({ description: "Σ(residual/u)² of the reference stations, where their covariances are stated." })
      .optional(),
    scatter: perPlane
      .meta({
        description: "Standard deviation of one observation, from the residuals, where nothing is stated.",
      })
      .optional(),
    dof: z.number().meta({ description: "n − 2: of chiSquare or of scatter." }).optional(),
    zoneWidth: z
      .union([perPlane, z.number()])
      .meta({
        description:
          "Of minimum_zone: twice the largest |d| of a reference station in each plane, or the cylinder's diameter. The distances themselves, whatever the weights.",
      })
      .optional(),
    sumAbsolute: z
      .union([perPlane, z.number()])
      .meta({
        description:
          "Of least_absolute: the sum of |d| of the reference stations in each plane, or of their radial distances. The distances themselves, whatever the weights.",
      })
      .optional(),
    contacts: z
      .union([z.object({ h: z.array(z.string()), v: z.array(z.string()) }), z.array(z.string())])
      .meta({
        description:
          "Ids of the reference stations that touch the zone (within 1e-9 of its width), or that the axis passes through; one list for a cylinder. The covariance is that of an axis that keeps these contacts.",
      })
      .optional(),
    optimality: z
      .union([z.object({ h: planeOptimality, v: planeOptimality }), cylinderOptimality])
      .meta({ description: "Of minimum_zone and least_absolute: the proof that no axis is better." })
      .optional(),
    warnings: z.array(warningSchema),
  })
  .meta({ id: "Axis" });

const expandedUncertainty = z
  .object({
    h: z.number(),
    v: z.number(),
    radial: z.number(),
    k: z.number().meta({ description: "Two-sided Student factor, of h and v." }),
    kRadial: z.number().meta({ description: "Two-dimensional factor, of radial." }),
    dof: z.number().nullable().meta({ description: "Effective degrees of freedom; null is infinite." }),
  })
  .meta({ id: "DeviationUncertainty", description: "At the call's level." });

const stationAnswer = z
  .object({
    id: z.string(),
    z: z.number(),
    deviation: deviationAnswer,
    expandedUncertainty: expandedUncertainty.nullable(),
    covariance: covarianceAnswer.nullable(),
    verdict: verdictSchema.nullable().meta({ description: "Null without a tolerance." }),
    ratio: z
      .number()
      .nullable()
      .meta({ description: "Deviation over tolerance, of h and v the larger; null without a tolerance." }),
    reference: z.boolean().meta({ description: "Whether the station set the axis." }),
    monteCarlo: stationMonteCarloAnswer.optional(),
    warnings: z.array(warningSchema),
  })
  .meta({ id: "StationDeviation" });

export const axisDeviationResult = z
  .object({
    axis: axisAnswer,
    stations: z.array(stationAnswer),
    summary: z
      .object({
        conforms: z.number().int(),
        undecided: z.number().int(),
        exceeds: z.number().int(),
        worst: z
          .object({ id: z.string(), ratio: z.number() })
          .nullable()
          .meta({ description: "The station that uses most of its tolerance; the first sent of equals." }),
      })
      .meta({ id: "DeviationSummary", description: "Counts of the stations that have a tolerance." }),
  })
  .meta({ id: "AxisDeviationResult" });

export const axisDeviationResponse = z
  .object(calculationEnvelope("axis-deviation", axisDeviationResult))
  .meta({ id: "AxisDeviationResponse" });

export type AxisDeviationRequest = z.infer<typeof axisDeviationRequest>;
export type AxisStationRequest = z.infer<typeof axisStationSchema>;
export type AxisDeviationResult = z.infer<typeof axisDeviationResult>;
