import { z } from "zod";
import { selfTestSummary } from "./engine.ts";

export const metaSchema = z
  .object({
    service: z.literal("Borewright"),
    apiVersion: z.string(),
    engineVersion: z.string(),
    engineChangelog: z.string().meta({ description: "What changed in the engine, by version; Markdown." }),
    selfTest: selfTestSummary.meta({ description: "How the last self-test of this process ended." }),
    limits: z.record(z.string(), z.number()),
    units: z.record(z.string(), z.array(z.string())),
    cautions: z.array(z.object({ code: z.string(), text: z.string() })),
  })
  .meta({ id: "Meta" });

export const healthSchema = z
  .object({ status: z.enum(["ok", "unavailable"]), checks: z.record(z.string(), z.boolean()).optional() })
  .meta({ id: "Health" });
