import { z } from "zod";
import { pageOf, pageQuery } from "./paging.ts";
import { problemSchema } from "./problem.ts";

export const calculationKinds = [
  "bore-fit",
  "axis-deviation",
  "shim-move",
  "fewest-moves",
  "alignment",
  "cold-target",
  "confirmation",
  "repeatability-study",
  "measurement-plan",
  "sight-line-setup",
] as const;
export const calculationKindSchema = z.enum(calculationKinds).meta({ id: "CalculationKind" });

export const calculationSummary = z
  .object({
    id: z.uuid(),
    kind: calculationKindSchema,
    status: z.enum(["succeeded", "failed"]),
    createdAt: z.iso.datetime(),
    durationMs: z.number(),
    engineVersion: z.string(),
    inputHash: z.string(),
    resultHash: z.string().nullable(),
    member: z.object({ id: z.uuid(), name: z.string() }).nullable(),
    key: z.object({ id: z.uuid(), name: z.string(), prefix: z.string() }).nullable(),
    requestId: z.string(),
    note: z.string().nullable(),
    jobId: z.uuid().nullable(),
  })
  .meta({ id: "CalculationSummary" });

export const calculationRecord = calculationSummary
  .extend({
    request: z.record(z.string(), z.unknown()).meta({ description: "The body as received." }),
    response: z
      .record(z.string(), z.unknown())
      .nullable()
      .meta({ description: "The answer; null when the engine refused." }),
    problem: problemSchema.nullable().meta({ description: "The refusal; null when it succeeded." }),
  })
  .meta({ id: "CalculationRecord", description: "Immutable. Belongs to one organisation." });

export const listCalculationsQuery = z.strictObject({
  kind: z.enum(calculationKinds).optional(),
  status: z.enum(["succeeded", "failed"]).optional(),
  jobId: z.uuid().optional(),
  keyId: z.uuid().optional(),
  from: z.iso.datetime({ offset: true }).optional().meta({ description: "Earliest createdAt." }),
  to: z.iso.datetime({ offset: true }).optional().meta({ description: "createdAt before this." }),
  q: z.string().min(1).max(100).optional().meta({ description: "Words of the note, or the start of an id." }),
  ...pageQuery,
});
export const calculationPage = pageOf("CalculationPage", calculationSummary);

export const replaySchema = z
  .object({
    same: z.boolean(),
    engineVersion: z.string().meta({ description: "The engine that computed it now." }),
    recordedEngineVersion: z.string(),
    differences: z.array(z.object({ pointer: z.string(), then: z.unknown(), now: z.unknown() })),
  })
  .meta({
    id: "Replay",
    description: "What the engine answers to the stored request today, against what was stored.",
  });

export type CalculationSummary = z.infer<typeof calculationSummary>;
export type CalculationRecord = z.infer<typeof calculationRecord>;
export type Replay = z.infer<typeof replaySchema>;
