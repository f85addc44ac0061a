import { valueAt, type Json } from "./nested.ts";

/** A place in a document where null, or a list, object or text with nothing in it, is stated. */
export interface Nothing {
  /** As RFC 6901, but items that have an id are named by it: rows may be moved and taken out. */
  readonly place: string;
  readonly value: null | readonly [] | Readonly<Record<string, never>> | "";
}

/** Places where `whole` states nothing and `read` leaves it out. */
export function findNothing(whole: unknown, read: unknown, path: readonly string[] = []): Nothing[] {
  if (read === undefined) {
    if (isNothing(whole)) return [{ place: written(path), value: whole }];
    if (typeof whole !== "object" || whole === null || Array.isArray(whole)) return [];
    return [{ place: written(path), value: {} }, ...findNothing(whole, {}, path)];
  }
  if (Array.isArray(whole)) {
    return whole.flatMap((item: unknown, index) =>
      findNothing(item, Array.isArray(read) ? (read as unknown[])[index] : undefined, [
        ...path,
        idOf(item) ?? String(index),
      ]),
    );
  }
  if (typeof whole !== "object" || whole === null) return [];
  return Object.entries(whole).flatMap(([member, value]) =>
    findNothing(value, valueAt(read, [member]), [...path, member]),
  );
}

/** Puts them back into what was read, in the order in which they were found. What no longer has its place is let go. */
export function restateNothing(document: unknown, nothings: readonly Nothing[]): void {
  for (const { place, value } of nothings) {
    const steps = place.split("/").slice(1).map(unescaped);
    const last = steps.pop();
    const within = steps.reduce<unknown>(child, document);
    if (last === undefined || typeof within !== "object" || within === null || Array.isArray(within))
      continue;
    if (Object.hasOwn(within, last) || last === "__proto__") continue;
    (within as Record<string, unknown>)[last] = structuredClone(value);
  }
}

export const nothingWords = { null: null, "[]": [], "{}": {}, '""': "" } as const satisfies Record<
  string,
  Nothing["value"]
>;

export const wordOf = (value: Nothing["value"]): string => JSON.stringify(value);

function isNothing(value: unknown): value is Nothing["value"] {
  if (value === null || value === "") return true;
  return typeof value === "object" && Object.keys(value).length === 0;
}

function child(within: unknown, step: string): unknown {
  if (Array.isArray(within)) {
    const items = within as readonly Json[];
    return items.find((item) => idOf(item) === step) ?? items[Number(step)];
  }
  return valueAt(within, [step]);
}

function idOf(item: unknown): string | undefined {
  const id = valueAt(item, ["id"]);
  return typeof id === "string" ? id : undefined;
}

const written = (path: readonly string[]): string =>
  path.map((step) => `/${step.replaceAll("~", "~0").replaceAll("/", "~1")}`).join("");
const unescaped = (step: string): string => step.replaceAll("~1", "/").replaceAll("~0", "~");
