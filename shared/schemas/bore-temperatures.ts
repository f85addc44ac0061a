import { z } from "zod";
import { bounds } from "../limits.ts";
import { furtherUnitChoices } from "../units.ts";
import { unitsSchema } from "./common.ts";
import { materialSchema } from "./materials.ts";
import { quantity } from "./quantity.ts";

export const boreFitUnits = unitsSchema
  .extend({
    temperature: z
      .enum(furtherUnitChoices.temperature)
      .meta({ description: "Of gauge and part; coefficients are per degree of it." })
      .optional(),
  })
  .meta({ id: "BoreFitUnits", description: "Always stated; temperature where the call uses it." });

const coefficient = (of: string) =>
  z
    .number()
    .min(bounds.expansion.min)
    .max(bounds.expansion.max)
    .meta({
      description: `Mean linear expansion of the ${of} per degree of units.temperature (12e-6, not 12).`,
    })
    .nullish();
const material = (of: string) =>
  materialSchema.nullish().meta({ description: `Instead of ${of}Coefficient: its expansion is used.` });

/** What a bore may state so that its diameter is reduced to 20 °C. */
export const boreTemperatures = {
  gaugeTemperature: quantity(
    "temperature",
    "temperature",
    "Of what carries the scale when the bore was read: the instrument, or the master that it was set to. Needs gaugeCoefficient or gaugeMaterial.",
  ).nullish(),
  gaugeCoefficient: coefficient("gauge"),
  gaugeMaterial: material("gauge"),
  partTemperature: quantity(
    "temperature",
    "temperature",
    "Of the bore's metal when it was read. Needs partCoefficient or partMaterial.",
  ).nullish(),
  partCoefficient: coefficient("part"),
  partMaterial: material("part"),
};

export const diameterAt20CSchema = z
  .number()
  .nullable()
  .meta({
    description:
      "The diameter at 20 °C (ISO 1:2016), in bore units: diameter · (1 + α gauge · (t gauge − 20 °C)) / (1 + α part · (t part − 20 °C)). Null where the diameter is. Absent where the bore states no temperature. The centre is not touched. What is not known of temperatures and coefficients is in no uncertainty of this answer.",
  })
  .optional();

export const temperatureCorrectionSchema = z
  .object({
    factor: z.number().meta({ description: "diameterAt20C ÷ diameter." }),
    diameter: z
      .number()
      .nullable()
      .meta({ description: "diameterAt20C − diameter, in offset units; null where the diameter is." }),
    gaugeCoefficient: z.number().nullable().meta({
      description: "As used, per degree of units.temperature; null: its scale is taken as true as it was.",
    }),
    partCoefficient: z.number().nullable().meta({
      description: "As used, per degree of units.temperature; null: the part is taken as at 20 °C.",
    }),
  })
  .meta({ id: "TemperatureCorrection", description: "What was applied for diameterAt20C." })
  .optional();
