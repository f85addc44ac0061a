import type { BoreFitResult, BoreRequest } from "../../shared/schemas/bore-fits.ts";
import type { Converter, Dimension } from "../../shared/units.ts";
import type { BoreFit } from "../compute/bore/bore-fit.ts";
import type { PlaneVector } from "../compute/plane.ts";
import type { Reduction } from "./bore-temperature.ts";

type Converters = Record<Dimension, Converter>;

/** A fit in the units of the call: diameters in bore units, the rest in offset units; at 20 °C too where it is `reduced`. */
export function boreAnswerOf(
  bore: BoreRequest,
  fit: BoreFit,
  convert: Converters,
  reduced: Reduction | null,
): BoreFitResult {
  const { offset } = convert;
  return {
    id: bore.id,
    form: bore.form,
    method: bore.method ?? "least_squares",
    centre: pairOf(fit.centre, offset),
    ...ofWall(fit, convert),
    ...at20C(fit, reduced, convert),
    covariance: covarianceOf(fit, offset),
    expandedUncertainty: uncertaintyOf(fit, offset),
    contacts: fit.form === "rotating_target" || !fit.contacts ? null : [...fit.contacts],
    ellipse: ellipseOf(fit, reduced, convert),
    statistics: statisticsOf(fit, offset),
    warnings: [...fit.warnings, ...(reduced?.warnings ?? [])].map(({ code, detail }) => ({ code, detail })),
  };
}

/** What only points on a wall can tell; null or empty for the spots of a target. */
function ofWall(fit: BoreFit, { axial, bore, offset }: Converters) {
  if (fit.form === "rotating_target") {
    return {
      diameter: null,
      roundness: null,
      residuals: fit.residualsMm.map((residual) => pairOf(residual, offset)),
      used: fit.residualsMm.map(() => true),
      exclusions: [],
      arc: null,
      taper: null,
      tilt: null,
    };
  }
  const { diameterMm, tilt } = fit;
  // mm per mm → offset units per axial unit
  const slopeOf = (slope: number) => plain(offset.fromMm(axial.toMm(slope)));
  return {
    diameter: diameterMm === null ? null : bore.fromMm(diameterMm),
    roundness: offset.fromMm(fit.roundnessMm),
    residuals: fit.residualsMm.map((residualMm) => plain(offset.fromMm(residualMm))),
    used: [...fit.used],
    exclusions: fit.exclusions.map(({ index, ratio }) => ({ index, ratio })),
    arc: { ...fit.arc },
    taper: fit.taper === null ? null : { ...fit.taper },
    tilt: tilt === null ? null : { h: slopeOf(tilt.h), v: slopeOf(tilt.v) },
  };
}

/** The diameter at 20 °C and what was applied to it; nothing where no temperature was stated. */
function at20C(fit: BoreFit, reduced: Reduction | null, { bore, offset }: Converters) {
  if (reduced === null) return {};
  const { factor, gaugeCoefficient, partCoefficient } = reduced;
  const readMm = fit.form === "rotating_target" ? null : fit.diameterMm;
  return {
    diameterAt20C: readMm === null ? null : bore.fromMm(readMm * factor),
    temperatureCorrection: {
      factor,
      diameter: readMm === null ? null : plain(offset.fromMm(readMm * (factor - 1))),
      gaugeCoefficient,
      partCoefficient,
    },
  };
}

function ellipseOf(
  fit: BoreFit,
  reduced: Reduction | null,
  { bore, offset }: Converters,
): BoreFitResult["ellipse"] {
  if (fit.form === "rotating_target" || !fit.ellipse) return null;
  const { majorMm, minorMm, ovalityMm, ovalityExpandedMm, majorClockDeg } = fit.ellipse;
  const inBore = (lengthMm: number | null, factor = 1) =>
    lengthMm === null ? null : bore.fromMm(lengthMm * factor);
  return {
    major: inBore(majorMm),
    minor: inBore(minorMm),
    ...(reduced === null
      ? {}
      : { majorAt20C: inBore(majorMm, reduced.factor), minorAt20C: inBore(minorMm, reduced.factor) }),
    ovality: offset.fromMm(ovalityMm),
    ovalityExpandedUncertainty: ovalityExpandedMm === null ? null : offset.fromMm(ovalityExpandedMm),
    majorClockDeg,
  };
}

function covarianceOf({ covariance }: BoreFit, offset: Converter): number[][] | null {
  if (covariance === null) return null;
  const hv = plain(offset.squareFromMm2(covariance.hvMm2));
  return [
    [offset.squareFromMm2(covariance.hhMm2), hv],
    [hv, offset.squareFromMm2(covariance.vvMm2)],
  ];
}

function uncertaintyOf({ expandedUncertainty }: BoreFit, offset: Converter) {
  if (expandedUncertainty === null) return null;
  const { hMm, vMm, diameterMm, factor, dof, level } = expandedUncertainty;
  return {
    h: offset.fromMm(hMm),
    v: offset.fromMm(vMm),
    diameter: diameterMm === null ? null : offset.fromMm(diameterMm),
    k: factor,
    dof,
    level,
  };
}

function statisticsOf({ statistics }: BoreFit, offset: Converter) {
  const { rmsMm, ...plainNumbers } = statistics;
  return { ...plainNumbers, rms: offset.fromMm(rmsMm) };
}

function pairOf({ hMm, vMm }: PlaneVector, offset: Converter) {
  return { h: plain(offset.fromMm(hMm)), v: plain(offset.fromMm(vMm)) };
}

/** Without the sign of a negative zero, which JSON drops: an answer is the same before and after it was stored. */
function plain(value: number): number {
  return value + 0;
}
