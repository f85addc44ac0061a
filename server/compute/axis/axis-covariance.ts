import type { PlaneCovariance } from "../plane.ts";
import type { AxisCovariance, Matrix2 } from "./axis-result.ts";
import type { ErrorSource } from "./error-source.ts";
import type { PlaneFits } from "./fit-plane.ts";
import { coefficientGains } from "./line-gains.ts";

type Coefficients = ReturnType<typeof coefficientGains>;

/**
 * Covariance of the axis, G·Σ·Gᵀ: G the gains of (at0, slope) in both planes, Σ the covariances of the reference
 * observations, centre and target together, with their h–v terms.
 */
export function axisCovariance(fits: PlaneFits, sources: readonly ErrorSource[]): AxisCovariance {
  const h = coefficientGains(fits.h.gains);
  const v = coefficientGains(fits.v.gains);
  const block = (rows: Coefficients, columns: Coefficients, entry: keyof PlaneCovariance): Matrix2 => {
    const middle = sources.map(({ total }) => total[entry]);
    return [
      [weighted(rows.at0, columns.at0, middle), weighted(rows.at0, columns.slope, middle)],
      [weighted(rows.slope, columns.at0, middle), weighted(rows.slope, columns.slope, middle)],
    ];
  };
  const apart = { h: block(h, h, "hhMm2"), v: block(v, v, "vvMm2"), hv: block(h, v, "hvMm2") };
  if (!fits.h.crossGains || !fits.v.crossGains) return apart;
  const hOfV = coefficientGains(fits.h.crossGains);
  const vOfH = coefficientGains(fits.v.crossGains);
  return {
    h: sumOf(apart.h, block(h, hOfV, "hvMm2"), block(hOfV, h, "hvMm2"), block(hOfV, hOfV, "vvMm2")),
    v: sumOf(apart.v, block(v, vOfH, "hvMm2"), block(vOfH, v, "hvMm2"), block(vOfH, vOfH, "hhMm2")),
    hv: sumOf(apart.hv, block(h, vOfH, "hhMm2"), block(hOfV, vOfH, "hvMm2"), block(hOfV, v, "vvMm2")),
  };
}

function sumOf(...blocks: readonly Matrix2[]): Matrix2 {
  const at = (row: 0 | 1, column: 0 | 1) => blocks.reduce((sum, one) => sum + one[row][column], 0);
  return [
    [at(0, 0), at(0, 1)],
    [at(1, 0), at(1, 1)],
  ];
}

function weighted(rows: Float64Array, columns: Float64Array, middle: readonly number[]): number {
  let sum = 0;
  for (let j = 0; j < middle.length; j += 1) sum += rows[j]! * columns[j]! * middle[j]!;
  return sum;
}
