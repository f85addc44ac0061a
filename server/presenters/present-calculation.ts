import type { CalculationRecord, CalculationSummary } from "../../shared/schemas/calculations.ts";
import type { Calculation } from "../models/calculation.ts";
import type { CallerNames } from "../services/caller-names.ts";
import { isoTime } from "./time.ts";

/** A record without its request and answer, as lists show it. */
export function presentCalculationSummary(row: Calculation, names: CallerNames): CalculationSummary {
  return {
    id: row.id,
    kind: row.kind,
    status: row.status,
    createdAt: isoTime(row.createdAt),
    durationMs: row.durationMs,
    engineVersion: row.engineVersion,
    inputHash: row.inputHash,
    resultHash: row.resultHash,
    member: names.member(row.memberId),
    key: names.key(row.keyId),
    requestId: row.requestId,
    note: row.note,
    jobId: row.jobId,
  };
}

/** The whole record: what was asked, as received, and what was answered, as sent. */
export function presentCalculation(row: Calculation, names: CallerNames): CalculationRecord {
  const answer = JSON.parse(row.answerText) as Record<string, unknown>;
  const succeeded = row.status === "succeeded";
  return {
    ...presentCalculationSummary(row, names),
    request: JSON.parse(row.requestText) as Record<string, unknown>,
    response: succeeded ? answer : null,
    problem: succeeded ? null : (answer as CalculationRecord["problem"]),
  };
}
