import { z } from "zod";
import { problemCodes } from "../error-codes.ts";

export const faultSchema = z
  .object({
    pointer: z.string().optional().meta({ description: "RFC 6901 pointer into the body." }),
    parameter: z.string().optional().meta({ description: "Name of the query parameter at fault." }),
    header: z.string().optional().meta({ description: "Name of the header at fault." }),
    code: z.enum(problemCodes),
    detail: z.string(),
    value: z.unknown().optional(),
    unit: z.string().optional(),
    allowed: z
      .object({ min: z.number().optional(), max: z.number().optional(), unit: z.string().optional() })
      .optional(),
  })
  .meta({ id: "Fault" });

export const problemSchema = z
  .object({
    type: z.string().meta({ description: "/v1/problems/<code>: a page that explains it." }),
    title: z.string(),
    status: z.number().int(),
    detail: z.string(),
    code: z.enum(problemCodes),
    requestId: z.string(),
    instance: z.string().optional(),
    fix: z.string().optional().meta({ description: "What to do about it, in one sentence." }),
    errors: z.array(faultSchema).optional(),
    more: z.number().int().optional().meta({ description: "How many faults are not listed." }),
    id: z.string().optional().meta({
      description: "The stored record of a refused calculation, or the resource whose secret was shown.",
    }),
    scope: z.string().optional(),
    obstacles: z
      .array(z.object({ code: z.string(), detail: z.string(), station: z.string().nullable() }))
      .optional()
      .meta({ description: "What stands in the way of a signature." }),
    limit: z.number().optional(),
    retryAfterSeconds: z.number().int().optional(),
  })
  .meta({ id: "Problem", description: "RFC 9457." });

export type Problem = z.infer<typeof problemSchema>;

export const problemKindSchema = z
  .object({ code: z.string(), status: z.number().int(), title: z.string(), fix: z.string() })
  .meta({ id: "ProblemKind" });
export const problemListSchema = z
  .object({ data: z.array(problemKindSchema) })
  .meta({ id: "ProblemKindList" });
