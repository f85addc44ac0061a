import { createHash } from "node:crypto";
import canonicalize from "canonicalize";
import type { CalculationKind } from "../calculations/calculation-kind.ts";
import { engineVersion } from "../compute/version.ts";
import { problemBody, problemOfFaults, type HttpProblem } from "../http/http-problem.ts";
import { callerOf, reply, type Call, type Reply } from "../http/operation.ts";
import type { ComputeOutcome } from "./compute-outcome.ts";
import { timeOfId } from "./ids.ts";
import { inTransaction } from "./in-transaction.ts";
import { deliveriesOf, type NewDelivery } from "../webhooks/events.ts";
import { writeRecords, type RecordEntry } from "./write-records.ts";

/** What every computing request may carry beside what it computes from. */
interface Noted {
  readonly note?: string | null | undefined;
  readonly jobId?: string | null | undefined;
}

/** What of a call a calculation needs: the demo's records are made from the same, without a request. */
export type CalculationCall<Body> = Pick<
  Call<Body>,
  "deps" | "caller" | "body" | "text" | "canonicalText" | "claim" | "requestId" | "path"
>;

/** A calculation that was computed and is not stored yet. */
export interface ComputedRecord {
  readonly entry: RecordEntry;
  readonly deliveries: readonly NewDelivery[];
  /** What the caller is told: the answer with its envelope, or the refusal. */
  readonly told: { readonly answer: Readonly<Record<string, unknown>> } | { readonly refusal: HttpProblem };
}

/**
 * The only way to compute for a caller: compute, then keep request, answer or refusal, usage and idempotency claim in
 * one transaction, then answer. A refusal of the engine is kept like a result and thrown afterwards.
 */
export async function runCalculation<Request extends Noted>(
  kind: CalculationKind<Request, object>,
  call: CalculationCall<Request>,
): Promise<Reply> {
  const { deps, claim } = call;
  const record = await computeRecord(kind, call);
  await inTransaction(deps.database.sequelize, (transaction) =>
    writeRecords(deps.database, [record], transaction),
  );
  claim?.markSettled();
  if ("refusal" in record.told) throw record.told.refusal;
  return reply(201, record.told.answer, { Location: `/v1/calculations/${record.entry.id}` });
}

/** Computes, and makes the record to be kept, with what is to be told of it. Stores nothing. */
export async function computeRecord<Request extends Noted>(
  kind: CalculationKind<Request, object>,
  call: CalculationCall<Request>,
): Promise<ComputedRecord> {
  const { deps, claim, requestId } = call;
  const caller = callerOf(call);
  const started = performance.now();
  const outcome = await deps.compute.run(kind, call.body);
  const durationMs = performance.now() - started;

  const id = deps.newId();
  const createdAt = timeOfId(id) ?? deps.now();
  const inputHash = sha256(call.canonicalText);
  const envelope = { id, kind: kind.kind, engineVersion, inputHash, createdAt: createdAt.toISOString() };
  const told: ComputedRecord["told"] =
    outcome.status === "failed"
      ? { refusal: problemOfFaults(outcome.faults, { id }) }
      : { answer: { ...envelope, ...outcome.answer } };
  const body = "refusal" in told ? problemBody(told.refusal, requestId, call.path) : told.answer;

  const deliveries = await deliveriesOf(deps, {
    organisationId: caller.organisation.id,
    type: "calculation.stored",
    data: { id, kind: kind.kind, status: outcome.status, jobId: call.body.jobId ?? null },
  });
  const entry: RecordEntry = {
    createdAt,
    id,
    organisationId: caller.organisation.id,
    kind: kind.kind,
    status: outcome.status,
    engineVersion,
    durationMs,
    requestText: call.text,
    requestCanonical: call.canonicalText,
    inputHash,
    answerText: JSON.stringify(body),
    resultHash: resultHashOf(outcome),
    memberId: caller.by === "member" ? caller.member.id : null,
    keyId: caller.by === "key" ? caller.key.id : null,
    requestId,
    note: call.body.note ?? null,
    jobId: call.body.jobId ?? null,
    endpoint: call.path,
    httpStatus: "refusal" in told ? told.refusal.status : 201,
    claim: claim?.row ?? null,
  };
  return { entry, deliveries, told };
}

/** Hash of what the engine answered, without what varies from call to call: two equal answers have one hash. */
function resultHashOf(outcome: ComputeOutcome): string | null {
  return outcome.status === "succeeded" ? sha256(canonicalize(outcome.answer) ?? "") : null;
}

export function sha256(text: string): string {
  return `sha256:${createHash("sha256").update(text).digest("hex")}`;
}
