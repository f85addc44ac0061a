import type { By } from "../services/author.ts";
import { matchedVersion } from "./entity-tag.ts";
import { callerOf, type Call } from "./operation.ts";

/** On whose behalf a call changes something. */
export const byOf = (call: Pick<Call, "caller" | "claim" | "requestId">): By => ({
  caller: callerOf(call),
  claim: call.claim,
  requestId: call.requestId,
});

/**
 * What a conditional call changes: the id of its address, at the version of its If-Match.
 * @throws HttpProblem precondition_required, version_stale
 */
export const readOf = (call: Pick<Call, "params" | "request">): { id: string; version: number } => ({
  id: call.params.id ?? "",
  version: matchedVersion(call.request),
});
