import { assertFinite } from "../compute-error.ts";
import type { BoreFit } from "./bore-fit.ts";

/**
 * Returns the fit when every number of it is finite.
 * @throws ComputeError result_overflow
 */
export function requireFiniteFit<Fit extends BoreFit>(fit: Fit): Fit {
  requireFinite(fit, "The fit");
  return fit;
}

function requireFinite(value: unknown, what: string): void {
  if (typeof value === "number") {
    assertFinite(value, what);
  } else if (Array.isArray(value)) {
    for (const inner of value) requireFinite(inner, what);
  } else if (typeof value === "object" && value !== null) {
    for (const [name, inner] of Object.entries(value)) requireFinite(inner, name);
  }
}
