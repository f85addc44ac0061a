import { z } from "zod";
import { limits } from "../limits.ts";
import { boreFitStatisticsSchema, ellipseAxesSchema } from "./bore-fit-parts.ts";
import {
  boreFitUnits,
  boreTemperatures,
  diameterAt20CSchema,
  temperatureCorrectionSchema,
} from "./bore-temperatures.ts";
import {
  calculationEnvelope,
  covarianceAnswer,
  jobIdSchema,
  levelSchema,
  noteSchema,
  seenSchema,
  warningSchema,
} from "./common.ts";
import { boreMonteCarloAnswer, monteCarloSchema } from "./monte-carlo.ts";
import { callerId, clockDeg, fixedQuantity, quantity } from "./quantity.ts";

const uncertainty = quantity(
  "offset",
  "uncertainty",
  "Standard uncertainty (k = 1) of this reading.",
).nullish();

export const methodSchema = z
  .enum(["least_squares", "minimum_zone", "maximum_inscribed", "minimum_circumscribed", "ellipse"])
  .meta({
    id: "CircleMethod",
    description:
      "Criterion of the circle, with the names of ISO 12181-1; least_squares (LSCI, orthogonal) when absent. minimum_zone (MZCI): the two concentric circles that hold all readings between them and are closest together; the diameter answered is their mean, the roundness their distance. maximum_inscribed (MICI): the largest circle with no reading inside and its centre between the readings. minimum_circumscribed (MCCI): the smallest round all readings. These three are exact, the best of all centres, and return their contacts; they take no weights, and a known taper only. ellipse: orthogonal least squares. points and turned_gauge only.",
  });

const taperSchema = z
  .union([
    z
      .strictObject({
        halfAngleDeg: fixedQuantity("deg", "halfAngleDeg", "Positive opening downstream."),
      })
      .meta({ id: "KnownTaper" }),
    z.strictObject({ estimate: z.literal(true) }).meta({ id: "EstimatedTaper" }),
  ])
  .meta({
    id: "Taper",
    description: "A conical bore: radius R + z·tan(half angle), z from the station's plane.",
  });

const outliersSchema = z
  .discriminatedUnion("rule", [
    z.strictObject({ rule: z.literal("none") }).meta({ id: "NoOutlierRule" }),
    z
      .strictObject({
        rule: z.literal("mad"),
        threshold: z.number().min(1).max(1000).optional().meta({ description: "3.5 when absent." }),
      })
      .meta({
        id: "MadOutlierRule",
        description:
          "Puts aside, one by one, the reading whose |r|/u passes threshold × 1.4826 × the median of |r|/u in use, and fits again.",
      }),
  ])
  .meta({
    id: "Outliers",
    description:
      "Nothing is put aside when absent. Before minimum_zone, maximum_inscribed and minimum_circumscribed readings are judged by the least-squares circle.",
  });

const common = {
  id: callerId,
  seen: seenSchema.optional().meta({ description: "Overrides the call's." }),
  method: methodSchema.optional(),
  readingUncertainty: quantity(
    "offset",
    "uncertainty",
    "Standard uncertainty (k = 1) of each reading that states none of its own.",
  ).nullish(),
  ...boreTemperatures,
};
const nominalDiameter = quantity("bore", "positiveLength", "Diameter on the drawing.");

export const pointsBore = z
  .strictObject({
    ...common,
    form: z.literal("points"),
    nominalDiameter: nominalDiameter.nullish(),
    points: z
      .array(
        z
          .strictObject({
            h: quantity("bore", "coordinate", "To the right, from any origin."),
            v: quantity("bore", "coordinate", "Up, from the same origin."),
            z: quantity(
              "axial",
              "coordinate",
              "From the station's plane. For all points of the bore or for none.",
            ).nullish(),
            u: uncertainty,
          })
          .meta({ id: "WallPoint" }),
      )
      .max(limits.readingsPerBore),
    taper: taperSchema.nullish(),
    outliers: outliersSchema.nullish(),
  })
  .meta({
    id: "PointsBore",
    description:
      "Points on the wall. At two or more planes without a taper: a tilted cylinder. The centre is relative to the points' origin.",
  });

export const turnedGaugeBore = z
  .strictObject({
    ...common,
    form: z.literal("turned_gauge"),
    nominalDiameter,
    sense: z
      .enum(["larger_is_farther", "larger_is_nearer"])
      .meta({ description: "Where the wall is when the gauge reads more." }),
    zero: z.enum(["nominal", "arbitrary"]).meta({
      description: "Whether the gauge reads 0 at the nominal radius, or anywhere: then the diameter is null.",
    }),
    gaugeSag: quantity("offset", "offset", "How far the tip hangs below its axis, positive down.").nullish(),
    readings: z
      .array(
        z
          .strictObject({
            clockDeg,
            reading: quantity("offset", "offset", "As read, not halved."),
            u: uncertainty,
          })
          .meta({ id: "GaugeReading" }),
      )
      .max(limits.readingsPerBore),
    outliers: outliersSchema.nullish(),
  })
  .meta({
    id: "TurnedGaugeBore",
    description: "A gauge turned about its own axis. The centre is relative to that axis.",
  });

export const rotatingTargetBore = z
  .strictObject({
    ...common,
    form: z.literal("rotating_target"),
    nominalDiameter: nominalDiameter.nullish(),
    sense: z.enum(["spot_on_target", "target_from_spot"]),
    spots: z
      .array(
        z
          .strictObject({
            clockDeg,
            h: quantity("offset", "offset", "In the target's own frame."),
            v: quantity("offset", "offset", "In the target's own frame."),
            u: uncertainty,
          })
          .meta({ id: "TargetSpot" }),
      )
      .max(limits.readingsPerBore),
  })
  .meta({
    id: "RotatingTargetBore",
    description:
      "A position-sensing target turned about the bore's own centre. The centre is relative to the beam; there is no diameter. A bracket that follows the wall gives points instead.",
  });

const wireReading = quantity("bore", "positiveLength", "From the wire to the wall.");

export const wireBore = z
  .strictObject({
    ...common,
    form: z.literal("wire"),
    nominalDiameter: nominalDiameter.nullish(),
    wire: z
      .strictObject({
        left: wireReading,
        right: wireReading,
        bottom: wireReading,
        top: wireReading.nullish().meta({ description: "Absent with the upper half off." }),
        sag: quantity("offset", "offset", "How far the wire hangs below its straight chord here.").nullish(),
        wireDiameter: quantity("bore", "positiveLength", "Needed for readings to the surface.").nullish(),
        measuredTo: z.enum(["surface", "centre"]),
      })
      .meta({ id: "WireReadings" }),
  })
  .meta({
    id: "WireBore",
    description:
      "Inside readings from a stretched wire. The centre is relative to the wire's straight chord.",
  });

export const boreSchema = z
  .discriminatedUnion("form", [pointsBore, turnedGaugeBore, rotatingTargetBore, wireBore])
  .meta({ id: "Bore" });

export const boreFitRequest = z
  .strictObject({
    units: boreFitUnits,
    seen: seenSchema,
    level: levelSchema.optional(),
    bores: z.array(boreSchema).min(1).max(limits.boresPerCall),
    monteCarlo: monteCarloSchema.optional(),
    note: noteSchema.optional(),
    jobId: jobIdSchema.optional(),
  })
  .meta({
    id: "BoreFitRequest",
    description: `At most ${limits.readingsPerCall} readings in all bores together.`,
  });

const clockPair = (what: string) =>
  z.object({ h: z.number(), v: z.number() }).meta({ description: `${what}, downstream view.` });

export const boreFitResult = z
  .object({
    id: z.string(),
    form: z.enum(["points", "turned_gauge", "rotating_target", "wire"]),
    method: methodSchema,
    centre: clockPair("In offset units; z = 0"),
    diameter: z
      .number()
      .nullable()
      .meta({ description: "As read, in bore units, at z = 0; null where it is not known." }),
    diameterAt20C: diameterAt20CSchema,
    temperatureCorrection: temperatureCorrectionSchema,
    roundness: z.number().nullable().meta({ description: "Peak to valley of the radial residuals in use." }),
    residuals: z.union([z.array(z.number()), z.array(clockPair("Of one spot"))]).meta({
      description:
        "In the order sent: radial, from an ellipse orthogonal, outwards positive; {h, v} for a rotating target; left, right, bottom, top for a wire.",
    }),
    used: z.array(z.boolean()),
    exclusions: z.array(z.object({ index: z.int(), ratio: z.number() })).meta({
      description: "Readings put aside, in that order, with |r|/u ÷ (1.4826 × median) at that moment.",
    }),
    contacts: z.array(z.int()).nullable().meta({
      description:
        "Readings within 1e-9 radius of a limiting circle, counted from 0 and rising: the outer and the inner one for minimum_zone. Null for least_squares and ellipse, which have none.",
    }),
    covariance: covarianceAnswer.nullable().meta({
      description: "Of the centre (h, v), in the square of the offset unit; null where nothing tells it.",
    }),
    expandedUncertainty: z
      .object({
        h: z.number(),
        v: z.number(),
        diameter: z.number().nullable().meta({ description: "In offset units." }),
        k: z.number(),
        dof: z.number().nullable().meta({ description: "Null is infinite." }),
        level: z.number(),
      })
      .nullable()
      .meta({ id: "BoreUncertainty", description: "k × standard uncertainty, in offset units." }),
    arc: z
      .object({ coverageDeg: z.number(), largestGapDeg: z.number() })
      .nullable()
      .meta({ description: "As seen from the centre answered." }),
    taper: z
      .object({ halfAngleDeg: z.number(), expandedUncertaintyDeg: z.number().nullable() })
      .nullable()
      .meta({ description: "The cone's half angle; without uncertainty where it was stated." }),
    tilt: z
      .object({ h: z.number(), v: z.number() })
      .nullable()
      .meta({ description: "Slopes of a tilted cylinder's centre line, offset units per axial unit." }),
    ellipse: ellipseAxesSchema,
    statistics: boreFitStatisticsSchema,
    monteCarlo: boreMonteCarloAnswer.optional(),
    warnings: z.array(warningSchema),
  })
  .meta({ id: "BoreFit" });

export const boreFitResponse = z
  .object({
    ...calculationEnvelope("bore-fit", z.object({ bores: z.array(boreFitResult) })),
    units: boreFitUnits,
    seen: z
      .literal("downstream")
      .meta({ description: "The view of every centre, clock angle and residual answered." }),
  })
  .meta({ id: "BoreFitResponse" });

export type BoreFitRequest = z.infer<typeof boreFitRequest>;
export type BoreRequest = z.infer<typeof boreSchema>;
export type BoreFitResult = z.infer<typeof boreFitResult>;
