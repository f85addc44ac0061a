import { z } from "zod";
import { bounds, limits } from "../limits.ts";
import { unitChoices } from "../units.ts";
import { quantity } from "./quantity.ts";

export const unitsSchema = z
  .strictObject({
    axial: z.enum(unitChoices.axial).meta({ description: "z and lengths along the machine." }),
    bore: z.enum(unitChoices.bore).meta({ description: "Coordinates of points on a wall, diameters." }),
    offset: z.enum(unitChoices.offset).meta({
      description: "Readings from nominal, centres, targets, deviations, tolerances, shims, uncertainties.",
    }),
  })
  .meta({ id: "Units", description: "Always stated, never assumed." });

export const seenSchema = z.enum(["downstream", "upstream"]).meta({
  id: "Seen",
  description: "The way the reader looked. Answers are always in the downstream view: h to the right, v up.",
});

export const levelSchema = z
  .number()
  .gt(bounds.level.min)
  .lt(bounds.level.max)
  .meta({ description: "Coverage probability of expanded uncertainties; 0.95 when absent." });

export const noteSchema = z
  .string()
  .max(limits.noteLength)
  .nullable()
  .meta({ description: "Free text kept with the record." });
export const jobIdSchema = z.uuid().nullable().meta({ description: "The job this calculation belongs to." });

/** h to the right, v up, in `offset` units. */
export const offsetPair = z
  .strictObject({ h: quantity("offset", "offset", "To the right."), v: quantity("offset", "offset", "Up.") })
  .meta({ id: "OffsetPair" });

const varianceCell = quantity("offset", "variance", "In the square of the offset unit.");
export const covarianceSchema = z
  .array(z.array(varianceCell).min(2).max(2))
  .min(2)
  .max(2)
  .meta({ id: "Covariance", description: "2 × 2 covariance of (h, v), in the square of the offset unit." });

/** As `covarianceSchema`, answered: as large as it comes out. */
export const covarianceAnswer = z.array(z.array(z.number()).min(2).max(2)).min(2).max(2).meta({
  id: "AnsweredCovariance",
  description: "2 × 2 covariance of (h, v), in the square of the offset unit.",
});

export const dofSchema = z
  .number()
  .positive()
  .nullable()
  .meta({ description: "Degrees of freedom; null or absent is infinite." });

export const warningSchema = z
  .object({ code: z.string(), detail: z.string() })
  .meta({ id: "Warning", description: "Something the reader must know before using the number beside it." });
export const cautionSchema = z.object({ code: z.string(), text: z.string() }).meta({ id: "Caution" });

export const verdictSchema = z.enum(["conforms", "undecided", "exceeds"]).meta({ id: "Verdict" });

/** h, v, size and direction of a deviation, as answered. */
export const deviationAnswer = z
  .object({
    h: z.number(),
    v: z.number(),
    radial: z.number(),
    clockDeg: z
      .number()
      .nullable()
      .meta({ description: "Direction of the deviation, [0, 360); null when it is zero." }),
  })
  .meta({ id: "Deviation", description: "In offset units. Positive: the bore lies right, or high." });

export const toleranceSchema = z
  .union([
    z
      .strictObject({ radial: quantity("offset", "uncertainty", "Half-width of a round tolerance.") })
      .meta({ id: "RadialTolerance" }),
    z.strictObject({ h: toleranceSide(), v: toleranceSide() }).meta({ id: "PlaneTolerance" }),
  ])
  .meta({ id: "Tolerance", description: "Half-widths, or [min, max] where one-sided." });

function toleranceSide() {
  return z.union([
    quantity("offset", "uncertainty", "Half-width."),
    z
      .array(quantity("offset", "offset", "Least and most."))
      .min(2)
      .max(2),
  ]);
}

/** What every stored calculation answers with, round its result. */
export function calculationEnvelope<R extends z.ZodType>(kind: string, result: R) {
  return {
    id: z.uuid(),
    kind: z.literal(kind),
    engineVersion: z.string(),
    inputHash: z.string().meta({ description: "sha256 of the RFC 8785 form of the body as received." }),
    createdAt: z.iso.datetime(),
    units: unitsSchema,
    level: z.number().optional(),
    result,
  };
}
