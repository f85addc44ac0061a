import { lineResidual } from "../linear-algebra/line-residual.ts";
import { fitLine, type Line } from "./fit-line.ts";
import { coefficientGains, writeGainsAt, type LineGains } from "./line-gains.ts";

/** The axis in one plane, and how far every station lies from it. */
export interface PlaneFit {
  readonly gains: LineGains;
  /** Gains of the other plane's observations; null where the planes are fitted apart. */
  readonly crossGains: LineGains | null;
  readonly line: Line;
  /** observed − axis, one for each station, mm. */
  readonly deviationsMm: Float64Array;
}

/** As of one plane: the line, its rounding error, what that left on long spans. */
const coupledPasses = 3;

export interface PlaneFits {
  readonly h: PlaneFit;
  readonly v: PlaneFit;
}

/**
 * Fits the line of `gains` through the reference stations and measures every station from it. Deviations are taken
 * from the residuals of the rounded line and its remaining error, so that they keep their digits at any z, and are
 * exactly 0 where a line passes through its stations. O(stations × reference stations).
 */
export function fitPlane(
  gains: LineGains,
  reference: readonly number[],
  zMm: readonly number[],
  observedMm: readonly number[],
): PlaneFit {
  const line = fitLine(
    gains,
    reference.map((index) => zMm[index]!),
    reference.map((index) => observedMm[index]!),
  );
  const residuals = zMm.map((z, i) => lineResidual(observedMm[i]!, line.at0Mm, line.slope, z));
  const gainsHere = new Float64Array(reference.length);
  const deviationsMm = Float64Array.from(zMm, (z, i) => {
    writeGainsAt(gains, z, gainsHere);
    let rest = 0;
    for (let j = 0; j < gainsHere.length; j += 1) rest += gainsHere[j]! * residuals[reference[j]!]!;
    return residuals[i]! - rest;
  });
  return { gains, crossGains: null, line, deviationsMm };
}

/** Gains of both planes' observations in the axis of both planes: own and cross. */
export interface CoupledGains {
  readonly own: LineGains;
  readonly cross: LineGains;
}

/**
 * `fitPlane` for an axis whose lines each depend on the observations of both planes. Such gains are the derivatives of
 * an axis that scales and shifts with its observations: so it is their sum too (Euler's theorem on homogeneous
 * functions), and gains times the deviations of the reference stations are 0. O(stations × reference stations).
 */
export function fitCoupledPlanes(
  gains: { readonly h: CoupledGains; readonly v: CoupledGains },
  reference: readonly number[],
  zMm: readonly number[],
  observedMm: { readonly h: readonly number[]; readonly v: readonly number[] },
): PlaneFits {
  let lines = { h: { at0Mm: 0, slope: 0 }, v: { at0Mm: 0, slope: 0 } };
  const residualsOf = (plane: "h" | "v", places: readonly number[]) =>
    places.map((i) => lineResidual(observedMm[plane][i]!, lines[plane].at0Mm, lines[plane].slope, zMm[i]!));
  for (let pass = 0; pass < coupledPasses; pass += 1) {
    const left = { h: residualsOf("h", reference), v: residualsOf("v", reference) };
    const corrected = (plane: "h" | "v", other: "h" | "v") => {
      const own = coefficientGains(gains[plane].own);
      const cross = coefficientGains(gains[plane].cross);
      const change = (member: "at0" | "slope") =>
        left[plane].reduce((sum, value, j) => sum + own[member][j]! * value, 0) +
        left[other].reduce((sum, value, j) => sum + cross[member][j]! * value, 0);
      return { at0Mm: lines[plane].at0Mm + change("at0"), slope: lines[plane].slope + change("slope") };
    };
    lines = { h: corrected("h", "v"), v: corrected("v", "h") };
  }
  const all = [...zMm.keys()];
  const residuals = { h: residualsOf("h", all), v: residualsOf("v", all) };
  const fit = (plane: "h" | "v", other: "h" | "v"): PlaneFit => {
    const { own, cross } = gains[plane];
    const [ownHere, crossHere] = [new Float64Array(reference.length), new Float64Array(reference.length)];
    const deviationsMm = Float64Array.from(zMm, (z, i) => {
      writeGainsAt(own, z, ownHere);
      writeGainsAt(cross, z, crossHere);
      let rest = 0;
      for (let j = 0; j < reference.length; j += 1) {
        rest +=
          ownHere[j]! * residuals[plane][reference[j]!]! + crossHere[j]! * residuals[other][reference[j]!]!;
      }
      return residuals[plane][i]! - rest;
    });
    return { gains: own, crossGains: cross, line: lines[plane], deviationsMm };
  };
  return { h: fit("h", "v"), v: fit("v", "h") };
}
