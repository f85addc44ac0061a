import { z } from "zod";
import { authorSchema } from "./machines.ts";

export const jobEntryKinds = [
  "details",
  "check",
  "survey",
  "reading",
  "survey_result",
  "plan",
  "move",
  "confirmation",
  "concession",
  "axis_acceptance",
  "comment",
  "attachment",
  "withdrawal",
  "revision",
  "signature",
] as const;

export const jobLog = z
  .object({
    job: z.uuid(),
    revision: z.number().int(),
    recordHash: z.string().meta({ description: "Of the log as it stands now." }),
    entries: z.array(
      z.object({
        sequence: z.number().int(),
        id: z.uuid(),
        kind: z.enum(jobEntryKinds),
        createdAt: z.iso.datetime(),
        author: authorSchema,
        document: z.record(z.string(), z.unknown()),
      }),
    ),
    hashed: z
      .record(z.string(), z.unknown())
      .meta({ description: "What recordHash is over, in its RFC 8785 form: everything but a signature." }),
  })
  .meta({ id: "JobLog" });

export type JobLog = z.infer<typeof jobLog>;
