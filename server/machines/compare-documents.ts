import { isDeepStrictEqual } from "node:util";
import { pointerOf } from "../../shared/pointer.ts";

export interface DocumentDifference {
  readonly pointer: string;
  readonly from?: unknown;
  readonly to?: unknown;
}

type Path = readonly string[];

/**
 * Every place where two documents differ, deepest first named. Items of a list that have an `id` are told by it, so that
 * a station put in before the others is one difference and not one of each; other lists are compared place by place.
 */
export function compareDocuments(from: unknown, to: unknown, path: Path = []): DocumentDifference[] {
  if (isDeepStrictEqual(from, to)) return [];
  const before = membersIn(from);
  const after = membersIn(to);
  if (!before || !after) return [{ pointer: pointerOf(path), ...given("from", from), ...given("to", to) }];
  const names = [...new Set([...before.keys(), ...after.keys()])];
  return names.flatMap((name) => compareDocuments(before.get(name), after.get(name), [...path, name]));
}

function given(name: "from" | "to", value: unknown): Partial<DocumentDifference> {
  return value === undefined ? {} : { [name]: value };
}

function membersIn(value: unknown): Map<string, unknown> | null {
  if (typeof value !== "object" || value === null) return null;
  if (!Array.isArray(value)) return new Map(Object.entries(value));
  const items = value as unknown[];
  const ids = items.map(idOf);
  const areTold = ids.every((id) => id !== null) && new Set(ids).size === ids.length;
  return new Map(items.map((item, index) => [areTold ? (ids[index] ?? "") : String(index), item]));
}

function idOf(item: unknown): string | null {
  if (typeof item !== "object" || item === null || !("id" in item)) return null;
  return typeof item.id === "string" ? item.id : null;
}
