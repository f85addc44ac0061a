import { z } from "zod";
import type { Fault, ProblemCode } from "../../shared/error-codes.ts";
import { limits } from "../../shared/limits.ts";
import { pointerOf } from "../../shared/pointer.ts";
import type { QuantityMeta } from "../../shared/schemas/quantity.ts";
import {
  furtherUnitChoices,
  unitChoices,
  type Dimension,
  type FurtherDimension,
} from "../../shared/units.ts";

type Issue = z.core.$ZodIssue;

/** Every fault of a body against its schema, each at its place, with limits quoted in the caller's own unit. */
export function schemaFaults(schema: z.ZodType, body: unknown): Fault[] {
  const parsed = schema.safeParse(body);
  if (parsed.success) return [];
  return parsed.error.issues.flatMap((issue) => faultsOfIssue(issue, [], schema, body));
}

function faultsOfIssue(issue: Issue, base: PropertyKey[], schema: z.ZodType, body: unknown): Fault[] {
  const path = [...base, ...issue.path];
  if (issue.code === "unrecognized_keys") {
    return issue.keys.map((name) => ({
      pointer: pointerOf([...path, name]),
      code: "unknown_field" as const,
      detail: `${cut(name)} is not a member here.`,
    }));
  }
  if (issue.code === "invalid_union" && issue.errors.length > 0) {
    // The branch that comes nearest is the one the caller meant: of the kind sent, the fewest faults, the deepest first.
    const branch =
      [...issue.errors].sort(
        (a, b) => ofOtherKind(a) - ofOtherKind(b) || a.length - b.length || depth(b) - depth(a),
      )[0] ?? [];
    return branch.flatMap((inner) => faultsOfIssue(inner, path, schema, body));
  }
  return [faultAt(issue, path, schema, body)];
}

/** 1 where a branch wants an object, a list or a number, and something else was sent. */
const ofOtherKind = (issues: readonly Issue[]): number =>
  issues.some(({ code, path }) => code === "invalid_type" && path.length === 0) ? 1 : 0;

const depth = (issues: readonly Issue[]): number => Math.max(0, ...issues.map((issue) => issue.path.length));

function faultAt(issue: Issue, path: PropertyKey[], schema: z.ZodType, body: unknown): Fault {
  const value = valueAt(body, path);
  const pointer = pointerOf(path);
  if (value === undefined) {
    const units = path[0] === "units";
    return {
      pointer,
      code: units ? "units_missing" : "required",
      detail: `${pointer || "The body"} is missing.`,
    };
  }
  const fault: Fault = { pointer, code: codeOf(issue, value), detail: sentenceOf(issue) };
  if (typeof value !== "number" && typeof value !== "string") return fault;
  const echoed = typeof value === "string" ? cut(value) : Number.isFinite(value) ? value : String(value);
  return { ...fault, value: echoed, ...(typeof value === "number" ? quantityAt(schema, path, body) : {}) };
}

function codeOf(issue: Issue, value: unknown): ProblemCode {
  switch (issue.code) {
    case "too_small":
      return sizeCode(issue.origin, "too_few_items");
    case "too_big":
      return sizeCode(issue.origin, "too_many_items");
    case "invalid_value":
    case "invalid_union":
      return "choice_unknown";
    case "invalid_type":
      return typeof value === "number" && !Number.isFinite(value) ? "number_not_finite" : "wrong_type";
    case "invalid_format":
      return "text_invalid";
    case "not_multiple_of":
      return "out_of_range";
    default:
      return "wrong_type";
  }
}

function sizeCode(origin: string, ofItems: "too_few_items" | "too_many_items"): ProblemCode {
  if (origin === "string") return "text_invalid";
  return origin === "array" || origin === "set" ? ofItems : "out_of_range";
}

function sentenceOf(issue: Issue): string {
  if (issue.code === "too_big") {
    if (issue.origin === "array") return `It holds at most ${issue.maximum} items.`;
    if (issue.origin === "string") return `It has at most ${issue.maximum} characters.`;
  }
  if (issue.code === "too_small") {
    if (issue.origin === "array") return `It holds at least ${issue.minimum} items.`;
    if (issue.origin === "string") return `It has at least ${issue.minimum} characters.`;
  }
  return /[.!?]$/.test(issue.message) ? issue.message : `${issue.message}.`;
}

/** The unit and range of the number at `path`, where its schema says what it measures. */
export function quantityAt(
  schema: z.ZodType,
  path: readonly PropertyKey[],
  body: unknown,
): Pick<Fault, "unit" | "allowed"> {
  const leaf = numberSchemas(schema, path)[0];
  if (!leaf) return {};
  const meta = (leaf.meta() ?? {}) as QuantityMeta;
  const unit = meta["x-dimension"] ? statedUnit(body, meta["x-dimension"]) : meta["x-unit"];
  const { minValue, maxValue } = leaf;
  const allowed = {
    ...(minValue !== null && Number.isFinite(minValue) ? { min: minValue } : {}),
    ...(maxValue !== null && Number.isFinite(maxValue) ? { max: maxValue } : {}),
    ...(unit ? { unit } : {}),
  };
  return { ...(unit ? { unit } : {}), allowed };
}

function statedUnit(body: unknown, dimension: Dimension | FurtherDimension): string | undefined {
  const unit = valueAt(body, ["units", dimension]);
  const choices: readonly unknown[] = { ...unitChoices, ...furtherUnitChoices }[dimension];
  return choices.includes(unit) ? (unit as string) : undefined;
}

/** Every number schema that may stand at `path`: more than one behind a union. */
function numberSchemas(schema: z.core.$ZodType, path: readonly PropertyKey[]): z.ZodNumber[] {
  if (schema instanceof z.ZodOptional || schema instanceof z.ZodNullable || schema instanceof z.ZodDefault) {
    return numberSchemas(schema.unwrap(), path);
  }
  if (schema instanceof z.ZodUnion) {
    return schema.options.flatMap((option) => numberSchemas(option, path));
  }
  const [step, ...rest] = path;
  if (step === undefined) return schema instanceof z.ZodNumber ? [schema] : [];
  if (schema instanceof z.ZodObject) {
    const member = (schema.shape as Record<PropertyKey, z.core.$ZodType | undefined>)[step];
    return member ? numberSchemas(member, rest) : [];
  }
  if (schema instanceof z.ZodArray) return numberSchemas(schema.element, rest);
  if (schema instanceof z.ZodRecord) return numberSchemas(schema.valueType, rest);
  return [];
}

/** What stands at `path` in a parsed body; undefined where nothing does. */
export function valueAt(body: unknown, path: readonly PropertyKey[]): unknown {
  let value = body;
  for (const step of path) {
    if (typeof value !== "object" || value === null || !Object.hasOwn(value, step)) return undefined;
    value = (value as Record<PropertyKey, unknown>)[step];
  }
  return value;
}

const cut = (text: string): string =>
  text.length <= limits.echoedTextLength ? text : `${text.slice(0, limits.echoedTextLength)}…`;
