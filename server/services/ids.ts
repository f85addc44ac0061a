import { v7, validate, version } from "uuid";

/** A UUIDv7: sorts by the time it was made, and never runs backward within this process. */
export function newId(): string {
  return v7();
}

/** The millisecond that a UUIDv7 carries; null for any other text. It is a record's createdAt. */
export function timeOfId(id: string): Date | null {
  if (!validate(id) || version(id) !== 7) return null;
  return new Date(Number.parseInt(id.replaceAll("-", "").slice(0, 12), 16));
}
