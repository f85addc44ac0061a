import { z } from "zod";
import { limits } from "../limits.ts";
import {
  calculationEnvelope,
  cautionSchema,
  covarianceSchema,
  deviationAnswer,
  dofSchema,
  jobIdSchema,
  levelSchema,
  noteSchema,
  offsetPair,
  toleranceSchema,
  unitsSchema,
  verdictSchema,
  warningSchema,
} from "./common.ts";
import { componentSchema } from "./move-components.ts";
import { callerId, clockDeg, quantity } from "./quantity.ts";

export const moveStationSchema = z
  .strictObject({
    id: callerId,
    z: quantity("axial", "coordinate", "Along the bore line from one common face, increasing downstream."),
    deviation: offsetPair.meta({
      description: "Where the centre lies off its target, from the axis as surveyed.",
    }),
    covariance: covarianceSchema
      .nullable()
      .meta({
        description: "Standard covariance of the deviation. Absent: the predicted verdict is the simple one.",
      })
      .optional(),
    dof: dofSchema.optional(),
    tolerance: toleranceSchema
      .nullable()
      .meta({
        description:
          "Weights the station by 1/T². Absent: it asks for nothing and is carried along; where no station of a component has one, all ask alike.",
      })
      .optional(),
  })
  .meta({ id: "MoveStation" });

const couplingSchema = z
  .strictObject({
    component: callerId,
    support: callerId,
    station: callerId,
    h: z.number().min(-1_000).max(1_000),
    v: z.number().min(-1_000).max(1_000),
  })
  .meta({
    id: "Coupling",
    description:
      "Shift of a station of another component: h times the support's move in h, v times its move in v.",
  });

const shimSupplySchema = z
  .strictObject({
    stock: z
      .array(
        z.strictObject({
          thickness: quantity("offset", "shim", "Of one piece."),
          quantity: z.number().int().min(0).max(1_000_000).nullish(),
        }),
      )
      .max(limits.stockPerCall)
      .meta({
        description:
          "Thicknesses at hand, shared by all stacks of all components of the call and never overdrawn, in the order in which they are moved. quantity absent: unlimited. With cutToSize as well a piece may come from either.",
      })
      .optional(),
    cutToSize: z
      .strictObject({ increment: quantity("offset", "shim", "Shims are cut to whole multiples of it.") })
      .nullable()
      .meta({ description: "Absent, and no stock: every change is the ideal one." })
      .optional(),
    reuse: z
      .boolean()
      .meta({
        description:
          "Whether pieces taken out go back to stock, for the same component and those moved after it. false when absent.",
      })
      .optional(),
  })
  .meta({ id: "ShimSupply" });

export const indicatorSchema = z
  .strictObject({
    id: callerId,
    component: callerId,
    z: quantity("axial", "coordinate", "Of the indicator."),
    clockDeg,
    contact: z
      .enum(["outside", "inside"])
      .meta({ description: "outside (default): positive when the part moves toward it. inside: reversed." })
      .optional(),
  })
  .meta({ id: "MoveIndicator" });

export const shimMoveRequest = z
  .strictObject({
    units: unitsSchema,
    level: levelSchema.optional(),
    stations: z.array(moveStationSchema).min(1).max(limits.stationsPerCall),
    reference: z
      .array(callerId)
      .max(limits.stationsPerCall)
      .meta({ description: "Ids of the stations that set the axis; none when absent." })
      .optional(),
    components: z.array(componentSchema).min(1).max(limits.componentsPerCall),
    shims: shimSupplySchema.nullable().optional(),
    objective: z
      .enum(["least_squares", "minimax"])
      .meta({
        description:
          "least_squares (default): least Σ(|d|/T)². minimax: of each component the largest |d|/T least, |d| radial where the tolerance is round, of h and v apart where each has its own.",
      })
      .optional(),
    maximumIncrement: quantity(
      "offset",
      "shim",
      `Largest part of a move made at once; absent: all at once. The moves of a call split into ${limits.incrementsPerCall} parts at most.`,
    ).nullish(),
    maximumMisfit: quantity(
      "offset",
      "thickness",
      "Most that may be left at a place between the chosen change and the rigid move; 0.02 mm when absent.",
    ).optional(),
    indicators: z.array(indicatorSchema).max(limits.indicatorsPerCall).optional(),
    couplings: z
      .array(couplingSchema)
      .max(limits.couplingsPerCall)
      .meta({ description: "How moving one component shifts another's station." })
      .optional(),
    note: noteSchema.optional(),
    jobId: jobIdSchema.optional(),
  })
  .meta({ id: "ShimMoveRequest" });

export const supportMove = z
  .object({ support: z.string(), h: z.number(), v: z.number() })
  .meta({ id: "SupportMove", description: "How far the bore moves at a support, in offset units." });

const stackChange = z
  .object({
    support: z.string(),
    place: z
      .string()
      .meta({ description: "left, right, key-left, key-right, key-bottom, or the id of a pad." }),
    ideal: z.number().meta({ description: "Change that the ideal move asks." }),
    change: z.number().meta({ description: "Positive is thicker." }),
    from: z.number(),
    to: z.number(),
    add: z
      .array(z.number())
      .meta({ description: "One thickness per piece. Empty where no shims were chosen." }),
    remove: z.array(z.number()).meta({ description: "One thickness per piece." }),
    misfit: z.number().meta({
      description:
        "Change chosen less the one that the realised move needs: what a rigid part cannot follow.",
    }),
  })
  .meta({ id: "StackChange" });

const unreachable = z
  .object({
    cause: z
      .enum(["fixed", "reference", "contradiction", "limit", "blocked", "rigid", "shims", "stock", "tilt"])
      .meta({ description: "The kind of reason, for a program." }),
    reason: z.string().meta({ description: "In words, with the station that is left worst." }),
    limit: z
      .string()
      .nullable()
      .meta({ description: "Pointer into the request, of the limit that binds; null when none does." }),
  })
  .meta({ id: "Unreachable", description: "Why not every station of the part comes inside its tolerance." });

const slopes = z
  .object({ h: z.number(), v: z.number() })
  .meta({ id: "Slopes", description: "Offset units per axial unit." });

const componentAnswer = z
  .object({
    id: z.string(),
    fixed: z.boolean().meta({ description: "Stays: by itself, or because it holds a reference station." }),
    moves: z.array(supportMove).meta({ description: "The ideal move." }),
    realised: z.array(supportMove).meta({ description: "The move that the shims chosen make." }),
    stacks: z.array(stackChange),
    tilt: z
      .object({ found: slopes, predicted: slopes })
      .meta({
        id: "TiltAnswer",
        description:
          "Slope of the line through the part's end stations, before its own move and after; where a tolerance of it was sent.",
      })
      .optional(),
    roll: z
      .object({
        found: z.number().meta({ description: "Radians, clockwise positive." }),
        predicted: z.number().meta({ description: "What the shims chosen leave of it." }),
        boreShift: z.object({ h: z.number(), v: z.number() }).meta({
          description:
            "How far the bores move while the roll is taken out: part of predicted and of what indicators read, not of moves.",
        }),
      })
      .meta({ id: "RollAnswer" })
      .optional(),
    unreachable: unreachable.optional(),
  })
  .meta({ id: "ComponentMove" });

const changeBounds = z.array(z.number()).min(2).max(2);

const stepAnswer = z
  .object({
    order: z.number().int(),
    component: z.string(),
    increments: z
      .array(
        z.object({
          moves: z
            .array(supportMove)
            .meta({ description: "From the component's start; h is done before v." }),
          indicators: z.array(z.object({ id: z.string(), reading: z.number() })),
        }),
      )
      .meta({
        description:
          "Equal parts, cumulative from the component's start. Indicators read the move of the bore: with a roll, that of the supports and boreShift.",
      }),
    watch: z.array(
      z.object({
        station: z.string(),
        change: z.object({ h: z.number(), v: z.number() }).meta({ description: "When the step is done." }),
        stopAt: z
          .object({ h: changeBounds, v: changeBounds })
          .meta({ description: "Stop when the station's change leaves this range." }),
      }),
    ),
  })
  .meta({ id: "MoveStep" });

export const shimMoveResult = z
  .object({
    components: z.array(componentAnswer),
    predicted: z
      .array(
        z.object({
          id: z.string(),
          deviation: deviationAnswer,
          verdict: verdictSchema.nullable().meta({ description: "Null without a tolerance." }),
        }),
      )
      .meta({ description: "Every station as the realised moves leave it." }),
    steps: z.array(stepAnswer),
    remeasure: z.array(z.string()).meta({ description: "Ids of stations, in order, after the last move." }),
    search: z
      .object({
        method: z.enum(["alone", "enumeration", "mixed_integer_program", "in_turn"]).meta({
          description:
            "alone: each component by itself, the stock is enough for all. enumeration, mixed_integer_program: all components together, for the stock they share. in_turn: each with what those before it leave.",
        }),
        proved: z.boolean().meta({
          description:
            "Whether no better choice exists, in cost, pieces handled, total change and stock order.",
        }),
        gap: z.number().nullable().meta({
          description:
            "How much better a choice could be at most, in what is made least; 0 where proved, null where not known.",
        }),
      })
      .meta({ id: "ShimSearch", description: "How the shims were chosen; absent where none were." })
      .optional(),
    advice: z.array(warningSchema),
  })
  .meta({ id: "ShimMoveResult" });

export const shimMoveResponse = z
  .object({ ...calculationEnvelope("shim-move", shimMoveResult), cautions: z.array(cautionSchema) })
  .meta({ id: "ShimMoveResponse" });

export type ShimMoveRequest = z.infer<typeof shimMoveRequest>;
export type MoveStationRequest = z.infer<typeof moveStationSchema>;
export type IndicatorRequest = z.infer<typeof indicatorSchema>;
export type ShimMoveResult = z.infer<typeof shimMoveResult>;
