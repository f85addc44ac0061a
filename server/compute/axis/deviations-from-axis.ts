import type { PlaneVector } from "../plane.ts";
import type { AxisInput } from "./axis-input.ts";
import type { AxisDeviations, PerPlane } from "./axis-result.ts";
import { describeAxis } from "./describe-axis.ts";
import { describeStation } from "./describe-station.ts";
import { errorSources, noError, variancesOf, type ErrorSource, type Scatter } from "./error-source.ts";
import { findFaults, isContactMethod } from "./find-faults.ts";
import { fitPlane, type PlaneFit, type PlaneFits } from "./fit-plane.ts";
import { leastSquaresGains, noGains, twoStationGains, type LineGains } from "./line-gains.ts";
import { fitOptimalAxis } from "./optimal-axis.ts";
import { propagateErrors } from "./propagate-errors.ts";

/**
 * The reference axis, h = a + b·z and v = c + d·z through (centre − target) of the reference stations, and every
 * station's deviation from it with covariance, degrees of freedom and verdict.
 *
 * two_station passes through both. least_squares weighs each plane by 1/variance (centre and target together) when
 * every reference station states a covariance, else alike, and then takes the scatter s of each plane from its
 * residuals, n − 2 degrees of freedom. minimum_zone and least_absolute: see `fitOptimalAxis`; there G holds the contact
 * stations fixed, and only theirs need a covariance. line_of_sight is the beam itself. Axis = G·observations, deviation =
 * A·observations, covariance A·Σ·Aᵀ with the h–v terms: a reference station's deviation is correlated with the axis
 * that it helped to set. Lengths in mm. O(stations × reference stations).
 * @throws ComputeError the first of `findFaults`; rank_deficient; not_converged; result_overflow
 */
export function deviationsFromAxis(input: AxisInput): AxisDeviations {
  const [fault] = findFaults(input);
  if (fault) throw fault;
  const { reference, stations } = input;
  const optimal = isContactMethod(input.method) ? fitOptimalAxis(input) : null;
  const fits = optimal?.fits ?? fitBothPlanes(input);
  const allStated = reference.every((index) => stations[index]!.covariance);
  const scatter = allStated || optimal ? null : scatterOf(reference, fits);
  const sources = errorSources(input, scatter);
  const referenceSources = sourcesOfAxis(
    fits,
    reference.map((index) => sources[index] ?? null),
  );
  const errorOf = referenceSources && propagateErrors(fits, referenceSources);
  const placeInReference = new Map(reference.map((index, place) => [index, place]));
  return {
    axis: describeAxis(input, fits, scatter, referenceSources, optimal?.optimum ?? null),
    stations: stations.map((station, index) => {
      const source = sources[index];
      const place = placeInReference.get(index) ?? null;
      const error = source && errorOf ? errorOf(station.zMm, source, place) : null;
      return describeStation(input, fits, index, place !== null, error);
    }),
  };
}

/**
 * The errors of the reference stations; null when that of a station with a part in the axis is not known. A station
 * without any part needs none.
 */
function sourcesOfAxis(
  fits: PlaneFits,
  references: readonly (ErrorSource | null)[],
): readonly ErrorSource[] | null {
  const gains = [fits.h.gains, fits.v.gains, fits.h.crossGains, fits.v.crossGains];
  const hasPart = (place: number) =>
    gains.some((one) => one !== null && (one.shares[place] !== 0 || one.moments[place] !== 0));
  const known = references.flatMap((source, place) => source ?? (hasPart(place) ? [] : noError));
  return known.length === references.length ? known : null;
}

function fitBothPlanes(input: AxisInput): PlaneFits {
  const { reference, stations } = input;
  const zMm = stations.map((station) => station.zMm);
  const gains = gainsOfMethod(input);
  const observed = (member: keyof PlaneVector) =>
    stations.map(({ centre, target }) => centre[member] - target[member]);
  return {
    h: fitPlane(gains.h, reference, zMm, observed("hMm")),
    v: fitPlane(gains.v, reference, zMm, observed("vMm")),
  };
}

/**
 * Gains of a line that is linear in the observations: two_station, least_squares and line_of_sight.
 * @throws ComputeError rank_deficient
 */
export function gainsOfMethod({ method, reference, stations }: AxisInput): Record<keyof PerPlane, LineGains> {
  const at = reference.map((index) => stations[index]!);
  const zMm = at.map((station) => station.zMm);
  if (method === "line_of_sight") return { h: noGains, v: noGains };
  // Two stations leave least squares no choice, whatever their weights; this way it meets them exactly.
  if (reference.length === 2) {
    const both = twoStationGains(zMm[0]!, zMm[1]!);
    return { h: both, v: both };
  }
  const alike = { h: 1, v: 1 };
  const variances = at.map((station) => variancesOf(station) ?? alike);
  return {
    h: leastSquaresGains(
      zMm,
      variances.map(({ h }) => h),
    ),
    v: leastSquaresGains(
      zMm,
      variances.map(({ v }) => v),
    ),
  };
}

/** s of each plane; null when no station is left over to show it. */
function scatterOf(reference: readonly number[], fits: PlaneFits): Scatter | null {
  const dof = reference.length - 2;
  if (dof < 1) return null;
  const of = ({ deviationsMm }: PlaneFit) =>
    Math.hypot(...reference.map((index) => deviationsMm[index]!)) / Math.sqrt(dof);
  return { mm: { h: of(fits.h), v: of(fits.v) }, dof };
}
