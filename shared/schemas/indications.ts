import { z } from "zod";
import { limits } from "../limits.ts";
import { offsetPair } from "./common.ts";
import { callerId, quantity } from "./quantity.ts";

const indicatorReadings = z
  .array(
    z.strictObject({
      id: callerId.meta({ description: "Of the machine's indicators, on this component." }),
      reading: quantity("offset", "offset", "Since the component began to move."),
    }),
  )
  .max(limits.indicatorsPerCall);
const sightReadings = z
  .array(
    z.strictObject({
      station: callerId.meta({ description: "Of this component, or a neighbour." }),
      centre: offsetPair.meta({
        description: "Off the line of sight as it stood in the plan's survey, downstream view.",
      }),
    }),
  )
  .max(limits.stationsPerMachine);

export const indicationRequest = z
  .strictObject({
    plan: z.uuid().meta({ description: "Id of the plan that is being carried out." }),
    component: callerId.meta({ description: "The one that moves." }),
    at: z.iso.datetime({ offset: true }),
    person: z.string().trim().min(1).max(limits.nameLength).nullish(),
    indicators: indicatorReadings.optional(),
    sights: sightReadings.optional(),
  })
  .meta({
    id: "IndicationRequest",
    description: "What was read at one moment of a move. At least one indicator or one sight.",
  });

const partlyKnown = z
  .object({ h: z.number().nullable(), v: z.number().nullable() })
  .meta({ id: "PartlyKnown", description: "Null where the readings do not tell it." });

const stopSchema = z
  .object({
    code: z.enum(["neighbour_passed", "gone_past", "readings_disagree", "move_complete"]),
    detail: z.string(),
    station: z.string().nullable(),
    support: z.string().nullable(),
  })
  .meta({ id: "StopReason" });

export const indicationAnswer = z
  .object({
    id: z.uuid(),
    plan: z.uuid(),
    component: z.string(),
    at: z.iso.datetime({ offset: true }),
    createdAt: z.iso.datetime(),
    person: z.string().nullable(),
    indicators: indicatorReadings.meta({ description: "As sent." }),
    sights: sightReadings.meta({ description: "As sent." }),
    units: z.object({ offset: z.string() }),
    supports: z.array(z.object({ support: z.string(), moved: partlyKnown, left: partlyKnown })),
    done: z.boolean().nullable().meta({ description: "Null while the readings do not tell." }),
    neighbours: z.array(
      z.object({
        station: z.string(),
        change: z.object({ h: z.number(), v: z.number() }),
        stopAt: z.object({ h: z.array(z.number()), v: z.array(z.number()) }),
        passed: z.boolean(),
      }),
    ),
    stop: z.array(stopSchema).meta({ description: "Why to stop now; empty: go on." }),
  })
  .meta({ id: "Indication", description: "What is left to move, and whether to stop." });

export type IndicationRequest = z.infer<typeof indicationRequest>;
export type IndicationAnswer = z.infer<typeof indicationAnswer>;
