import { z } from "zod";
import { bounds, limits } from "../limits.ts";
import {
  calculationEnvelope,
  covarianceAnswer,
  jobIdSchema,
  levelSchema,
  noteSchema,
  toleranceSchema,
  unitsSchema,
  warningSchema,
} from "./common.ts";
import { callerId, fixedQuantity, quantity } from "./quantity.ts";

const clockDeg = fixedQuantity("deg", "clockDeg", "Degrees clockwise from 12 o'clock, looking downstream.");

const readingUncertainty = quantity(
  "offset",
  "uncertainty",
  "Standard uncertainty (k = 1) of one reading: of the wall's distance, or of each coordinate of a spot. What the bore's own shape makes readings scatter belongs in it.",
);

export const wantedSchema = z
  .union([
    z
      .strictObject({
        expandedUncertainty: z.union([
          z
            .strictObject({ radial: quantity("offset", "uncertainty", "In the worst direction.") })
            .meta({ id: "WantedRadial" }),
          z
            .strictObject({
              h: quantity("offset", "uncertainty", "Of h alone."),
              v: quantity("offset", "uncertainty", "Of v alone."),
            })
            .meta({ id: "WantedPlanes" }),
        ]),
      })
      .meta({ id: "WantedUncertainty", description: "Expanded uncertainty of the centre at the level." }),
    z
      .strictObject({
        tolerance: toleranceSchema,
        ratio: z
          .number()
          .min(bounds.toleranceRatio.min)
          .max(bounds.toleranceRatio.max)
          .meta({
            description:
              "Half-width of the tolerance over expanded uncertainty; 4 when absent (common practice).",
          })
          .optional(),
      })
      .meta({
        id: "WantedForTolerance",
        description: "Half-width ÷ ratio is the expanded uncertainty wanted.",
      }),
  ])
  .meta({ id: "Wanted" });

const reachableMembers = {
  readingsPerPlace: z
    .int()
    .min(1)
    .max(limits.readingsPerPlace)
    .meta({
      description:
        "How many readings may be taken at one place, those already read there counted; 1 when absent.",
    })
    .optional(),
};

export const reachableSchema = z
  .union([
    z
      .strictObject({
        clockDegs: z
          .array(clockDeg)
          .max(limits.placesPerBore)
          .meta({ description: "Places that can be reached." }),
        ...reachableMembers,
      })
      .meta({ id: "ReachablePlaces" }),
    z
      .strictObject({
        ranges: z
          .array(
            z.strictObject({ fromDeg: clockDeg, toDeg: clockDeg }).meta({
              id: "ClockRange",
              description: "Clockwise from one to the other, over 12 o'clock if need be.",
            }),
          )
          .max(limits.rangesPerBore),
        stepDeg: fixedQuantity(
          "deg",
          "stepDeg",
          "Places in a range, from its first end on; its last end is one too.",
        ),
        ...reachableMembers,
      })
      .meta({ id: "ReachableRanges" }),
  ])
  .meta({ id: "Reachable", description: "Places that are the same clock angle count once." });

export const plannedBore = z
  .strictObject({
    id: callerId,
    form: z.enum(["points", "turned_gauge", "rotating_target"]).meta({
      description:
        "What is read: the wall (points, turned_gauge: its radius is found too), or spots on a target turned about the bore's own centre. A wire's readings are points at 270, 90, 180 and 0 degrees.",
    }),
    readingUncertainty: readingUncertainty.nullish(),
    wanted: wantedSchema.nullish(),
    read: z
      .array(
        z
          .strictObject({
            clockDeg,
            u: quantity(
              "offset",
              "uncertainty",
              "Standard uncertainty of this reading; else the bore's.",
            ).nullish(),
          })
          .meta({ id: "ReadingTaken" }),
      )
      .max(limits.readingsPerBore)
      .meta({ description: "Readings already taken." })
      .nullish(),
    reachable: reachableSchema.nullish(),
    addedMax: z
      .int()
      .min(1)
      .max(limits.addedPerBore)
      .meta({ description: `Readings that may be added at the most; ${limits.addedPerBore} when absent.` })
      .nullish(),
  })
  .meta({ id: "PlannedBore" });

export const measurementPlanRequest = z
  .strictObject({
    units: unitsSchema,
    level: levelSchema.optional(),
    readingUncertainty: readingUncertainty
      .nullish()
      .meta({ description: "Of every bore that states none of its own." }),
    wanted: wantedSchema.nullish().meta({ description: "Of every bore that states nothing of its own." }),
    bores: z.array(plannedBore).min(1).max(limits.boresPerCall),
    note: noteSchema.optional(),
    jobId: jobIdSchema.optional(),
  })
  .meta({
    id: "MeasurementPlanRequest",
    description: `At most ${limits.readingsPerCall} readings taken, and ${limits.placesPerCall} places, in all bores together.`,
  });

export const centrePrediction = z
  .object({
    readings: z.int(),
    covariance: covarianceAnswer.meta({
      description:
        "Of the centre (h, v): (JᵀWJ)⁻¹ with W = 1/u², the radius (of spots the mounting error) fitted beside it.",
    }),
    expandedUncertainty: z
      .object({
        h: z.number(),
        v: z.number(),
        radial: z.number().meta({ description: "kRadial × standard uncertainty in the worst direction." }),
        k: z.number().meta({ description: "Two-sided normal factor at the level." }),
        kRadial: z.number().meta({ description: "√(−2·ln(1 − level))." }),
      })
      .meta({ id: "PredictedUncertainty" }),
    ratio: z.number().meta({ description: "Largest expanded uncertainty over that wanted." }),
    suffices: z.boolean().meta({ description: "ratio ≤ 1." }),
    evenRing: z
      .object({
        uncertainty: z.number().meta({
          description: "Standard uncertainty by as many readings evenly round: u·√(2/n), for spots u/√n.",
        }),
        dilution: z.number().meta({ description: "Worst standard uncertainty over that; 1 is best." }),
      })
      .meta({ id: "EvenRing" }),
  })
  .meta({
    id: "CentrePrediction",
    description: "What readings will tell of the centre if they scatter as stated.",
  });

export const boreMeasurementPlan = z
  .object({
    id: z.string(),
    form: plannedBore.shape.form,
    wanted: z.union([z.object({ radial: z.number() }), z.object({ h: z.number(), v: z.number() })]).meta({
      description: "Expanded uncertainty that was aimed at, in offset units.",
    }),
    status: z.enum(["suffices", "suffices_when_added", "out_of_reach", "too_many_needed"]).meta({
      description:
        "suffices: those read do. suffices_when_added: those read and added do. out_of_reach: all that can be reached do not; add holds them all, or the best addedMax. too_many_needed: more than addedMax would have to be added, as far as was found.",
    }),
    now: centrePrediction
      .nullable()
      .meta({ description: "By those read; null where they leave the centre open." }),
    add: z
      .array(z.object({ clockDeg: z.number(), readings: z.int() }))
      .meta({ description: "Clockwise, [0, 360)." }),
    addCount: z.int(),
    after: centrePrediction.nullable().meta({
      description: "By those read and added; null where addedMax is too few to determine the centre.",
    }),
    best: centrePrediction.meta({ description: "By those read and all that can be reached." }),
    least: z
      .object({
        count: z.int(),
        by: z.enum(["taken", "even_ring", "relaxation"]),
        proved: z.boolean().meta({ description: "The count found is this one: no choice does with fewer." }),
      })
      .nullable()
      .meta({
        id: "LeastCount",
        description:
          "No choice does with fewer readings added than count. by: those read do not suffice, or are fewer than the unknowns; the even-ring bound Σ1/u² ≥ 2/u(centre)²; the continuous (E-optimal) relaxation. Null where none was found to do.",
      }),
    evenRingReadings: z
      .int()
      .meta({ description: "So many evenly round the whole bore would do, none read before." }),
    warnings: z.array(warningSchema),
  })
  .meta({ id: "BoreMeasurementPlan" });

export const measurementPlanResponse = z
  .object(calculationEnvelope("measurement-plan", z.object({ bores: z.array(boreMeasurementPlan) })))
  .meta({ id: "MeasurementPlanResponse" });

export type MeasurementPlanRequest = z.infer<typeof measurementPlanRequest>;
export type PlannedBoreRequest = z.infer<typeof plannedBore>;
export type ReachableRequest = z.infer<typeof reachableSchema>;
export type WantedRequest = z.infer<typeof wantedSchema>;
export type CentrePredictionAnswer = z.infer<typeof centrePrediction>;
export type BoreMeasurementPlan = z.infer<typeof boreMeasurementPlan>;
