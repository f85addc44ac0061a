import type { z } from "zod";
import { ProblemError } from "./service-error.ts";

/** Field name → what is wrong with it. */
export type FieldFaults = Readonly<Record<string, string>>;

/** What `schema` says about a form's values, by the first member of each fault's path. */
export function checkForm<Schema extends z.ZodType>(
  schema: Schema,
  values: unknown,
): { values: z.infer<Schema>; faults: null } | { values: null; faults: FieldFaults } {
  const parsed = schema.safeParse(values);
  if (parsed.success) return { values: parsed.data, faults: null };
  return {
    values: null,
    faults: firstByField(parsed.error.issues.map((issue) => [String(issue.path[0] ?? ""), issue.message])),
  };
}

/** What the service said about the fields of a form, by the first step of each pointer. */
export function faultsOfProblem(error: unknown): FieldFaults {
  if (!(error instanceof ProblemError)) return {};
  return firstByField(
    (error.problem.errors ?? []).map((fault) => [fault.pointer?.split("/")[1] ?? "", fault.detail]),
  );
}

/** Text of a form's field as typed; empty when it is absent. */
export function textOf(data: FormData, name: string): string {
  const value = data.get(name);
  return typeof value === "string" ? value : "";
}

function firstByField(faults: readonly (readonly [string, string])[]): FieldFaults {
  const byField: Record<string, string> = {};
  for (const [field, detail] of faults) byField[field] ??= detail;
  return byField;
}
