import type { z } from "zod";
import {
  alignmentRequest,
  alignmentResponse,
  type AlignmentRequest,
  type AlignmentResult,
} from "../../../../../shared/schemas/alignments.ts";
import {
  axisDeviationRequest,
  axisDeviationResponse,
  type AxisDeviationRequest,
  type AxisDeviationResult,
} from "../../../../../shared/schemas/axis-deviations.ts";
import {
  boreFitRequest,
  boreFitResponse,
  type BoreFitRequest,
  type BoreFitResult,
} from "../../../../../shared/schemas/bore-fits.ts";
import {
  coldTargetRequest,
  coldTargetResponse,
  type ColdTargetRequest,
  type ColdTargetResult,
} from "../../../../../shared/schemas/cold-targets.ts";
import type { ConfirmationResult } from "../../../../../shared/schemas/confirmation-answers.ts";
import {
  confirmationRequest,
  confirmationResponse,
  type ConfirmationRequest,
} from "../../../../../shared/schemas/confirmations.ts";
import {
  fewestMovesRequest,
  fewestMovesResponse,
  type FewestMovesRequest,
  type FewestMovesResult,
} from "../../../../../shared/schemas/fewest-moves.ts";
import {
  measurementPlanRequest,
  measurementPlanResponse,
  type BoreMeasurementPlan,
  type MeasurementPlanRequest,
} from "../../../../../shared/schemas/measurement-plans.ts";
import {
  repeatabilityStudyRequest,
  repeatabilityStudyResponse,
  type RepeatabilityStudyRequest,
  type RepeatabilityStudyResult,
} from "../../../../../shared/schemas/repeatability-studies.ts";
import {
  shimMoveRequest,
  shimMoveResponse,
  type ShimMoveRequest,
  type ShimMoveResult,
} from "../../../../../shared/schemas/shim-moves.ts";
import type { SightLineResult } from "../../../../../shared/schemas/sight-line-answers.ts";
import {
  sightLineSetupRequest,
  sightLineSetupResponse,
  type SightLineSetupRequest,
} from "../../../../../shared/schemas/sight-line-setups.ts";
import type { CalculationKind } from "../../../config/paths.ts";

/** A call of a kind and what of its answer is drawn. */
interface Read<Kind extends CalculationKind, Request, Result> {
  readonly kind: Kind;
  readonly request: Request;
  readonly result: Result;
}

export type ReadCalculation =
  | Read<"bore-fit", BoreFitRequest, { readonly bores: readonly BoreFitResult[] }>
  | Read<"axis-deviation", AxisDeviationRequest, AxisDeviationResult>
  | Read<"shim-move", ShimMoveRequest, ShimMoveResult>
  | Read<"fewest-moves", FewestMovesRequest, FewestMovesResult>
  | Read<"alignment", AlignmentRequest, AlignmentResult>
  | Read<"cold-target", ColdTargetRequest, ColdTargetResult>
  | Read<"confirmation", ConfirmationRequest, ConfirmationResult>
  | Read<"repeatability-study", RepeatabilityStudyRequest, RepeatabilityStudyResult>
  | Read<"measurement-plan", MeasurementPlanRequest, { readonly bores: readonly BoreMeasurementPlan[] }>
  | Read<"sight-line-setup", SightLineSetupRequest, SightLineResult>;

/** A call and its answer in the forms of this version; null where the forms are of another version. */
export function readCalculation(
  kind: CalculationKind,
  request: unknown,
  response: unknown,
): ReadCalculation | null {
  const read = <Sent extends z.ZodType, Answered extends z.ZodType<{ result: unknown }>>(
    sent: Sent,
    answered: Answered,
  ) => {
    const [call, answer] = [sent.safeParse(request), answered.safeParse(response)];
    if (!call.success || !answer.success) return null;
    return { request: call.data, result: answer.data.result as z.infer<Answered>["result"] };
  };
  switch (kind) {
    case "bore-fit":
      return of(kind, read(boreFitRequest, boreFitResponse));
    case "axis-deviation":
      return of(kind, read(axisDeviationRequest, axisDeviationResponse));
    case "alignment":
      return of(kind, read(alignmentRequest, alignmentResponse));
    case "shim-move":
      return of(kind, read(shimMoveRequest, shimMoveResponse));
    case "fewest-moves":
      return of(kind, read(fewestMovesRequest, fewestMovesResponse));
    case "cold-target":
      return of(kind, read(coldTargetRequest, coldTargetResponse));
    case "confirmation":
      return of(kind, read(confirmationRequest, confirmationResponse));
    case "repeatability-study":
      return of(kind, read(repeatabilityStudyRequest, repeatabilityStudyResponse));
    case "measurement-plan":
      return of(kind, read(measurementPlanRequest, measurementPlanResponse));
    case "sight-line-setup":
      return of(kind, read(sightLineSetupRequest, sightLineSetupResponse));
  }
}

function of<Kind extends CalculationKind, Both extends object>(kind: Kind, both: Both | null) {
  return both === null ? null : { kind, ...both };
}
