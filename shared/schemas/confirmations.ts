import { z } from "zod";
import { limits } from "../limits.ts";
import { axisDeviationRequest, axisStationSchema } from "./axis-deviations.ts";
import {
  calculationEnvelope,
  cautionSchema,
  jobIdSchema,
  levelSchema,
  noteSchema,
  unitsSchema,
} from "./common.ts";
import { confirmationResult } from "./confirmation-answers.ts";
import { callerId, quantity } from "./quantity.ts";

export const surveyStationSchema = axisStationSchema.omit({ weight: true }).meta({
  id: "SurveyStation",
  description:
    "A station as one survey measured it. Target and tolerance count in the later survey: there they give the verdicts.",
});

export const surveySchema = z
  .strictObject({ stations: z.array(surveyStationSchema).min(1).max(limits.stationsPerCall) })
  .meta({ id: "Survey" });

export const confirmationComponent = z
  .strictObject({
    id: callerId,
    stations: z.array(callerId).max(limits.stationsPerCall).optional(),
    carriedBy: callerId
      .nullable()
      .meta({ description: "The component it sits in: its stations move with that too." })
      .optional(),
    supports: z
      .array(z.strictObject({ id: callerId, z: quantity("axial", "coordinate", "Of the support.") }))
      .max(limits.supportsPerComponent)
      .optional(),
  })
  .meta({ id: "ConfirmationComponent", description: "A rigid part: which stations move when it does." });

export const plannedMoveSchema = z
  .strictObject({
    station: callerId.optional(),
    component: callerId.optional(),
    support: callerId.optional(),
    h: quantity("offset", "offset", "To the right."),
    v: quantity("offset", "offset", "Up."),
  })
  .meta({
    id: "PlannedMove",
    description:
      "How far a station was to move; or a component at one of its supports, for each of which there is one.",
  });

export const logEntrySchema = z
  .strictObject({
    at: z.iso.datetime({ offset: true }),
    event: z.enum(["measured", "moved"]),
    station: callerId.optional(),
    component: callerId.optional(),
  })
  .meta({ id: "LogEntry", description: "A station or a component, with all its stations." });

export const confirmationRequest = z
  .strictObject({
    units: unitsSchema,
    level: levelSchema
      .meta({
        description:
          "Coverage probability of expanded uncertainties and of every test: of twenty stations that did not move, one fails by chance at 0.95. 0.95 when absent.",
      })
      .optional(),
    before: surveySchema,
    after: surveySchema,
    sameSetUp: z.boolean().meta({
      description:
        "true: the instrument was not touched between the surveys, and centres are compared as read. false: it was set up anew; deviations from each survey's own axis through the reference stations are compared.",
    }),
    reference: z
      .array(callerId)
      .max(limits.stationsPerCall)
      .meta({
        description: "Ids of the stations that should not have moved and hold the axis; none when absent.",
      })
      .optional(),
    axis: z
      .strictObject({
        method: z.enum(["least_squares", "line_of_sight"]).meta({
          description:
            "Of the verdicts. least_squares (default): through the reference stations as measured after. line_of_sight: the beam itself.",
        }),
      })
      .optional(),
    verdict: axisDeviationRequest.shape.verdict,
    components: z.array(confirmationComponent).max(limits.componentsPerCall).optional(),
    moves: z.array(plannedMoveSchema).max(limits.movesPerCall).optional(),
    log: z
      .array(logEntrySchema)
      .max(limits.eventsPerCall)
      .meta({ description: "What happened, in any order; entries of one time in the order sent." })
      .optional(),
    note: noteSchema.optional(),
    jobId: jobIdSchema.optional(),
  })
  .meta({ id: "ConfirmationRequest" });

export const confirmationResponse = z
  .object({ ...calculationEnvelope("confirmation", confirmationResult), cautions: z.array(cautionSchema) })
  .meta({ id: "ConfirmationResponse" });

export type ConfirmationRequest = z.infer<typeof confirmationRequest>;
export type ConfirmationComponent = z.infer<typeof confirmationComponent>;
export type SurveyStationRequest = z.infer<typeof surveyStationSchema>;
export type PlannedMoveRequest = z.infer<typeof plannedMoveSchema>;
export type LogEntryRequest = z.infer<typeof logEntrySchema>;
