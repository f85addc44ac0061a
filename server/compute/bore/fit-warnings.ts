import { chiSquareQuantile } from "../statistics/chi-square.ts";
import { rememberPairs } from "../statistics/remember-pairs.ts";
import type { FitWarning } from "./bore-fit.ts";

/** Times the centre uncertainty of an even full ring from which an arc is called weak. */
const weakDilution = 3;
/** Share of the scatter, or of 1e-9 radius where there is none, that a number spacing may reach. */
const spacingShare = 1 / 20;
const scatterFloor = 1e-9;
/** Probability with which sound readings stay below the limit of χ². */
const scatterLevel = 0.95;
/** Readings below which one more or less decides what the outlier rule does. */
const outlierReadings = 8;
/** Bores wear and deform by far less than this share of their diameter; units and slips differ by more. */
const nominalShare = 0.05;

const quantileOf = rememberPairs(chiSquareQuantile);

/** The centre is known much worse than its number of readings would give on an even full ring. */
export function warnWeak(dilution: number, code: "weak_arc" | "weak_angles"): FitWarning[] {
  if (!(dilution > weakDilution)) return [];
  const even = code === "weak_arc" ? "readings evenly round the bore" : "spots evenly round a turn";
  const detail = `The centre's worst uncertainty is ${dilution.toPrecision(3)} times that of as many ${even}.`;
  return [{ code, detail }];
}

/** Nothing is left over to check the readings by. */
export function warnRedundancy(redundancy: number): FitWarning[] {
  if (redundancy > 0) return [];
  return [
    {
      code: "no_redundancy",
      detail:
        "There are as many unknowns as readings: the fit passes through all of them and shows no error.",
    },
  ];
}

/** The readings scatter more than their stated uncertainties let expect. */
export function warnScatter(chiSquare: number | null, redundancy: number): FitWarning[] {
  // The quantile lies above the mean, which is the redundancy. With none left over χ² is rounding and has no quantile.
  if (chiSquare === null || redundancy === 0 || chiSquare <= redundancy) return [];
  const limit = quantileOf(scatterLevel, redundancy);
  if (chiSquare <= limit) return [];
  const detail = `Chi-square ${chiSquare.toPrecision(4)} passes ${limit.toPrecision(4)}, its ${scatterLevel} quantile for ${redundancy} degrees of freedom: readings or stated uncertainties are in doubt; the covariance is enlarged.`;
  return [{ code: "scatter_exceeds_uncertainty", detail }];
}

/** The coordinates are so large that neighbouring numbers stand apart by a good part of the scatter. */
export function warnResolution(spacingMm: number, rmsMm: number, radiusMm: number): FitWarning[] {
  if (spacingMm <= spacingShare * Math.max(rmsMm, scatterFloor * radiusMm)) return [];
  return [
    {
      code: "readings_at_number_resolution",
      detail:
        "The coordinates are so far from their origin that a 64-bit number cannot resolve the scatter: use a nearer origin.",
    },
  ];
}

/** Readings were put aside, or the rule had few to judge by. */
export function warnOutliers(excluded: number, readings: number): FitWarning[] {
  const warnings: FitWarning[] = [];
  if (excluded > 0) {
    const detail = `${excluded} of ${readings} readings were put aside by the outlier rule; see exclusions.`;
    warnings.push({ code: "readings_excluded", detail });
  }
  if (readings < outlierReadings) {
    const detail = `With fewer than ${outlierReadings} readings the outlier rule cannot tell a slip from the shape of the bore.`;
    warnings.push({ code: "few_readings_for_outliers", detail });
  }
  return warnings;
}

/** The diameter found is not that of the bore named: a unit, a radius for a diameter, another bore. */
export function warnNominal(diameterMm: number | null, nominalMm: number | null): FitWarning[] {
  if (diameterMm === null || nominalMm === null) return [];
  const share = diameterMm / nominalMm - 1;
  if (Math.abs(share) <= nominalShare) return [];
  return [
    {
      code: "diameter_far_from_nominal",
      detail: `The diameter found differs from the nominal one by ${(100 * share).toPrecision(3)} %: check units, sense and the bore.`,
    },
  ];
}
