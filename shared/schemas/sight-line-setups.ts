import { z } from "zod";
import { bounds } from "../limits.ts";
import { furtherUnitChoices } from "../units.ts";
import {
  calculationEnvelope,
  cautionSchema,
  jobIdSchema,
  levelSchema,
  noteSchema,
  offsetPair,
  seenSchema,
  unitsSchema,
} from "./common.ts";
import { callerId, quantity } from "./quantity.ts";
import { sightLineResult } from "./sight-line-answers.ts";

export const sightLineUnits = unitsSchema
  .extend({
    temperature: z
      .enum(furtherUnitChoices.temperature)
      .meta({ description: "Of the gradient: per metre with C, per foot with F." })
      .optional(),
  })
  .meta({ id: "SightLineUnits", description: "Always stated; temperature where the call uses it." });

const place = quantity(
  "axial",
  "coordinate",
  "Along the bore line from one common face, increasing downstream.",
);

export const sightStation = z
  .strictObject({
    id: callerId,
    z: place,
    seen: seenSchema.optional().meta({ description: "Overrides the call's, for all h of this station." }),
    spot: offsetPair.meta({
      description: "As read on a target set at the bore's centre; `sense` says which way.",
    }),
    expected: offsetPair
      .nullish()
      .meta({ description: "Where the beam should pass, relative to the bore's centre; 0 when absent." }),
  })
  .meta({ id: "SightStation" });

const shiftAndTilt = z
  .strictObject({
    kind: z.literal("shift_and_tilt"),
    z: quantity("axial", "coordinate", "Of the pivot: the shift is made there, the tilt about it."),
  })
  .meta({ id: "ShiftAndTiltAdjuster" });

export const adjusterSupport = z
  .strictObject({ id: callerId, z: quantity("axial", "coordinate", "Where it carries the source.") })
  .meta({ id: "AdjusterSupport" });

const twoSupports = z
  .strictObject({
    kind: z.literal("two_supports"),
    supports: z.array(adjusterSupport).min(2).max(2),
  })
  .meta({ id: "TwoSupportsAdjuster" });

export const adjusterSchema = z
  .discriminatedUnion("kind", [shiftAndTilt, twoSupports])
  .meta({ id: "SourceAdjuster", description: "How the source can be moved, as one rigid piece." });

const gradientSide = (towards: string) =>
  z
    .number()
    .min(bounds.temperatureGradient.min)
    .max(bounds.temperatureGradient.max)
    .meta({
      description: `Rise of temperature ${towards}: °C per metre, or °F per foot, by units.temperature.`,
    });

export const sightPathSchema = z
  .strictObject({
    gradient: z
      .strictObject({ h: gradientSide("to the right"), v: gradientSide("upwards") })
      .meta({ id: "TemperatureGradient" }),
    length: quantity("axial", "positiveLength", "How far from the source the gradient reaches.")
      .nullish()
      .meta({ description: "How far from the source the gradient reaches; to the far station when absent." }),
  })
  .meta({ id: "SightPath", description: "The air that the beam goes through." });

export const sightDriftSchema = z
  .strictObject({
    closing: offsetPair.meta({ description: "The spot at the first station, read again at the end." }),
    allowed: quantity("offset", "uncertainty", "Largest distance by which it may have wandered."),
    shareOut: z.boolean().optional().meta({
      description:
        "Whether a drift that is allowed is shared out over the readings in their order, the second having half of it; false when absent.",
    }),
  })
  .meta({ id: "SightDrift" });

export const sightLineSetupRequest = z
  .strictObject({
    units: sightLineUnits,
    seen: seenSchema.meta({
      description: "The view of every h of this call. Answers are always in the downstream view.",
    }),
    sense: z.enum(["spot_on_target", "target_from_spot"]).meta({
      description: "Whether a spot is the beam's place on the target, or the target's place from the beam.",
    }),
    level: levelSchema.optional(),
    sourceZ: quantity("axial", "coordinate", "Where the source stands."),
    stations: z
      .array(sightStation)
      .min(2)
      .max(2)
      .meta({ description: "A near and a far bore, in the order read." }),
    wanted: quantity("offset", "uncertainty", "How close to `expected` the beam must pass, radially."),
    readingUncertainty: quantity(
      "offset",
      "uncertainty",
      "Standard uncertainty (k = 1) of each coordinate of a spot.",
    ).nullish(),
    adjuster: adjusterSchema.nullish(),
    sightPath: sightPathSchema.nullish(),
    drift: sightDriftSchema.nullish(),
    note: noteSchema.optional(),
    jobId: jobIdSchema.optional(),
  })
  .meta({ id: "SightLineSetupRequest" });

export const sightLineSetupResponse = z
  .object({
    ...calculationEnvelope("sight-line-setup", sightLineResult),
    units: sightLineUnits,
    seen: z.literal("downstream"),
    cautions: z.array(cautionSchema),
  })
  .meta({ id: "SightLineSetupResponse" });

export type SightLineSetupRequest = z.infer<typeof sightLineSetupRequest>;
