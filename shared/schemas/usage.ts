import { z } from "zod";

export const usageGroups = ["day", "key", "endpoint"] as const;

export const readUsageQuery = z.strictObject({
  from: z.iso.date().optional().meta({ description: "First UTC day; 30 days ago when absent." }),
  to: z.iso.date().optional().meta({ description: "Last UTC day, included; today when absent." }),
  groupBy: z.enum(usageGroups).optional().meta({ description: "day when absent." }),
});

export const usageSchema = z
  .object({
    from: z.iso.date(),
    to: z.iso.date(),
    groupBy: z.enum(usageGroups),
    data: z.array(
      z.object({
        day: z.iso.date().optional(),
        key: z
          .object({ id: z.uuid(), name: z.string(), prefix: z.string() })
          .nullable()
          .optional()
          .meta({ description: "null: calls of signed-in members." }),
        endpoint: z.string().optional(),
        calls: z.number().int(),
        succeeded: z.number().int(),
        failed: z.number().int(),
        durationMs: z.number(),
      }),
    ),
    total: z.object({
      calls: z.number().int(),
      succeeded: z.number().int(),
      failed: z.number().int(),
      durationMs: z.number(),
    }),
  })
  .meta({ id: "Usage", description: "Calls that reached the engine. Days are UTC." });
