import type { z } from "zod";
import type { toleranceSchema } from "../../shared/schemas/common.ts";
import type { Converter } from "../../shared/units.ts";
import type { PlaneTolerance, Tolerance } from "../compute/conformity/tolerance.ts";

type ToleranceRequest = z.infer<typeof toleranceSchema>;

/** A tolerance as sent, half-widths or ranges, as ranges and radii in millimetres. */
export function readTolerance(tolerance: ToleranceRequest, offset: Converter): Tolerance {
  return "radial" in tolerance
    ? { form: "radial", halfWidthMm: offset.toMm(tolerance.radial) }
    : { form: "planes", h: readSide(tolerance.h, offset), v: readSide(tolerance.v, offset) };
}

function readSide(side: number | readonly number[], offset: Converter): PlaneTolerance {
  if (typeof side === "number") return { minMm: -offset.toMm(side), maxMm: offset.toMm(side) };
  return { minMm: offset.toMm(side[0]!), maxMm: offset.toMm(side[1]!) };
}
