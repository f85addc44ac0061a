import { z } from "zod";
import { axisDeviationResult } from "./axis-deviations.ts";
import { boreFitResult } from "./bore-fits.ts";
import { offsetPair } from "./common.ts";
import { confirmationResult } from "./confirmation-answers.ts";
import { readingSchema, surveyRequest } from "./job-entries.ts";
import { authorSchema } from "./machines.ts";
import { shimMoveResult } from "./shim-moves.ts";

/** What every entry of a job's log says of itself. */
export const entry = { id: z.uuid(), createdAt: z.iso.datetime(), author: authorSchema };

export const jobFlag = z
  .object({ code: z.string(), detail: z.string(), station: z.string().nullable() })
  .meta({ id: "JobFlag", description: "What a reader must know: stands on every figure and report." });

const storedReading = z
  .object({
    ...entry,
    reading: readingSchema,
    counts: z.boolean().meta({ description: "false: withdrawn, or a later one of the station counts." }),
    standing: z.enum(["in_use", "superseded", "withdrawn"]).meta({
      description:
        "in_use: it counts. superseded: a later reading of the station counts. withdrawn: taken back, with a reason in the log.",
    }),
    sourceFile: z
      .object({ id: z.uuid(), name: z.string(), sha256: z.string() })
      .nullable()
      .meta({ description: "The file it came from, where it came from one." }),
  })
  .meta({ id: "StoredReading" });

const surveyDrift = z
  .object({
    station: z.string(),
    ...offsetPair.shape,
    uncertainty: z.number().nullable().meta({
      description:
        "Expanded uncertainty of the change's length: both readings' covariances together, times the two-dimensional factor at `level`. Null where a reading states no uncertainty and has none from its residuals.",
    }),
    level: z.number().meta({ description: "Coverage of `uncertainty`: the job's." }),
    exceeds: z.boolean().nullable().meta({
      description:
        "Whether the change is longer than its uncertainty, which the readings alone do not explain; flagged as survey_drifted. Null where there is no uncertainty.",
    }),
  })
  .meta({
    id: "SurveyDrift",
    description:
      "Closing centre less opening centre of the first station. Judged and told, never shared out over the readings: common practice is to find the cause and to read again.",
  });

const surveyResult = z
  .object({
    ...entry,
    boreFit: z.uuid().meta({ description: "Id of the stored calculation." }),
    axisDeviation: z.uuid().meta({ description: "Id of the stored calculation." }),
    engineVersion: z.string(),
    current: z.boolean().meta({ description: "false: readings have changed since; compute again." }),
    fits: z.array(boreFitResult),
    axis: axisDeviationResult.shape.axis,
    stations: axisDeviationResult.shape.stations,
    summary: axisDeviationResult.shape.summary,
    drift: surveyDrift.nullable().meta({ description: "Null without a closing reading." }),
  })
  .meta({ id: "SurveyResult" });

export const jobSurveySchema = z
  .object({
    ...entry,
    survey: surveyRequest,
    flags: z.array(jobFlag),
    readings: z.array(storedReading),
    result: surveyResult.nullable().meta({ description: "Null until computed." }),
  })
  .meta({ id: "JobSurvey" });

export const jobPlanSchema = z
  .object({
    ...entry,
    survey: z.uuid(),
    surveyResult: z.uuid().meta({ description: "Id of the survey's result that it was made from." }),
    current: z.boolean().meta({
      description: "false: the survey was computed again since, or its readings have changed; plan again.",
    }),
    calculation: z.uuid(),
    from: z
      .object({
        reference: z.array(z.string()),
        stations: z.array(
          axisDeviationResult.shape.stations.element.pick({ id: true, z: true, deviation: true }),
        ),
      })
      .meta({
        id: "PlanBasis",
        description: "The deviations that it was made from, whatever the survey's newest result says.",
      }),
    result: shimMoveResult,
  })
  .meta({ id: "JobPlan" });

export const jobConfirmationSchema = z
  .object({
    ...entry,
    before: z.uuid(),
    after: z.uuid(),
    beforeResult: z.uuid(),
    afterResult: z.uuid(),
    current: z.boolean().meta({
      description:
        "false: one of the surveys was computed again since, or its readings have changed; confirm again.",
    }),
    calculation: z.uuid(),
    result: confirmationResult,
  })
  .meta({ id: "JobConfirmation" });

export type JobSurvey = z.infer<typeof jobSurveySchema>;
export type JobFlag = z.infer<typeof jobFlag>;
export type SurveyResult = z.infer<typeof surveyResult>;
export type SurveyDrift = z.infer<typeof surveyDrift>;
export type StoredReading = z.infer<typeof storedReading>;
