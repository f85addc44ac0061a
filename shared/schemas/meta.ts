import { z } from "zod";

export const metaSchema = z
  .object({
    service: z.literal("Borewright"),
    apiVersion: z.string(),
    engineVersion: z.string(),
    limits: z.record(z.string(), z.number()),
    units: z.record(z.string(), z.array(z.string())),
    cautions: z.array(z.object({ code: z.string(), text: z.string() })),
  })
  .meta({ id: "Meta" });

export const healthSchema = z
  .object({ status: z.enum(["ok", "unavailable"]), checks: z.record(z.string(), z.boolean()).optional() })
  .meta({ id: "Health" });
