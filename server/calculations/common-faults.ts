import type { z } from "zod";
import type { Fault } from "../../shared/error-codes.ts";
import { pointerOf } from "../../shared/pointer.ts";
import { unitsSchema } from "../../shared/schemas/common.ts";
import {
  absoluteZero,
  furtherUnitChoices,
  type FurtherDimension,
  type FurtherUnit,
  type Units,
} from "../../shared/units.ts";
import { isCovariance } from "../compute/conformity/is-covariance.ts";
import type { PlaneCovariance } from "../compute/plane.ts";
import { isSymmetric } from "./read-covariance.ts";

type Place = readonly PropertyKey[];

/** A fault at every id that stands earlier in the list too; what is no id (null) is passed over. */
export function duplicates(ids: readonly (string | null)[], at: (index: number) => Place): Fault[] {
  const first = new Map<string, number>();
  return ids.flatMap((id, index) => {
    if (id === null) return [];
    const earlier = first.get(id);
    if (earlier === undefined) {
      first.set(id, index);
      return [];
    }
    const detail = `The same id stands at ${pointerOf(at(earlier))}.`;
    return [{ pointer: pointerOf(at(index)), code: "duplicate_id" as const, detail }];
  });
}

export function unknownReference(at: Place, what: string): Fault {
  return {
    pointer: pointerOf(at),
    code: "unknown_reference",
    detail: `No ${what} of this call has that id.`,
  };
}

export function notAvailable(at: Place, detail: string): Fault {
  return { pointer: pointerOf(at), code: "not_available", detail };
}

export function combinationInvalid(at: Place, detail: string): Fault {
  return { pointer: pointerOf(at), code: "combination_invalid", detail };
}

/** A unit that the call uses and does not state. */
export function unitNotStated(dimension: FurtherDimension): Fault {
  return {
    pointer: `/units/${dimension}`,
    code: "units_missing",
    detail: `This call uses a ${dimension}: state its unit, one of ${furtherUnitChoices[dimension].join(", ")}.`,
  };
}

/** No fault where the unit is not known: that is a fault of its own. */
export function belowAbsoluteZero(
  value: number,
  unit: FurtherUnit<"temperature"> | undefined,
  at: Place,
): Fault[] {
  if (unit === undefined || value >= absoluteZero[unit]) return [];
  const [pointer, detail] = [pointerOf(at), "No temperature is below absolute zero."];
  return [{ pointer, code: "out_of_range", detail, value, unit, allowed: { min: absoluteZero[unit], unit } }];
}

/** A covariance whose two equal places differ. */
export function asymmetry(matrix: readonly (readonly number[])[] | null | undefined, at: Place): Fault[] {
  if (!matrix || isSymmetric(matrix)) return [];
  const detail = "A covariance is symmetric: its two off-diagonal entries are the same number.";
  return [{ pointer: pointerOf(at), code: "covariance_not_positive", detail }];
}

/** A covariance of negative variance, or of correlation beyond plus or minus 1. */
export function notPositive(covariance: PlaneCovariance | null, at: Place): Fault[] {
  if (!covariance || isCovariance(covariance)) return [];
  const detail = "A covariance has variances of 0 or more, and a correlation within plus or minus 1.";
  return [{ pointer: pointerOf(at), code: "covariance_not_positive", detail }];
}

/** The members of a value that may be anything; none when it is no object. */
export function membersOf(value: unknown): Record<string, unknown> {
  return typeof value === "object" && value !== null ? (value as Record<string, unknown>) : {};
}

export function listOf(value: unknown): readonly unknown[] {
  return Array.isArray(value) ? value : [];
}

/** What passes the schema of a list of a body that may be anything; null for each item that does not. */
export function soundOf<T>(schema: z.ZodType<T>, items: unknown): (T | null)[] {
  return listOf(items).map((item) => schema.safeParse(item).data ?? null);
}

/** The `id` of each item of a body that may be anything; null where there is none. */
export function idsOf(items: readonly unknown[]): (string | null)[] {
  return items.map((item) => {
    const { id } = membersOf(item);
    return typeof id === "string" ? id : null;
  });
}

/** The units stated; where none are, any will do, for faults of the domain that do not depend on them. */
export function statedUnitsOrAny(units: unknown): Units {
  return unitsSchema.safeParse(units).data ?? { axial: "mm", bore: "mm", offset: "mm" };
}
