import { ComputeError } from "../compute-error.ts";

/** A gauge or a part away from 20 °C. */
export interface Warmth {
  /** Mean linear expansion between 20 °C and the temperature, 1/K. */
  readonly expansionPerK: number;
  /** Temperature less 20 °C, K. */
  readonly aboveReferenceK: number;
}

/** What was warm when a length was read; null where a side is taken as it is at 20 °C. */
export interface ReadingWarmth {
  readonly gauge: Warmth | null;
  readonly part: Warmth | null;
}

/** No metal in use grows by more between 20 °C and where it is read: beyond it a temperature or a coefficient is a slip. */
const expansionMax = 0.05;
const sides = ["gauge", "part"] as const;

/**
 * What a length read is multiplied by to be that at 20 °C, the reference temperature of ISO 1:2016:
 * (1 + α_g·(t_g − 20 °C))/(1 + α_p·(t_p − 20 °C)). A warm gauge has long divisions and reads short, a warm part is large.
 * The quotient is exact for mean coefficients; the difference that is often printed leaves out terms of second order.
 * The uncertainty of temperatures and coefficients is not carried.
 * @throws ComputeError out_of_range at gauge or part
 */
export function reductionFactor(warmth: ReadingWarmth): number {
  const [refusal] = reductionRefusals(warmth);
  if (refusal) throw refusal;
  return (1 + expansionOf(warmth.gauge)) / (1 + expansionOf(warmth.part));
}

/** The sides whose expansion is none that a metal has. */
export function reductionRefusals(warmth: ReadingWarmth): ComputeError[] {
  return sides.flatMap((side) => {
    const reached = Math.abs(expansionOf(warmth[side]));
    if (reached <= expansionMax) return [];
    const detail = `Coefficient × (temperature − 20 °C) is beyond ±${expansionMax}: no metal expands that much.`;
    return [new ComputeError("out_of_range", detail, { at: [side], reached, limit: expansionMax })];
  });
}

/** α·(t − 20 °C). */
function expansionOf(warmth: Warmth | null): number {
  return warmth === null ? 0 : warmth.expansionPerK * warmth.aboveReferenceK;
}
