import { assertFinite } from "../compute-error.ts";

/** A wire between two level ends. */
export interface Wire {
  readonly weightNPerMm: number;
  /** Horizontal tension, N. */
  readonly tensionN: number;
  readonly fromMm: number;
  readonly toMm: number;
}

/**
 * How far a wire hangs below its level chord at `zMm`, positive down, in mm: the catenary
 * (2H/w)·sinh(w·x/2H)·sinh(w·(L − x)/2H), x from one end, exact and without the cancellation of its usual form
 * H/w·(cosh(w·L/2H) − cosh(w·(x − L/2)/H)), from which it follows by the sum of two hyperbolic cosines.
 * @throws ComputeError result_overflow when the wire is so slack that the sag is no number
 */
export function catenarySagMm({ weightNPerMm, tensionN, fromMm, toMm }: Wire, zMm: number): number {
  const perMm = weightNPerMm / tensionN / 2;
  const sagMm = (Math.sinh(perMm * (zMm - fromMm)) / perMm) * Math.sinh(perMm * (toMm - zMm));
  return assertFinite(sagMm, "The sag of the wire");
}

/** Limit of the catenary for a taut wire, in mm: the parabola w·x·(L − x)/2H. Always the smaller of the two. */
export function parabolaSagMm({ weightNPerMm, tensionN, fromMm, toMm }: Wire, zMm: number): number {
  return (weightNPerMm * (zMm - fromMm) * (toMm - zMm)) / (2 * tensionN);
}
