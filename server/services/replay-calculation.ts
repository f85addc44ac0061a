import type { CalculationKind } from "../calculations/calculation-kind.ts";
import { calculationKinds } from "../calculations/index.ts";
import { engineVersion } from "../compute/version.ts";
import type { Replay } from "../../shared/schemas/calculations.ts";
import { pointerOf } from "../../shared/pointer.ts";
import type { Deps } from "../deps.ts";
import type { Calculation } from "../models/calculation.ts";

const DIFFERENCES_LISTED = 200;
/** What identifies one call and so differs from every other. */
const ENVELOPE = new Set(["id", "kind", "engineVersion", "inputHash", "createdAt"]);

/** Computes a stored request anew, stores nothing, and tells every place where the answer is not what it was. */
export async function replayCalculation({ compute }: Deps, record: Calculation): Promise<Replay> {
  const kind = calculationKinds[record.kind];
  const request = kind.request.safeParse(JSON.parse(record.requestText));
  const stored = JSON.parse(record.answerText) as Record<string, unknown>;
  const then = record.status === "succeeded" ? withoutEnvelope(stored) : { errors: stored.errors };
  const outcome = request.success
    ? await compute.run(kind as CalculationKind<never, object>, request.data as never)
    : null;
  const now =
    outcome === null
      ? { request: "no longer passes the schema" }
      : outcome.status === "succeeded"
        ? outcome.answer
        : { errors: outcome.faults };
  const differences = differencesOf(then, JSON.parse(JSON.stringify(now)), []).slice(0, DIFFERENCES_LISTED);
  return {
    same: differences.length === 0,
    engineVersion,
    recordedEngineVersion: record.engineVersion,
    differences,
  };
}

function withoutEnvelope(answer: Record<string, unknown>): Record<string, unknown> {
  return Object.fromEntries(Object.entries(answer).filter(([name]) => !ENVELOPE.has(name)));
}

function differencesOf(then: unknown, now: unknown, path: PropertyKey[]): Replay["differences"] {
  if (Object.is(then, now)) return [];
  if (!isBranch(then) || !isBranch(now) || Array.isArray(then) !== Array.isArray(now)) {
    return [{ pointer: pointerOf(path), then: then ?? null, now: now ?? null }];
  }
  const names = new Set([...Object.keys(then), ...Object.keys(now)]);
  return [...names].flatMap((name) => differencesOf(then[name], now[name], [...path, name]));
}

function isBranch(value: unknown): value is Record<string, unknown> {
  return typeof value === "object" && value !== null;
}
