import { z } from "zod";
import { limits } from "../limits.ts";
import {
  calculationEnvelope,
  cautionSchema,
  deviationAnswer,
  jobIdSchema,
  levelSchema,
  noteSchema,
  unitsSchema,
  verdictSchema,
  warningSchema,
} from "./common.ts";
import { componentSchema } from "./move-components.ts";
import { callerId, fixedQuantity, quantity } from "./quantity.ts";
import { moveStationSchema, shimMoveRequest, supportMove } from "./shim-moves.ts";

const floatRange = z
  .array(quantity("offset", "offset", "Least and most."))
  .min(2)
  .max(2);

export const floatingReferenceSchema = z
  .strictObject({
    id: callerId,
    float: z
      .strictObject({ h: floatRange.optional(), v: floatRange.optional() })
      .meta({
        id: "AxisFloatRange",
        description:
          "Where the new axis may run at this station, from the axis as surveyed. A plane that is absent, or float itself: there it stays as surveyed.",
      })
      .optional(),
  })
  .meta({ id: "FloatingReference" });

export const costedComponentSchema = componentSchema
  .extend({
    cost: fixedQuantity(
      "1",
      "cost",
      "Of moving it, in any measure that all share; 1 when absent.",
    ).optional(),
  })
  .meta({
    id: "CostedComponent",
    description:
      "As in shim-moves, with a cost. Of stacks the least and most thickness are kept; pieces and their number are not looked at. A part that carries another, or rests in one, states the travel of its supports. roll and tilt are refused.",
  });

export const fewestMovesRequest = z
  .strictObject({
    units: unitsSchema,
    level: levelSchema.optional(),
    stations: z
      .array(moveStationSchema)
      .min(1)
      .max(limits.stationsPerChoice)
      .meta({ description: "Deviations are from the axis as surveyed, as axis-deviations serves them." }),
    reference: z
      .array(floatingReferenceSchema)
      .max(limits.stationsPerChoice)
      .meta({
        description:
          "The stations that set the axis, two or more apart along z, and how far it may float there. Absent or empty: it stays as surveyed.",
      })
      .optional(),
    components: z.array(costedComponentSchema).min(1).max(limits.componentsPerChoice),
    verdict: z
      .strictObject({ rule: z.enum(["guarded", "simple"]) })
      .meta({
        description:
          "guarded (default): a station conforms when |d| + U ≤ T; without a covariance, and by the simple rule, when |d| ≤ T.",
      })
      .optional(),
    margin: quantity(
      "offset",
      "thickness",
      "Kept free of every tolerance beside the uncertainty, for what real shims leave; 0 when absent.",
    ).optional(),
    note: noteSchema.optional(),
    jobId: jobIdSchema.optional(),
  })
  .meta({ id: "FewestMovesRequest" });

const infeasible = z
  .object({
    cause: z.enum(["uncertainty", "contradiction"]).meta({
      description:
        "uncertainty: it is as large as the tolerance. contradiction: these demands and limits cannot all be met, though every part that may move does; without any one of them the others can.",
    }),
    reason: z.string(),
    stations: z.array(z.string()).meta({ description: "Ids of the stations that take part." }),
    limits: z.array(z.string()).meta({ description: "Pointers into the request, of all that takes part." }),
  })
  .meta({ id: "FewestMovesInfeasible" });

export const fewestMovesResult = z
  .object({
    cost: z
      .number()
      .nullable()
      .meta({ description: "Sum over the components moved; null where no choice does." }),
    axis: z
      .object({
        float: z.array(z.object({ id: z.string(), h: z.number(), v: z.number() })),
        h: axisLine(),
        v: axisLine(),
      })
      .meta({
        id: "AxisFloat",
        description:
          "The new axis from the one surveyed: at each reference station, at z = 0, and its slope in offset units per axial unit.",
      }),
    components: z.array(
      z
        .object({
          id: z.string(),
          moved: z.boolean(),
          fixed: z
            .boolean()
            .meta({ description: "May not move: by itself, or because it holds a reference station." }),
          moves: z.array(supportMove),
        })
        .meta({ id: "FewestMovesComponent" }),
    ),
    predicted: z
      .array(
        z.object({
          id: z.string(),
          deviation: deviationAnswer,
          verdict: verdictSchema.nullable().meta({ description: "Null without a tolerance." }),
        }),
      )
      .meta({
        description:
          "Every station after the moves, from the new axis; where no choice does, as found from the axis as surveyed.",
      }),
    remeasure: z.array(z.string()).meta({ description: "Ids of stations, in order, after the last move." }),
    search: z
      .object({
        method: z.enum(["none_needed", "mixed_integer_program"]).meta({
          description: "none_needed: no part has to move, or those alone whose own limits leave out staying.",
        }),
        proved: z.boolean().meta({ description: "Whether no cheaper choice exists." }),
        gap: z
          .number()
          .meta({ description: "Cost that a better choice could save at most; 0 where proved." }),
        cuts: z.number().int().meta({ description: "Tangents that stood for round tolerances." }),
        tied: z.number().int().meta({ description: "Other choices at the same cost that were compared." }),
      })
      .nullable()
      .meta({ id: "FewestMovesSearch", description: "Null where no choice does." }),
    infeasible: infeasible.nullable().meta({ description: "Why no choice does; null where one does." }),
    shimMoves: shimMoveRequest.nullable().meta({
      description:
        "A body for POST /v1/shim-moves, but for shims: deviations from the new axis, parts that stay fixed. Null where nothing moves. objective is the one with which that call brings every station inside; absent where neither does.",
    }),
    advice: z.array(warningSchema),
  })
  .meta({ id: "FewestMovesResult" });

function axisLine() {
  return z.object({ at0: z.number(), slope: z.number() });
}

export const fewestMovesResponse = z
  .object({ ...calculationEnvelope("fewest-moves", fewestMovesResult), cautions: z.array(cautionSchema) })
  .meta({ id: "FewestMovesResponse" });

export type FewestMovesRequest = z.infer<typeof fewestMovesRequest>;
export type CostedComponentRequest = z.infer<typeof costedComponentSchema>;
export type FloatingReferenceRequest = z.infer<typeof floatingReferenceSchema>;
export type FewestMovesResult = z.infer<typeof fewestMovesResult>;
