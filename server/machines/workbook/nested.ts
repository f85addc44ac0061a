/** JSON as it stands in a document. */
export type Json = null | boolean | number | string | Json[] | { [member: string]: Json };
export type Item = Record<string, Json>;

/** What stands at a path; undefined where nothing does. */
export function valueAt(item: unknown, path: readonly (string | number)[]): unknown {
  let value = item;
  for (const step of path) {
    if (typeof value !== "object" || value === null || !Object.hasOwn(value, step)) return undefined;
    value = (value as Record<string | number, unknown>)[step];
  }
  return value;
}

/** Puts a value at a path, with what has to stand round it. Answers false where something else stands there. */
export function putAt(item: Item, path: readonly (string | number)[], value: Json): boolean {
  let within: Record<string | number, unknown> = item;
  for (const [index, step] of path.entries()) {
    const stands = Object.hasOwn(within, step) ? within[step] : undefined;
    const next = path[index + 1];
    if (next === undefined) {
      if (stands !== undefined) return false;
      within[step] = value;
      return true;
    }
    if (stands === undefined) within[step] = typeof next === "number" ? [] : {};
    else if (
      typeof stands !== "object" ||
      stands === null ||
      Array.isArray(stands) !== (typeof next === "number")
    )
      return false;
    within = within[step] as Record<string | number, unknown>;
  }
  return false;
}
