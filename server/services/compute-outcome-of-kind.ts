import type { CalculationKindName } from "../calculations/calculation-kind.ts";
import { calculationKinds } from "../calculations/index.ts";
import { outcomeOf, type ComputeOutcome } from "./compute-outcome.ts";

/** The outcome of a request that its kind's schema let through, by the name of the kind: what a thread can be sent. */
export function outcomeOfKind(name: CalculationKindName, request: unknown): ComputeOutcome {
  return outcomeOf(calculationKinds[name], request as never);
}
