import { z } from "zod";
import { limits } from "../limits.ts";
import { setUpCheckIds } from "../set-up-checks.ts";
import { cautionSchema } from "./common.ts";
import {
  axisAcceptanceRequest,
  checkRequest,
  concessionRequest,
  jobDetails,
  loggedMoveRequest,
} from "./job-entries.ts";
import { machineDocument, revisionParam } from "./machines.ts";
import { entry, jobConfirmationSchema, jobFlag, jobPlanSchema, jobSurveySchema } from "./job-surveys.ts";
import { pageOf, pageQuery } from "./paging.ts";

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

const loggedMove = z
  .object({ ...entry, ...loggedMoveRequest.shape, flags: z.array(jobFlag) })
  .meta({ id: "LoggedMove" });
const concession = z.object({ ...entry, ...concessionRequest.shape }).meta({ id: "Concession" });
const axisAcceptance = z
  .object({
    ...entry,
    ...axisAcceptanceRequest.shape,
    surveyResult: z.uuid().meta({ description: "The survey's result whose axis was accepted." }),
    current: z.boolean().meta({ description: "False: the survey was computed again since, or is to be." }),
  })
  .meta({ id: "AxisAcceptance" });
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
    plans: z.array(jobPlanSchema),
    moves: z.array(loggedMove),
    confirmations: z.array(jobConfirmationSchema),
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
