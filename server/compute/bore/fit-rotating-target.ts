import { ComputeError } from "../compute-error.ts";
import type { PlaneVector } from "../plane.ts";
import type { SpotFit } from "./bore-fit.ts";
import type { RotatingTargetInput } from "./bore-input.ts";
import { clockDirection } from "./clock-direction.ts";
import { expandUncertainty } from "./expand-uncertainty.ts";
import { warnRedundancy, warnScatter, warnWeak } from "./fit-warnings.ts";
import { statedUncertainties } from "./stated-uncertainties.ts";
import { varianceScale } from "./variance-scale.ts";

/** Spots with the turns of the target, downstream view; `turn` is (cos t, sin t). */
export interface TargetReadings {
  readonly spotH: Float64Array;
  readonly spotV: Float64Array;
  readonly turnCos: Float64Array;
  readonly turnSin: Float64Array;
  readonly uMm: readonly number[] | null;
}

/** Two centre coordinates and two of the mounting error. */
const parameters = 4;
/** Weighted spread of the turns, 0 all at one angle to 1 evenly round, below which they are one angle. */
const turnSpreadMin = 1e-12;

/** Takes the spots to the downstream view and to spots on the target, with what forbids a fit. */
export function gatherSpots(input: RotatingTargetInput): {
  readonly readings: TargetReadings;
  readonly refusals: readonly ComputeError[];
} {
  const refusals: ComputeError[] = [];
  const uMm = statedUncertainties(input.spots, input.readingUncertaintyMm, "spots", refusals);
  const side = input.seen === "downstream" ? 1 : -1;
  const sign = input.sense === "spot_on_target" ? 1 : -1;
  const directions = input.spots.map(({ clockDeg }) => clockDirection(clockDeg));
  const readings = {
    spotH: Float64Array.from(input.spots, ({ hMm }) => side * sign * hMm),
    spotV: Float64Array.from(input.spots, ({ vMm }) => sign * vMm),
    turnCos: Float64Array.from(directions, ({ v }) => v),
    turnSin: Float64Array.from(directions, ({ h }) => side * h),
    uMm,
  };
  return { readings, refusals };
}

/** Why these spots determine no centre; empty where they do. */
export function spotRefusal({ turnCos, turnSin, uMm }: TargetReadings): readonly ComputeError[] {
  const n = turnCos.length;
  if (n < 2) {
    return [
      new ComputeError("too_few_points", `A centre needs two spots; ${n} were sent.`, { at: ["spots"] }),
    ];
  }
  const { spread, weightSum } = turnsOf({ turnCos, turnSin, uMm });
  if (spread / weightSum > turnSpreadMin) return [];
  return [
    new ComputeError("angles_insufficient", "All spots were read at one clock angle.", { at: ["spots"] }),
  ];
}

/**
 * Centre of a bore from the spots of a target turned about it. In complex numbers, h + i·v, the spot at turn t is
 * c + e·exp(i·t): c the target's mounting error, e the beam relative to the bore's centre. Linear least squares in
 * c and e has the closed form e = Σ w·conj(φ − φ̄)(S − S̄)/Σ w|φ − φ̄|², φ = exp(i·t); the answer is −e, with the
 * variance 1/Σ w|φ − φ̄|² in every direction. Linear in the number of spots.
 */
export function fitRotatingTarget(input: RotatingTargetInput, readings: TargetReadings): SpotFit {
  const { spotH, spotV, turnCos, turnSin, uMm } = readings;
  const n = spotH.length;
  const turns = turnsOf(readings);
  const { weight, weightSum, meanCos, meanSin, spread } = turns;
  const { beamH, beamV, meanH, meanV } = beamOf(spotH, spotV, readings, turns);
  let squares = 0;
  let weightedSquares = 0;
  const residualsMm = Array.from({ length: n }, (_, i): PlaneVector => {
    const cos = turnCos[i]! - meanCos;
    const sin = turnSin[i]! - meanSin;
    const hMm = spotH[i]! - meanH - (beamH * cos - beamV * sin);
    const vMm = spotV[i]! - meanV - (beamH * sin + beamV * cos);
    squares += hMm * hMm + vMm * vMm;
    weightedSquares += weight[i]! * (hMm * hMm + vMm * vMm);
    return { hMm, vMm };
  });
  const redundancy = 2 * n - parameters;
  const scale = varianceScale(weightedSquares, redundancy, uMm !== null);
  const variance = scale === null ? null : scale.factor / spread;
  const covariance = variance === null ? null : { hhMm2: variance, hvMm2: 0, vvMm2: variance };
  const chiSquare = uMm === null ? null : weightedSquares;
  const dilution = Math.sqrt(weightSum / spread);
  return {
    form: "rotating_target",
    centre: { hMm: -beamH, vMm: -beamV },
    covariance,
    expandedUncertainty: expandUncertainty(covariance, null, scale, input.level),
    statistics: {
      readingsUsed: n,
      parameters,
      rmsMm: Math.sqrt(squares / n),
      chiSquare,
      varianceInflation: uMm === null || scale === null ? null : scale.factor,
      dilution,
      iterations: 0,
    },
    residualsMm,
    warnings: [
      ...warnWeak(dilution, "weak_angles"),
      ...warnRedundancy(redundancy),
      ...warnScatter(chiSquare, redundancy),
    ],
  };
}

/** What the turns and weights of the spots give, whatever the spots are: as `beamOf` needs it. */
export type Turns = ReturnType<typeof turnsOf>;

/** Weighted means of the spots, mm, and e, the beam relative to the bore's centre, of spots at these turns. */
export function beamOf(
  spotH: Float64Array,
  spotV: Float64Array,
  { turnCos, turnSin }: Pick<TargetReadings, "turnCos" | "turnSin">,
  { weight, weightSum, meanCos, meanSin, spread }: Turns,
) {
  const meanH = weightedMean(spotH, weight, weightSum);
  const meanV = weightedMean(spotV, weight, weightSum);
  let beamH = 0;
  let beamV = 0;
  for (let i = 0; i < spotH.length; i++) {
    const cos = weight[i]! * (turnCos[i]! - meanCos);
    const sin = weight[i]! * (turnSin[i]! - meanSin);
    beamH += cos * (spotH[i]! - meanH) + sin * (spotV[i]! - meanV);
    beamV += cos * (spotV[i]! - meanV) - sin * (spotH[i]! - meanH);
  }
  return { beamH: beamH / spread, beamV: beamV / spread, meanH, meanV };
}

/** Weights, their sum, mean turn and weighted spread of the turns. */
export function turnsOf({ turnCos, turnSin, uMm }: Pick<TargetReadings, "turnCos" | "turnSin" | "uMm">) {
  const weight = Float64Array.from(turnCos, (_, i) => (uMm === null ? 1 : 1 / uMm[i]! ** 2));
  const weightSum = weight.reduce((sum, w) => sum + w, 0);
  const meanCos = weightedMean(turnCos, weight, weightSum);
  const meanSin = weightedMean(turnSin, weight, weightSum);
  let spread = 0;
  for (let i = 0; i < weight.length; i++) {
    spread += weight[i]! * ((turnCos[i]! - meanCos) ** 2 + (turnSin[i]! - meanSin) ** 2);
  }
  return { weight, weightSum, meanCos, meanSin, spread };
}

function weightedMean(column: Float64Array, weight: Float64Array, weightSum: number): number {
  let sum = 0;
  for (let i = 0; i < column.length; i++) sum += weight[i]! * column[i]!;
  return sum / weightSum;
}
