import type { z } from "zod";
import type { Fault } from "../../shared/error-codes.ts";
import type { calculationKinds } from "../../shared/schemas/calculations.ts";

export type CalculationKindName = (typeof calculationKinds)[number];

/**
 * One kind of stored calculation: what it takes, and how it answers. Pure: the same request gives the same answer,
 * which is what makes a record replayable. Storing, metering and identifying are `runCalculation`'s.
 */
export interface CalculationKind<Request, Answer extends object> {
  readonly kind: CalculationKindName;
  readonly request: z.ZodType<Request>;
  /**
   * The members of the answer beyond the envelope: units, result, …
   * @throws CalculationRefusal naming every fault of the domain, or a ComputeError
   */
  readonly answer: (request: Request) => Answer;
  /** Whether computing takes long enough to be done in a thread of its own; never when absent. */
  readonly isLong?: (request: Request) => boolean;
  /**
   * Domain faults of the parts of a body that failed the schema elsewhere, so that a misspelt member of one bore
   * does not hide that another cannot be fitted. `schemaFaults` are the pointers already known to be wrong.
   */
  readonly faultsBesideSchema?: (body: unknown, schemaFaults: readonly Fault[]) => readonly Fault[];
}

/** A request that is well formed but cannot be computed; it names every place at fault. Stored as a failed record. */
export class CalculationRefusal extends Error {
  constructor(readonly faults: readonly Fault[]) {
    super(faults.map((fault) => `${fault.pointer}: ${fault.code}`).join("; "));
    this.name = "CalculationRefusal";
  }
}
