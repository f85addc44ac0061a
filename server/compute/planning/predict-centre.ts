import type { PlaneCovariance } from "../plane.ts";
import { worstVarianceMm2 } from "../plane.ts";
import { radialFactor } from "../statistics/radial-factor.ts";
import { studentFactor } from "../statistics/student-t.ts";
import { shareOf, type Limits } from "./demands.ts";
import { frameOf, informationOf, isDetermined, sumsOfTaken } from "./information.ts";
import type { PlanForm, TakenReading } from "./plan-input.ts";

/** What a set of readings will tell of the centre, before any is evaluated. */
export interface Prediction {
  readonly readings: number;
  readonly covariance: PlaneCovariance;
  /** Half-widths of infinite degrees of freedom: k·u of each plane, kRadial·√λmax of the worst direction. */
  readonly expanded: {
    readonly hMm: number;
    readonly vMm: number;
    readonly radialMm: number;
    readonly k: number;
    readonly kRadial: number;
  };
  /** Largest expanded uncertainty over that wanted: 1 and less suffices. */
  readonly ratio: number;
  /** Standard uncertainty of the centre by as many readings evenly round: u·√(2/n) of wall distances, u/√n of spots. */
  readonly evenRingMm: number;
  /** Worst standard uncertainty over that; 1 is best. */
  readonly dilution: number;
}

/**
 * First-order covariance (JᵀWJ)⁻¹ of the centre that readings at these clock angles give, W = 1/u², the radius (of spots
 * the mounting error) fitted beside it; F = 1, since what they will scatter beyond their u is not known. Null where they
 * leave the centre open. Linear in the number of readings.
 */
export function predictCentre(
  readings: readonly TakenReading[],
  form: PlanForm,
  limits: Limits,
  level: number,
): Prediction | null {
  const sums = sumsOfTaken(readings, frameOf(readings.map(({ clockDeg }) => clockDeg)));
  const information = informationOf(sums, form);
  if (!isDetermined(information, sums)) return null;
  const { xx, xy, yy } = information;
  const determinant = xx * yy - xy * xy;
  const covariance = { hhMm2: yy / determinant, hvMm2: -xy / determinant, vvMm2: xx / determinant };
  const worstMm = Math.sqrt(worstVarianceMm2(covariance));
  const k = studentFactor(level, null);
  const kRadial = radialFactor(level, null);
  const evenRingMm = Math.sqrt((form === "wall" ? 2 : 1) / sums.w);
  return {
    readings: readings.reduce((sum, { times }) => sum + times, 0),
    covariance,
    expanded: {
      hMm: k * Math.sqrt(covariance.hhMm2),
      vMm: k * Math.sqrt(covariance.vvMm2),
      radialMm: kRadial * worstMm,
      k,
      kRadial,
    },
    ratio: Math.sqrt(shareOf(information, limits)),
    evenRingMm,
    dilution: worstMm / evenRingMm,
  };
}
