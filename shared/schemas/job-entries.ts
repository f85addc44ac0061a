import { z } from "zod";
import { limits } from "../limits.ts";
import { setUpCheckIds } from "../set-up-checks.ts";
import { axisDeviationRequest, axisSchema } from "./axis-deviations.ts";
import { pointsBore, rotatingTargetBore, turnedGaugeBore, wireBore } from "./bore-fits.ts";
import { levelSchema, offsetPair, seenSchema } from "./common.ts";
import { callerId, quantity } from "./quantity.ts";
import { shimMoveRequest } from "./shim-moves.ts";

const line = z.string().trim().min(1).max(limits.nameLength);
const text = z.string().trim().min(1).max(limits.noteLength);
const moment = z.iso.datetime({ offset: true });

const personSchema = z
  .strictObject({ name: line, role: line.meta({ description: "On this job, in words." }) })
  .meta({ id: "JobPerson" });

const instrumentSchema = z
  .strictObject({
    id: callerId,
    description: line,
    calibratedOn: z.iso.date().nullish(),
    calibrationDueOn: z.iso.date().nullish(),
    readingUncertainty: quantity(
      "offset",
      "uncertainty",
      "Standard uncertainty (k = 1) of a reading that states none of its own.",
    ).nullish(),
  })
  .meta({ id: "JobInstrument" });

export const jobDetails = z
  .strictObject({
    title: line,
    orderNumber: line.nullish(),
    owner: line
      .nullish()
      .meta({ description: "Legal owner, for the title block; the machine's when absent." }),
    site: line.nullish(),
    startsOn: z.iso.date().nullish(),
    endsOn: z.iso.date().nullish(),
    people: z.array(personSchema).max(limits.peoplePerJob).optional(),
    instruments: z.array(instrumentSchema).max(limits.instrumentsPerJob).optional(),
    seen: seenSchema.meta({ description: "The way readers look, unless a reading says otherwise." }),
    level: levelSchema.optional(),
    axis: axisSchema.optional().meta({
      description: "Least squares through the machine's reference stations when absent.",
    }),
    verdict: axisDeviationRequest.shape.verdict,
    objective: shimMoveRequest.shape.objective,
    remarks: z.string().max(limits.noteLength).nullish(),
  })
  .meta({ id: "JobDetails" });

export const checkRequest = z
  .strictObject({
    check: z.enum(setUpCheckIds),
    answer: z.enum(["yes", "no", "not_applicable"]),
    by: line.nullish().meta({ description: "Who looked, where it is not the caller." }),
    at: moment.nullish().meta({ description: "When; now when absent." }),
    remark: text.nullish(),
  })
  .meta({ id: "CheckRequest", description: "The latest answer counts; earlier ones stay in the log." });

const metalTemperature = z
  .strictObject({ place: line, value: quantity("temperature", "temperature", "In the unit stated beside.") })
  .meta({ id: "MetalTemperature" });

export const surveyRequest = z
  .strictObject({
    stage: z.enum(["as_found", "after_step", "as_left"]),
    label: line.nullish(),
    sameSetUp: z.boolean().meta({
      description: "Whether the instrument stands as it did in the survey before; false for the first.",
    }),
    instrument: callerId.nullish().meta({ description: "Of the job's instruments." }),
    conditions: z
      .strictObject({
        temperatureUnit: z.enum(["C", "F"]),
        ambient: quantity("temperature", "temperature", "Of the air.").nullish(),
        metal: z.array(metalTemperature).max(limits.peoplePerJob).optional(),
        remark: text.nullish(),
      })
      .meta({ id: "SurveyConditions" })
      .nullish(),
  })
  .meta({ id: "SurveyRequest" });

const readingFields = {
  station: callerId.meta({ description: "Id of the machine's station." }),
  takenAt: moment,
  person: line.nullish().meta({ description: "Who read it." }),
  upperHalf: z.enum(["on", "off"]).nullish().meta({ description: "Whether the upper half was on." }),
  instrument: callerId.nullish().meta({ description: "Of the job's instruments; the survey's when absent." }),
  closing: z
    .boolean()
    .optional()
    .meta({ description: "The first station read once more at the end: tells the drift, moves no centre." }),
};

/** The forms of POST /v1/bore-fits, each at a station. */
export const readingSchema = z
  .discriminatedUnion("form", [
    pointsBore.omit({ id: true }).extend(readingFields).meta({ id: "PointsReading" }),
    turnedGaugeBore
      .omit({ id: true })
      .extend({
        ...readingFields,
        nominalDiameter: turnedGaugeBore.shape.nominalDiameter.nullish().meta({
          description: "Diameter on the drawing; the station's when absent.",
        }),
      })
      .meta({ id: "TurnedGaugeReading" }),
    rotatingTargetBore.omit({ id: true }).extend(readingFields).meta({ id: "RotatingTargetReading" }),
    wireBore.omit({ id: true }).extend(readingFields).meta({ id: "WireReading" }),
  ])
  .meta({ id: "Reading", description: "What was read at one station, and how." });

export const addReadingsRequest = z
  .strictObject({ readings: z.array(readingSchema).min(1).max(limits.readingsPerPost) })
  .meta({
    id: "AddReadingsRequest",
    description:
      "All or none is stored. Of several readings of a station in a survey the latest taken counts.",
  });

export const planRequest = z
  .strictObject({
    survey: z.uuid().meta({ description: "A computed survey." }),
    objective: shimMoveRequest.shape.objective,
    note: z.string().max(limits.noteLength).nullish(),
  })
  .meta({ id: "PlanRequest" });

export const loggedMoveRequest = z
  .strictObject({
    component: callerId,
    at: moment,
    person: line.nullish(),
    moved: z
      .array(z.strictObject({ support: callerId, ...offsetPair.shape }))
      .max(limits.supportsPerComponent)
      .optional()
      .meta({ description: "As read on the indicators, from where the part stood before." }),
    finished: z.boolean().meta({ description: "Whether the component is where it shall stay, and locked." }),
    reason: text.nullish().meta({
      description:
        "Asked for where a bearing moves before the casings and shrouds planned, or one of those after it.",
    }),
  })
  .meta({ id: "LoggedMoveRequest" });

export const jobConfirmationRequest = z
  .strictObject({
    before: z.uuid().meta({ description: "A computed survey." }),
    after: z.uuid().meta({ description: "A later computed survey." }),
    note: z.string().max(limits.noteLength).nullish(),
  })
  .meta({ id: "JobConfirmationRequest" });

export const concessionRequest = z
  .strictObject({
    station: callerId,
    name: line.meta({ description: "Who grants it." }),
    reason: text,
  })
  .meta({ id: "ConcessionRequest", description: "For a station that is left outside, or undecided." });

export const axisAcceptanceRequest = z
  .strictObject({
    survey: z.uuid().meta({ description: "The computed survey whose axis is taken as the new one." }),
    name: line.meta({ description: "Who takes it." }),
    reason: text,
  })
  .meta({
    id: "AxisAcceptanceRequest",
    description: "Where a reference station was itself moved, or cannot be shown to have stayed.",
  });

export const commentRequest = z.strictObject({ text }).meta({ id: "CommentRequest" });

export const withdrawalRequest = z
  .strictObject({ reason: text })
  .meta({ id: "WithdrawalRequest", description: "The entry stays in the log and counts no more." });

export type JobDetails = z.infer<typeof jobDetails>;
export type CheckRequest = z.infer<typeof checkRequest>;
export type SurveyRequest = z.infer<typeof surveyRequest>;
export type Reading = z.infer<typeof readingSchema>;
export type LoggedMove = z.infer<typeof loggedMoveRequest>;
export type ConcessionRequest = z.infer<typeof concessionRequest>;
export type AxisAcceptanceRequest = z.infer<typeof axisAcceptanceRequest>;
