import { z } from "zod";
import { bounds, limits } from "../limits.ts";
import { furtherUnitChoices } from "../units.ts";
import {
  calculationEnvelope,
  jobIdSchema,
  noteSchema,
  offsetPair,
  unitsSchema,
  warningSchema,
} from "./common.ts";
import { materialSchema } from "./materials.ts";
import { callerId, quantity } from "./quantity.ts";

export const coldTargetUnits = unitsSchema
  .extend({
    temperature: z
      .enum(furtherUnitChoices.temperature)
      .meta({ description: "Of hot and cold; coefficients are per degree of it." })
      .optional(),
    mass: z
      .enum(furtherUnitChoices.mass)
      .meta({ description: "Of masses and hungMass; massPerLength is in kg/m or lb/ft." })
      .optional(),
    force: z
      .enum(furtherUnitChoices.force)
      .meta({ description: "Of tension; where it is stated, the supports' reactions are answered." })
      .optional(),
    density: z.enum(furtherUnitChoices.density).optional(),
    modulus: z.enum(furtherUnitChoices.modulus).optional(),
  })
  .meta({ id: "ColdTargetUnits", description: "Always stated; the last five where the call uses them." });

export const growthSchema = z
  .strictObject({
    direction: z.enum(["v", "h"]).meta({ description: "v when absent." }).nullable().optional(),
    length: quantity(
      "bore",
      "coordinate",
      "From the fixed support to the centre line, in the bore unit; negative where the support lies above, or to the right.",
    ),
    coefficient: z
      .number()
      .min(bounds.expansion.min)
      .max(bounds.expansion.max)
      .meta({ description: "Mean linear expansion per degree of units.temperature (12e-6, not 12)." })
      .nullable()
      .optional(),
    material: materialSchema
      .nullable()
      .meta({ description: "Instead of coefficient: its expansion is used." })
      .optional(),
    hot: quantity("temperature", "temperature", "Metal temperature when running."),
    cold: quantity("temperature", "temperature", "Metal temperature at the survey."),
    uncertainty: quantity("offset", "uncertaintyOrExact", "Standard uncertainty of this growth; 0 is exact.")
      .nullable()
      .optional(),
  })
  .meta({
    id: "Growth",
    description: "coefficient · length · (hot − cold). Exactly one of coefficient and material.",
  });

export const targetStationSchema = z
  .strictObject({
    id: callerId,
    z: quantity("axial", "coordinate", "Along the bore line from one common face, increasing downstream."),
    follows: z.enum(["rotor", "bearing_line"]).meta({
      description: "rotor: a part round the shaft. bearing_line: a bearing; its journal runs off its centre.",
    }),
    growth: z
      .union([growthSchema, z.array(growthSchema).max(limits.growthsPerStation)])
      .nullable()
      .meta({ description: "One or a list; they add up." })
      .optional(),
    closing: offsetPair
      .nullable()
      .meta({ description: "Displacement from the state measured to the state run. Absent: none." })
      .optional(),
  })
  .meta({ id: "TargetStation" });

export const sectionSchema = z
  .strictObject({
    length: quantity("axial", "positiveLength", "Along the machine, in the axial unit."),
    outer: quantity("bore", "positiveLength", "Outer diameter."),
    inner: quantity("bore", "diameterInside", "Inner diameter; solid when absent.").nullable().optional(),
  })
  .meta({ id: "ShaftSection" });

export const rotorMassSchema = z
  .strictObject({
    z: quantity("axial", "coordinate", "Where it sits."),
    mass: quantity("mass", "mass", "Carried by the shaft without stiffening it: discs, blades, couplings."),
  })
  .meta({ id: "RotorMass" });

export const rotorSupportSchema = z
  .strictObject({
    z: quantity("axial", "coordinate", "Middle of the bearing."),
    line: offsetPair
      .nullable()
      .meta({ description: "Wanted hot place of the bearing's centre, relative to the axis. Absent: on it." })
      .optional(),
  })
  .meta({ id: "RotorSupport" });

const journalZ = quantity("axial", "coordinate", "That of its support.");
export const journalSchema = z
  .union([
    z
      .strictObject({ z: journalZ, running: offsetPair })
      .meta({ id: "RunningJournal", description: "Journal centre relative to bearing centre, running." }),
    z
      .strictObject({
        z: journalZ,
        radialClearance: quantity("offset", "thickness", "Half of the diametral clearance."),
        lift: offsetPair.meta({ description: "Off the bottom of the bearing." }),
      })
      .meta({
        id: "ClearanceJournal",
        description: "Runs at h = lift.h, v = lift.v − radialClearance from the bearing's centre.",
      }),
  ])
  .meta({ id: "Journal" });

export const rotorSchema = z
  .strictObject({
    z: quantity("axial", "coordinate", "Where the first section begins; 0 when absent.")
      .nullable()
      .optional(),
    sections: z
      .array(sectionSchema)
      .min(1)
      .max(limits.sectionsPerRotor)
      .meta({ description: "In order of z." }),
    material: materialSchema
      .nullable()
      .meta({ description: "Gives density and modulus where they are not stated." })
      .optional(),
    density: quantity("density", "density", "Of the shaft; 0 is weightless.").nullable().optional(),
    modulus: quantity("modulus", "modulus", "Of elasticity.").nullable().optional(),
    masses: z.array(rotorMassSchema).max(limits.massesPerRotor).nullable().optional(),
    supports: z
      .array(rotorSupportSchema)
      .max(limits.supportsPerRotor)
      .meta({ description: "Two or more apart, anywhere on the shaft, in any order." }),
    journals: z
      .array(journalSchema)
      .max(limits.supportsPerRotor)
      .nullable()
      .meta({ description: "Each at the z of a support. A support without one holds the shaft at its line." })
      .optional(),
  })
  .meta({ id: "Rotor", description: "A stepped shaft, bent by its weight as an Euler–Bernoulli beam." });

export const wireSchema = z
  .strictObject({
    massPerLength: quantity("mass", "massAbove0", "In kg/m or lb/ft, with units.mass."),
    tension: quantity("force", "force", "Horizontal tension.").nullable().optional(),
    hungMass: quantity("mass", "massAbove0", "Instead of tension: × 9.80665 m/s² is the tension.")
      .nullable()
      .optional(),
    span: z
      .array(quantity("axial", "coordinate", "First and second end."))
      .min(2)
      .max(2)
      .meta({ description: "[z0, z1] of the level ends, z0 below z1." }),
  })
  .meta({ id: "Wire", description: "A stretched wire. Exactly one of tension and hungMass." });

export const coldTargetRequest = z
  .strictObject({
    units: coldTargetUnits,
    stations: z.array(targetStationSchema).min(1).max(limits.stationsPerCall),
    rotor: rotorSchema
      .nullable()
      .meta({ description: "Needed where a station follows it; its supports say where bearings should lie." })
      .optional(),
    wire: wireSchema.nullable().optional(),
    note: noteSchema.optional(),
    jobId: jobIdSchema.optional(),
  })
  .meta({ id: "ColdTargetRequest" });

const pairAnswer = z.object({ h: z.number(), v: z.number() });

const stationAnswer = z
  .object({
    id: z.string(),
    z: z.number(),
    follows: z.enum(["rotor", "bearing_line"]),
    target: pairAnswer.meta({
      description:
        "Where the centre should lie cold, relative to the axis: rotor or line − growth − closing.",
    }),
    uncertainty: pairAnswer
      .meta({
        description: "Standard, from those of the growths as independent; absent where none is stated.",
      })
      .optional(),
    parts: z
      .object({
        rotor: pairAnswer.meta({ description: "Running shaft centre line at this z." }).optional(),
        line: pairAnswer.meta({ description: "Wanted hot place of the bearing's centre." }).optional(),
        growth: pairAnswer,
        closing: pairAnswer,
      })
      .meta({ id: "TargetParts", description: "What the target was made of, each as it is." }),
    growths: z
      .array(
        z.object({
          direction: z.enum(["h", "v"]),
          growth: z.number().meta({ description: "In the offset unit." }),
          coefficient: z.number().meta({ description: "As used, per degree of units.temperature." }),
        }),
      )
      .meta({ description: "In the order sent." }),
    wireSag: z
      .number()
      .meta({ description: "Of the wire below its level chord, positive down: catenary." })
      .optional(),
    warnings: z.array(warningSchema),
  })
  .meta({ id: "StationTarget" });

const rotorAnswer = z
  .object({
    supports: z.array(
      z.object({
        z: z.number(),
        journal: pairAnswer.meta({ description: "Running place of the journal: line + running." }),
        slope: pairAnswer.meta({ description: "Of the shaft, offset units per axial unit." }),
        reaction: pairAnswer
          .meta({
            description: "What the bearing presses with, up and right positive; where units.force is stated.",
          })
          .optional(),
      }),
    ),
    closure: z.number().meta({
      description: "How far the bent line misses its own supports, relative: the check of the solution.",
    }),
    warnings: z.array(warningSchema),
  })
  .meta({ id: "BentRotor" });

const wireAnswer = z
  .object({
    greatestSag: z.number().meta({ description: "At the middle: catenary." }),
    greatestSagByParabola: z.number().meta({ description: "The same in the limit of a taut wire." }),
  })
  .meta({ id: "WireSag", description: "In the offset unit." });

export const coldTargetResult = z
  .object({ stations: z.array(stationAnswer), rotor: rotorAnswer.optional(), wire: wireAnswer.optional() })
  .meta({ id: "ColdTargetResult" });

export const coldTargetResponse = z
  .object({ ...calculationEnvelope("cold-target", coldTargetResult), units: coldTargetUnits })
  .meta({ id: "ColdTargetResponse" });

export type ColdTargetRequest = z.infer<typeof coldTargetRequest>;
export type ColdTargetResult = z.infer<typeof coldTargetResult>;
export type TargetStationRequest = z.infer<typeof targetStationSchema>;
export type GrowthRequest = z.infer<typeof growthSchema>;
export type RotorRequest = z.infer<typeof rotorSchema>;
export type WireRequest = z.infer<typeof wireSchema>;
export type JournalRequest = z.infer<typeof journalSchema>;
