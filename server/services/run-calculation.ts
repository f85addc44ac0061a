import { createHash } from "node:crypto";
import canonicalize from "canonicalize";
import type { CalculationKind } from "../calculations/calculation-kind.ts";
import { engineVersion } from "../compute/version.ts";
import { problemBody, problemOfFaults, type HttpProblem } from "../http/http-problem.ts";
import { callerOf, reply, type Call, type Reply } from "../http/operation.ts";
import type { ComputeOutcome } from "./compute-outcome.ts";
import { timeOfId } from "./ids.ts";
import { deliveriesOf } from "../webhooks/events.ts";
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

/**
 * The only way to compute for a caller: compute, then keep request, answer or refusal, usage and idempotency claim in
 * one transaction, then answer. A refusal of the engine is kept like a result and thrown afterwards.
 */
export async function runCalculation<Request extends Noted>(
  kind: CalculationKind<Request, object>,
  call: CalculationCall<Request>,
): Promise<Reply> {
  const { deps, claim, requestId } = call;
  const caller = callerOf(call);
  const started = performance.now();
  const outcome = await deps.compute.run(kind, call.body);
  const durationMs = performance.now() - started;

  const id = deps.newId();
  const createdAt = timeOfId(id) ?? deps.now();
  const inputHash = sha256(call.canonicalText);
  const envelope = { id, kind: kind.kind, engineVersion, inputHash, createdAt: createdAt.toISOString() };
  const refusal = outcome.status === "failed" ? problemOfFaults(outcome.faults, { id }) : null;
  const answer = outcome.status === "succeeded" ? { ...envelope, ...outcome.answer } : null;
  const body = answer ?? problemBody(refusal as HttpProblem, requestId, call.path);

  const deliveries = await deliveriesOf(deps, {
    organisationId: caller.organisation.id,
    type: "calculation.stored",
    data: { id, kind: kind.kind, status: outcome.status, jobId: call.body.jobId ?? null },
  });
  const entries: RecordEntry[] = [
    {
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
      httpStatus: refusal?.status ?? 201,
      claim: claim?.row ?? null,
    },
  ];
  await writeRecords(deps.database, entries, deliveries);
  claim?.markSettled();
  if (refusal) throw refusal;
  return reply(201, answer, { Location: `/v1/calculations/${id}` });
}

/** Hash of what the engine answered, without what varies from call to call: two equal answers have one hash. */
function resultHashOf(outcome: ComputeOutcome): string | null {
  return outcome.status === "succeeded" ? sha256(canonicalize(outcome.answer) ?? "") : null;
}

export function sha256(text: string): string {
  return `sha256:${createHash("sha256").update(text).digest("hex")}`;
}
