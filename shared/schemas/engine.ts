import { z } from "zod";

const checkedFigure = z
  .object({
    id: z.string().meta({ description: "Of the case." }),
    area: z.enum([
      "bore-fit",
      "axis-deviation",
      "shim-move",
      "cold-target",
      "repeatability-study",
      "confirmation",
      "statistics",
    ]),
    source: z.string().meta({ description: "Where the example and its answer are published." }),
    figure: z.string(),
    expected: z.number().meta({ description: "As printed, in the units of the source." }),
    got: z
      .number()
      .nullable()
      .meta({ description: "What the engine gives now; null when it gives no finite number." }),
    tolerance: z.number().meta({
      description: "Largest difference: a little over half of the last printed digit, or as stated.",
    }),
    passed: z.boolean(),
  })
  .meta({ id: "CheckedFigure" });

export const selfTestSummary = z
  .object({
    at: z.iso.datetime(),
    engineVersion: z.string(),
    passed: z.int().meta({ description: "Figures within their tolerance." }),
    failed: z.int(),
  })
  .meta({ id: "SelfTestSummary" });

export const selfTestSchema = selfTestSummary
  .extend({ figures: z.array(checkedFigure) })
  .meta({ id: "SelfTest", description: "Published worked examples, computed anew by this engine." });

export type SelfTest = z.infer<typeof selfTestSchema>;
export type SelfTestSummary = z.infer<typeof selfTestSummary>;
