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
  shimMoveRequest,
  shimMoveResponse,
  type ShimMoveRequest,
  type ShimMoveResult,
} from "../../../../../shared/schemas/shim-moves.ts";
import type { CalculationKind } from "../../../config/paths.ts";

export type ReadCalculation =
  | { readonly kind: "bore-fit"; readonly request: BoreFitRequest; readonly fits: readonly BoreFitResult[] }
  | {
      readonly kind: "axis-deviation";
      readonly request: AxisDeviationRequest;
      readonly result: AxisDeviationResult;
    }
  | {
      readonly kind: "shim-move";
      readonly request: ShimMoveRequest;
      readonly result: ShimMoveResult;
    }
  | {
      readonly kind: "alignment";
      readonly request: AlignmentRequest;
      readonly result: AlignmentResult;
    };

/** A call and its answer in the forms of this version; null where the forms are of another version, or are not drawn. */
export function readCalculation(
  kind: CalculationKind,
  request: unknown,
  response: unknown,
): ReadCalculation | null {
  switch (kind) {
    case "bore-fit": {
      const [sent, answered] = [boreFitRequest.safeParse(request), boreFitResponse.safeParse(response)];
      return sent.success && answered.success
        ? { kind, request: sent.data, fits: answered.data.result.bores }
        : null;
    }
    case "axis-deviation": {
      const [sent, answered] = [
        axisDeviationRequest.safeParse(request),
        axisDeviationResponse.safeParse(response),
      ];
      return sent.success && answered.success
        ? { kind, request: sent.data, result: answered.data.result }
        : null;
    }
    case "alignment": {
      const [sent, answered] = [alignmentRequest.safeParse(request), alignmentResponse.safeParse(response)];
      return sent.success && answered.success
        ? { kind, request: sent.data, result: answered.data.result }
        : null;
    }
    case "shim-move": {
      const [sent, answered] = [shimMoveRequest.safeParse(request), shimMoveResponse.safeParse(response)];
      return sent.success && answered.success
        ? { kind, request: sent.data, result: answered.data.result }
        : null;
    }
    default:
      return null;
  }
}
