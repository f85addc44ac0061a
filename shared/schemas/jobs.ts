import { z } from "zod";
import { limits } from "../limits.ts";
import { setUpCheckIds } from "../set-up-checks.ts";
import { axisDeviationResult } from "./axis-deviations.ts";
import { boreFitResult } from "./bore-fits.ts";
import { cautionSchema, offsetPair } from "./common.ts";
import { confirmationResult } from "./confirmation-answers.ts";
import {
  axisAcceptanceRequest,
  checkRequest,
  concessionRequest,
  jobDetails,
  loggedMoveRequest,
  readingSchema,
  surveyRequest,
} from "./job-entries.ts";
import { authorSchema, machineDocument, revisionParam } from "./machines.ts";
import { pageOf, pageQuery } from "./paging.ts";
import { shimMoveResult } from "./shim-moves.ts";

export const createJobRequest = z
  .strictObject({
    machineId: z.uuid(),
    machineRevision: z.number().int().min(1).optional().meta({ description: "The newest when absent." }),
    details: jobDetails,
  })
  .meta({ id: "CreateJobRequest" });

export const updateJobRequest = z
  .strictObject({ details: jobDetails.meta({ description: "All of them: what is left out is taken away." }) })
  .meta({ id: "UpdateJobRequest" });

export const signatureRequest = z
  .strictObject({
    password: z.string().min(1).max(256).meta({ description: "The signing member's own, again." }),
    meaning: z
      .string()
      .trim()
      .min(1)
      .max(limits.noteLength)
      .meta({ description: "What the signature says, in words." }),
  })
  .meta({ id: "SignatureRequest" });

export const reviseJobRequest = z
  .strictObject({ reason: z.string().trim().min(1).max(limits.noteLength) })
  .meta({ id: "ReviseJobRequest" });

/** What every entry of a job's log says of itself. */
const entry = { id: z.uuid(), createdAt: z.iso.datetime(), author: authorSchema };

export const jobFlag = z
  .object({ code: z.string(), detail: z.string(), station: z.string().nullable() })
  .meta({ id: "JobFlag", description: "What a reader must know: stands on every figure and report." });

const checkAnswer = z
  .object({
    check: z.enum(setUpCheckIds),
    text: z.string(),
    answer: checkRequest.shape.answer.nullable().meta({ description: "Null: not answered yet." }),
    by: z.string().nullable(),
    at: z.iso.datetime().nullable(),
    remark: z.string().nullable(),
  })
  .meta({ id: "CheckAnswer" });

const storedReading = z
  .object({
    ...entry,
    reading: readingSchema,
    counts: z.boolean().meta({ description: "false: withdrawn, or a later one of the station counts." }),
    sourceFile: z
      .object({ id: z.uuid(), name: z.string(), sha256: z.string() })
      .nullable()
      .meta({ description: "The file it came from, where it came from one." }),
  })
  .meta({ id: "StoredReading" });

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
    drift: z
      .object({ station: z.string(), ...offsetPair.shape })
      .nullable()
      .meta({ description: "Closing centre less opening centre; null without a closing reading." }),
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

const planSchema = z
  .object({ ...entry, survey: z.uuid(), calculation: z.uuid(), result: shimMoveResult })
  .meta({ id: "JobPlan" });
const loggedMove = z
  .object({ ...entry, ...loggedMoveRequest.shape, flags: z.array(jobFlag) })
  .meta({ id: "LoggedMove" });
const jobConfirmation = z
  .object({ ...entry, before: z.uuid(), after: z.uuid(), calculation: z.uuid(), result: confirmationResult })
  .meta({ id: "JobConfirmation" });
const concession = z.object({ ...entry, ...concessionRequest.shape }).meta({ id: "Concession" });
const axisAcceptance = z.object({ ...entry, ...axisAcceptanceRequest.shape }).meta({ id: "AxisAcceptance" });
const comment = z.object({ ...entry, text: z.string() }).meta({ id: "JobComment" });
export const attachmentSchema = z
  .object({
    ...entry,
    file: z.uuid(),
    name: z.string(),
    mediaType: z.enum(["image/jpeg", "image/png", "application/pdf"]),
    bytes: z.number().int(),
    sha256: z.string(),
    caption: z.string().nullable(),
  })
  .meta({ id: "Attachment" });
const signature = z
  .object({ ...entry, name: z.string(), meaning: z.string(), recordHash: z.string() })
  .meta({ id: "JobSignature" });

export const jobSummary = z
  .object({
    id: z.uuid(),
    title: z.string(),
    machineId: z.uuid(),
    machineName: z.string(),
    machineRevision: z.number().int(),
    revision: z.number().int(),
    state: z.enum(["open", "signed"]),
    createdAt: z.iso.datetime(),
    signedAt: z.iso.datetime().nullable(),
    version: z.number().int().meta({ description: "Also served as ETag; rises with every entry." }),
  })
  .meta({ id: "JobSummary" });

export const jobRecord = jobSummary
  .extend({
    machine: machineDocument,
    machineHash: z.string(),
    details: jobDetails,
    checks: z.array(checkAnswer),
    surveys: z.array(jobSurveySchema),
    plans: z.array(planSchema),
    moves: z.array(loggedMove),
    confirmations: z.array(jobConfirmation),
    concessions: z.array(concession),
    axisAcceptances: z.array(axisAcceptance),
    comments: z.array(comment),
    attachments: z.array(attachmentSchema),
    flags: z.array(jobFlag),
    signOff: z
      .object({ ready: z.boolean(), obstacles: z.array(jobFlag) })
      .meta({ id: "SignOff", description: "What still stands in the way of a signature." }),
    signature: signature.nullable(),
    revisions: z.array(
      z.object({
        revision: z.number().int(),
        reason: z.string().nullable().meta({ description: "Null of the first." }),
        signedAt: z.iso.datetime().nullable(),
      }),
    ),
    cautions: z.array(cautionSchema),
  })
  .meta({ id: "Job", description: "The whole record of a job: what reports are made from." });

export const listJobsQuery = z.strictObject({
  machineId: z.uuid().optional(),
  state: z.enum(["open", "signed"]).optional(),
  q: z
    .string()
    .min(1)
    .max(100)
    .optional()
    .meta({ description: "Words of the title, or the start of an id." }),
  ...pageQuery,
});
export const jobPage = pageOf("JobPage", jobSummary);

export const revisionQuery = z.strictObject({
  revision: revisionParam.optional().meta({ description: "Of the job; the newest when absent." }),
});

/** What a call that added to the log answers with. */
export const addedEntries = z
  .object({
    ids: z.array(z.uuid()).meta({ description: "Of the entries, in the order sent." }),
    version: z.number().int(),
    flags: z.array(jobFlag).meta({ description: "What a reader of this entry must know." }),
  })
  .meta({ id: "AddedEntries" });

export type JobSummary = z.infer<typeof jobSummary>;
export type JobRecord = z.infer<typeof jobRecord>;
export type JobSurvey = z.infer<typeof jobSurveySchema>;
export type JobFlag = z.infer<typeof jobFlag>;
export type SurveyResult = z.infer<typeof surveyResult>;
export type StoredReading = z.infer<typeof storedReading>;
