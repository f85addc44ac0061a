import { ComputeError } from "../compute-error.ts";
import type { Tolerance } from "./tolerance.ts";

/** Everything that leaves a tolerance without room, at tolerance/radial, tolerance/h or tolerance/v. */
export function findToleranceFaults(tolerance: Tolerance): ComputeError[] {
  if (tolerance.form === "radial") {
    return tolerance.halfWidthMm > 0 ? [] : [fault("A tolerance is a half-width above 0.", "radial")];
  }
  return (["h", "v"] as const)
    .filter((plane) => !(tolerance[plane].minMm < tolerance[plane].maxMm))
    .map((plane) => fault("The least of a tolerance is below its most.", plane));
}

function fault(message: string, side: "radial" | "h" | "v"): ComputeError {
  return new ComputeError("tolerance_invalid", message, { at: ["tolerance", side] });
}
