import canonicalize from "canonicalize";
import type { CalculationKind } from "../calculations/calculation-kind.ts";
import type { Deps } from "../deps.ts";
import { HttpProblem } from "../http/http-problem.ts";
import type { Caller } from "./caller.ts";
import { inTransaction } from "./in-transaction.ts";
import { computeRecord, type ComputedRecord } from "./run-calculation.ts";
import { writeRecords } from "./write-records.ts";

/** A computing operation, called from inside the service: by a job, or by the demo. */
export interface InnerCall {
  readonly deps: Deps;
  readonly caller: Caller;
  readonly requestId: string;
}

/** What was computed, and its record, which is for the caller to store. */
export interface InnerAnswer<Result> {
  readonly id: string;
  readonly engineVersion: string;
  readonly result: Result;
  readonly record: ComputedRecord;
}

type Noted = { readonly note?: string | null | undefined };

/** Computes as the operation at `path` would for the same body, and stores nothing: neither an answer nor a refusal. */
export function computeAs<Request extends Noted>(
  { deps, caller, requestId }: InnerCall,
  { kind, path }: { readonly kind: CalculationKind<Request, object>; readonly path: string },
  body: Request & { readonly jobId?: string | null },
): Promise<ComputedRecord> {
  const text = JSON.stringify(body);
  const canonicalText = canonicalize(JSON.parse(text)) ?? "";
  return computeRecord(kind, { deps, caller, body, text, canonicalText, claim: null, requestId, path });
}

/**
 * Computes a part of a job's work as the operation at `path` would. The record of an answer is stored by the caller,
 * with the entry that names it; that of a refusal at once, since no entry will.
 * @throws HttpProblem as that operation would, with the id of the stored refusal, saying which `part` was refused: the
 * refusal itself names places in a call that nobody sent
 */
export async function computePart<Request extends Noted, Result>(
  call: InnerCall,
  operation: {
    readonly part: string;
    readonly kind: CalculationKind<Request, { result: Result }>;
    readonly path: string;
  },
  body: Request & { readonly jobId: string },
): Promise<InnerAnswer<Result>> {
  const record = await computeAs(call, operation, body);
  const { told } = record;
  if ("answer" in told) return { ...(told.answer as unknown as Omit<InnerAnswer<Result>, "record">), record };
  const { database } = call.deps;
  await inTransaction(database.sequelize, (transaction) => writeRecords(database, [record], transaction));
  const { code, detail, members } = told.refusal;
  throw new HttpProblem(code, `${operation.part}: ${detail}`, members);
}
