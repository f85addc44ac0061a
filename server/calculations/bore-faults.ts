import type { Fault } from "../../shared/error-codes.ts";
import { limits } from "../../shared/limits.ts";
import { pointerOf } from "../../shared/pointer.ts";
import type { BoreRequest } from "../../shared/schemas/bore-fits.ts";

/** Members of one bore that are each right and do not go together. */
export function memberFaults(bore: BoreRequest, index: number): Fault[] {
  const faults: Fault[] = [];
  const { method = "least_squares" } = bore;
  if (method !== "least_squares" && bore.form !== "points" && bore.form !== "turned_gauge") {
    const pointer = pointerOf(["bores", index, "method"]);
    const detail = `${bore.form} takes least_squares only.`;
    faults.push({ pointer, code: "combination_invalid", detail, value: method });
  }
  if (
    bore.form === "wire" &&
    bore.wire.measuredTo === "surface" &&
    (bore.wire.wireDiameter ?? null) === null
  ) {
    const pointer = pointerOf(["bores", index, "wire", "wireDiameter"]);
    faults.push({ pointer, code: "required", detail: "Readings to the wire's surface need its diameter." });
  }
  return faults;
}

/** By index, the fault of every bore whose id an earlier bore of the body has, whatever else is wrong with it. */
export function duplicateFaults(bores: readonly Record<string, unknown>[]): ReadonlyMap<number, Fault> {
  const known = new Set<string>();
  const faults = new Map<number, Fault>();
  for (const [index, { id }] of bores.entries()) {
    if (typeof id !== "string") continue;
    if (known.has(id)) {
      const pointer = pointerOf(["bores", index, "id"]);
      const detail = "An earlier bore of this call has this id.";
      faults.set(index, { pointer, code: "duplicate_id", detail, value: id });
    }
    known.add(id);
  }
  return faults;
}

/** The fault of a body that holds more readings than one call takes; null when it does not. */
export function readingsFault(body: unknown): Fault | null {
  const readings = readingsInCall(body);
  if (readings <= limits.readingsPerCall) return null;
  return {
    pointer: "/bores",
    code: "call_too_large",
    detail: `All bores of a call hold at most ${limits.readingsPerCall} readings together; these hold ${readings}.`,
    value: readings,
    allowed: { max: limits.readingsPerCall },
  };
}

/** Readings of all bores of a body together, whatever is right or wrong with it. */
export function readingsInCall(body: unknown): number {
  return boresIn(body).reduce((sum, bore) => {
    const lists = [bore["points"], bore["readings"], bore["spots"]];
    const listed = lists.reduce<number>((count, list) => count + (Array.isArray(list) ? list.length : 0), 0);
    const wire = isRecord(bore["wire"]) ? bore["wire"] : {};
    const sides = ["left", "right", "bottom", "top"].filter((side) => typeof wire[side] === "number");
    return sum + listed + sides.length;
  }, 0);
}

/** The bores of a body that may be anything; what is no object stands as an empty one, so that indices hold. */
export function boresIn(body: unknown): readonly Record<string, unknown>[] {
  const bores = isRecord(body) ? body["bores"] : null;
  return Array.isArray(bores) ? bores.map((bore: unknown) => (isRecord(bore) ? bore : {})) : [];
}

function isRecord(value: unknown): value is Record<string, unknown> {
  return typeof value === "object" && value !== null;
}
