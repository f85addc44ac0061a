import type { z } from "zod";
import { pointerOf } from "../../../shared/pointer.ts";
import type { Problem } from "../../../shared/schemas/problem.ts";
import { ProblemError } from "./service-error.ts";

/** RFC 6901 pointer into a body → what is wrong there. */
export type PointerFaults = Readonly<Record<string, string>>;

/** What `schema` says about a body, each fault at its pointer. */
export function checkBody<Schema extends z.ZodType>(
  schema: Schema,
  body: unknown,
): { body: z.infer<Schema>; faults: null } | { body: null; faults: PointerFaults } {
  const parsed = schema.safeParse(body);
  if (parsed.success) return { body: parsed.data, faults: null };
  return {
    body: null,
    faults: first(parsed.error.issues.map((issue) => [pointerOf(issue.path), wordsOf(issue)])),
  };
}

/** What the service said about the body it was sent, each fault at its pointer. */
export function faultsAtPointers(error: unknown): PointerFaults {
  if (!(error instanceof ProblemError)) return {};
  return first((error.problem.errors ?? []).map((fault) => [fault.pointer ?? "", fault.detail]));
}

/** The fault at `pointer`, or at the first place inside it. */
export function faultAt(faults: PointerFaults, pointer: string): string | undefined {
  const exact = faults[pointer];
  if (exact !== undefined) return exact;
  return Object.entries(faults).find(([place]) => place.startsWith(`${pointer}/`))?.[1];
}

/** The faults of an error that stand at none of the fields shown: they are listed by pointer instead. */
export function faultsElsewhere(error: unknown, shown: readonly string[]): NonNullable<Problem["errors"]> {
  if (!(error instanceof ProblemError)) return [];
  return (error.problem.errors ?? []).filter(({ pointer = "" }) => {
    return !shown.some((field) => pointer === field || pointer.startsWith(`${field}/`));
  });
}

type Issue = z.core.$ZodIssue;

function wordsOf(issue: Issue): string {
  if (issue.code === "invalid_type" && issue.expected === "number") return "A number is needed.";
  if (issue.code === "invalid_type") return "This is needed.";
  if (issue.code === "too_small" && issue.origin === "string") return "This is needed.";
  if (issue.code === "too_small" && issue.origin === "number") return `No less than ${issue.minimum}.`;
  if (issue.code === "too_big" && issue.origin === "number") return `No more than ${issue.maximum}.`;
  return issue.message;
}

function first(pairs: readonly (readonly [string, string])[]): PointerFaults {
  const faults: Record<string, string> = {};
  for (const [pointer, words] of pairs) faults[pointer] ??= words;
  return faults;
}
