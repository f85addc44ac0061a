import type { BoreFitResult, BoreRequest } from "../../shared/schemas/bore-fits.ts";
import type { Converter, Dimension } from "../../shared/units.ts";
import type { BoreFit } from "../compute/bore/bore-fit.ts";
import type { PlaneVector } from "../compute/plane.ts";

type Converters = Record<Dimension, Converter>;

/** A fit in the units of the call: diameters in bore units, the rest in offset units. */
export function boreAnswerOf(bore: BoreRequest, fit: BoreFit, convert: Converters): BoreFitResult {
  const { offset } = convert;
  return {
    id: bore.id,
    form: bore.form,
    method: bore.method ?? "least_squares",
    centre: pairOf(fit.centre, offset),
    ...ofWall(fit, convert),
    covariance: covarianceOf(fit, offset),
    expandedUncertainty: uncertaintyOf(fit, offset),
    contacts: fit.form === "rotating_target" || !fit.contacts ? null : [...fit.contacts],
    ellipse: ellipseOf(fit, convert),
    statistics: statisticsOf(fit, offset),
    warnings: fit.warnings.map(({ code, detail }) => ({ code, detail })),
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

function ellipseOf(fit: BoreFit, { bore, offset }: Converters): BoreFitResult["ellipse"] {
  if (fit.form === "rotating_target" || !fit.ellipse) return null;
  const { majorMm, minorMm, ovalityMm, ovalityExpandedMm, majorClockDeg } = fit.ellipse;
  return {
    major: majorMm === null ? null : bore.fromMm(majorMm),
    minor: minorMm === null ? null : bore.fromMm(minorMm),
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
