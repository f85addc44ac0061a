import { z } from "zod";
import { bounds, limits } from "../limits.ts";
import type { Dimension, FurtherDimension } from "../units.ts";

/** What a number measures: the fault mapper reads it to quote a limit in the caller's own unit. */
export type QuantityMeta = { "x-dimension"?: Dimension | FurtherDimension; "x-unit"?: string };

type Bound = keyof typeof bounds;

/** A number in the unit that the call states for `dimension`. */
export function quantity(dimension: Dimension | FurtherDimension, bound: Bound, description: string) {
  return z
    .number()
    .min(bounds[bound].min)
    .max(bounds[bound].max)
    .meta({ description, "x-dimension": dimension } satisfies QuantityMeta & { description: string });
}

/** A number in a unit that never varies (degrees, a ratio). */
export function fixedQuantity(unit: string, bound: Bound, description: string) {
  return z
    .number()
    .min(bounds[bound].min)
    .max(bounds[bound].max)
    .meta({ description, "x-unit": unit } satisfies QuantityMeta & { description: string });
}

/** Clock angle: degrees clockwise from 12 o'clock. */
export const clockDeg = fixedQuantity(
  "deg",
  "clockDeg",
  "Degrees clockwise from 12 o'clock in the view named by `seen`.",
);

/** An id that the caller gives to a bore, station, component, support or pad. */
export const callerId = z
  .string()
  .min(1)
  .max(limits.idLength)
  .regex(/^[ -~\u00a0-\uffff]+$/, "An id holds no control characters.")
  .meta({ description: "The caller's own name for it, unique in the call." });
