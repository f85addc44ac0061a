import canonicalize from "canonicalize";
import type { CalculationKind } from "../calculations/calculation-kind.ts";
import type { Deps } from "../deps.ts";
import { HttpProblem } from "../http/http-problem.ts";
import type { Caller } from "./caller.ts";
import { runCalculation } from "./run-calculation.ts";

/** A computing operation, called from inside the service: by a job, or by the demo. */
export interface StoredCall {
  readonly deps: Deps;
  readonly caller: Caller;
  readonly requestId: string;
}

export interface StoredAnswer<Result> {
  readonly id: string;
  readonly engineVersion: string;
  readonly result: Result;
}

/**
 * Computes and keeps a record as the operation at `path` would for the same body.
 * @throws HttpProblem as that operation would, with the id of the stored refusal
 */
export async function storeCalculation<Request extends { readonly note?: string | null | undefined }, Result>(
  { deps, caller, requestId }: StoredCall,
  { kind, path }: { readonly kind: CalculationKind<Request, { result: Result }>; readonly path: string },
  body: Request & { readonly jobId?: string | null },
): Promise<StoredAnswer<Result>> {
  const text = JSON.stringify(body);
  const canonicalText = canonicalize(JSON.parse(text)) ?? "";
  const call = { deps, caller, body, text, canonicalText, claim: null, requestId, path };
  return (await runCalculation(kind, call)).body as StoredAnswer<Result>;
}

/** Says which part of a job's work was refused: the refusal itself names places in a call that nobody sent. */
export async function explaining<T>(part: string, work: Promise<T>): Promise<T> {
  try {
    return await work;
  } catch (error) {
    if (!(error instanceof HttpProblem) || error.status !== 422) throw error;
    throw new HttpProblem(error.code, `${part}: ${error.detail}`, error.members);
  }
}
