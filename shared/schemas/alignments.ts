import { z } from "zod";
import { limits } from "../limits.ts";
import {
  axisDeviationRequest,
  axisDeviationResult,
  axisSchema,
  axisStationSchema,
} from "./axis-deviations.ts";
import { boreFitUnits } from "./bore-temperatures.ts";
import { boreFitResult, pointsBore, rotatingTargetBore, turnedGaugeBore, wireBore } from "./bore-fits.ts";
import {
  calculationEnvelope,
  cautionSchema,
  jobIdSchema,
  levelSchema,
  noteSchema,
  seenSchema,
} from "./common.ts";
import { callerId } from "./quantity.ts";
import { shimMoveRequest, shimMoveResult } from "./shim-moves.ts";

const station = callerId.meta({ description: "Id of the station where the bore was read." });

const alignmentBore = z
  .discriminatedUnion("form", [
    pointsBore.extend({ station }).meta({ id: "PointsBoreAtStation" }),
    turnedGaugeBore.extend({ station }).meta({ id: "TurnedGaugeBoreAtStation" }),
    rotatingTargetBore.extend({ station }).meta({ id: "RotatingTargetBoreAtStation" }),
    wireBore.extend({ station }).meta({ id: "WireBoreAtStation" }),
  ])
  .meta({ id: "BoreAtStation" });

const alignmentStation = axisStationSchema
  .omit({ centre: true, covariance: true, dof: true })
  .meta({ id: "AlignmentStation", description: "Its centre is that of the one bore that names it." });

const moves = shimMoveRequest.shape;

export const alignmentRequest = z
  .strictObject({
    units: boreFitUnits,
    seen: seenSchema,
    level: levelSchema.optional(),
    bores: z.array(alignmentBore).min(1).max(limits.boresPerCall),
    stations: z.array(alignmentStation).min(1).max(limits.stationsPerCall),
    axis: axisSchema,
    verdict: axisDeviationRequest.shape.verdict,
    monteCarlo: axisDeviationRequest.shape.monteCarlo,
    components: moves.components.optional().meta({ description: "Absent: no moves are solved." }),
    shims: moves.shims,
    objective: moves.objective,
    maximumIncrement: moves.maximumIncrement,
    maximumMisfit: moves.maximumMisfit,
    indicators: moves.indicators,
    couplings: moves.couplings,
    note: noteSchema.optional(),
    jobId: jobIdSchema.optional(),
  })
  .meta({
    id: "AlignmentRequest",
    description: `The members of the three single calls. At most ${limits.readingsPerCall} readings in all bores together.`,
  });

export const alignmentResult = z
  .object({
    fits: z.array(boreFitResult),
    axis: axisDeviationResult.shape.axis,
    stations: axisDeviationResult.shape.stations,
    summary: axisDeviationResult.shape.summary,
    moves: shimMoveResult.nullable().meta({ description: "Null where no components were sent." }),
  })
  .meta({ id: "AlignmentResult", description: "What the single endpoints answer in turn, to the last bit." });

export const alignmentResponse = z
  .object({
    ...calculationEnvelope("alignment", alignmentResult),
    units: boreFitUnits,
    seen: z.literal("downstream"),
    cautions: z.array(cautionSchema),
  })
  .meta({ id: "AlignmentResponse" });

export type AlignmentRequest = z.infer<typeof alignmentRequest>;
export type AlignmentResult = z.infer<typeof alignmentResult>;
