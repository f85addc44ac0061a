import { z } from "zod";
import { limits } from "../limits.ts";
import {
  calculationEnvelope,
  jobIdSchema,
  levelSchema,
  noteSchema,
  offsetPair,
  toleranceSchema,
  unitsSchema,
} from "./common.ts";
import { callerId } from "./quantity.ts";
import { crossedResult, oneStationResult } from "./repeatability-answers.ts";

const wholeCall = {
  units: unitsSchema,
  level: levelSchema
    .meta({
      description:
        "Coverage probability of expanded uncertainties, and of tests: an effect is significant when chance makes one as large at most 1 − level of the time. 0.95 when absent.",
    })
    .optional(),
  tolerance: toleranceSchema
    .nullable()
    .meta({ description: "What the readings are to judge. Absent: no per cent of tolerance." })
    .optional(),
  note: noteSchema.optional(),
  jobId: jobIdSchema.optional(),
};

export const repeatReading = offsetPair
  .extend({
    at: z.iso
      .datetime({ offset: true })
      .meta({ description: "When it was read. Of every reading, or of none." })
      .optional(),
  })
  .meta({ id: "RepeatReading" });

export const oneStationStudy = z
  .strictObject({
    ...wholeCall,
    form: z.literal("one_station"),
    station: callerId,
    readings: z
      .array(repeatReading)
      .min(2)
      .max(limits.readingsPerBore)
      .meta({ description: "In the order read. Drift needs three, drift of h and v together four." }),
  })
  .meta({ id: "OneStationStudy", description: "Repeat readings of one station by one person." });

export const studyCell = z
  .strictObject({
    station: callerId,
    person: callerId,
    readings: z.array(offsetPair).min(2).max(limits.repeatsPerCell),
  })
  .meta({ id: "StudyCell", description: "What one person read at one station, again and again." });

export const poolingSchema = z
  .strictObject({
    rule: z.enum(["never", "above"]).meta({
      description:
        "never (default): station and person are tested against the interaction. above: where chance makes as large an interaction with a probability above `probability` in h and in v, it is pooled with the repeats.",
    }),
    probability: z
      .number()
      .min(0)
      .max(1)
      .meta({ description: "Of `above`: 0.25 when absent, as is usual in gauge studies." })
      .optional(),
  })
  .meta({ id: "InteractionPooling" });

export const crossedStudy = z
  .strictObject({
    ...wholeCall,
    form: z.literal("crossed"),
    cells: z.array(studyCell).min(4).max(limits.cellsPerStudy).meta({
      description:
        "Every person at every station, the same number of readings each: two stations, two people and two repeats at least.",
    }),
    pooling: poolingSchema.optional(),
  })
  .meta({ id: "CrossedStudy", description: "Several people reading several stations several times." });

export const repeatabilityStudyRequest = z
  .discriminatedUnion("form", [oneStationStudy, crossedStudy])
  .meta({ id: "RepeatabilityStudyRequest" });

export const repeatabilityStudyResult = z
  .discriminatedUnion("form", [oneStationResult, crossedResult])
  .meta({ id: "RepeatabilityStudyResult" });

export const repeatabilityStudyResponse = z
  .object(calculationEnvelope("repeatability-study", repeatabilityStudyResult))
  .meta({ id: "RepeatabilityStudyResponse" });

export type RepeatabilityStudyRequest = z.infer<typeof repeatabilityStudyRequest>;
export type OneStationStudyRequest = z.infer<typeof oneStationStudy>;
export type CrossedStudyRequest = z.infer<typeof crossedStudy>;
export type RepeatabilityStudyResult = z.infer<typeof repeatabilityStudyResult>;
