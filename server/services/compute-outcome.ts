import type { Fault } from "../../shared/error-codes.ts";
import { pointerOf } from "../../shared/pointer.ts";
import { CalculationRefusal, type CalculationKind } from "../calculations/calculation-kind.ts";
import { faultOf } from "../calculations/collect-faults.ts";
import { ComputeError } from "../compute/compute-error.ts";

type Engine<Request> = Pick<CalculationKind<Request, object>, "answer">;

export type ComputeOutcome =
  | { readonly status: "succeeded"; readonly answer: Readonly<Record<string, unknown>> }
  | { readonly status: "failed"; readonly faults: readonly Fault[] };

/**
 * Runs the engine on a valid request in this thread. The answer is what the wire will carry: a number that JSON cannot
 * hold is a refusal, never a silent null.
 */
export function computeOutcome<Request>(kind: Engine<Request>, request: Request): Promise<ComputeOutcome> {
  return Promise.resolve().then(() => outcomeOf(kind, request));
}

/** The outcome of a request, here and now. */
export function outcomeOf<Request>(kind: Engine<Request>, request: Request): ComputeOutcome {
  try {
    const answer = kind.answer(request);
    const overflow = pathOfNonFinite(answer);
    if (overflow) {
      const detail = `The result at ${pointerOf(overflow)} is not a finite number.`;
      return { status: "failed", faults: [{ pointer: "", code: "result_overflow", detail }] };
    }
    return { status: "succeeded", answer: JSON.parse(JSON.stringify(answer)) as Record<string, unknown> };
  } catch (error) {
    if (error instanceof CalculationRefusal) return { status: "failed", faults: error.faults };
    if (error instanceof ComputeError) return { status: "failed", faults: [faultOf(error, [])] };
    throw error;
  }
}

function pathOfNonFinite(value: unknown): PropertyKey[] | null {
  if (typeof value === "number") return Number.isFinite(value) ? null : [];
  if (typeof value !== "object" || value === null) return null;
  for (const [name, member] of Object.entries(value)) {
    const path = pathOfNonFinite(member);
    if (path) return [name, ...path];
  }
  return null;
}
