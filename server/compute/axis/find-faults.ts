import { ComputeError, type ComputeErrorCode } from "../compute-error.ts";
import { findToleranceFaults } from "../conformity/find-tolerance-faults.ts";
import { isCovariance } from "../conformity/is-covariance.ts";
import { variancesOf } from "./error-source.ts";
import type { AxisInput, AxisMethod, AxisStation } from "./axis-input.ts";

/** Reference stations nearer than this share of their distance from z = 0 differ in the last digits only. */
const relativeSpanMin = 1e-12;
/** A picometre: no station is placed to it. */
const spanMinMm = 1e-9;

/** Least and most reference stations of each method. */
const referenceCounts: Readonly<Record<AxisMethod, { readonly min: number; readonly max: number }>> = {
  two_station: { min: 2, max: 2 },
  least_squares: { min: 2, max: Infinity },
  minimum_zone: { min: 3, max: Infinity },
  least_absolute: { min: 3, max: Infinity },
  line_of_sight: { min: 0, max: 0 },
};

/** Whether the stations that touch the zone, or that the axis passes through, set the axis: covariances weigh nothing. */
export function isContactMethod(method: AxisMethod): method is "minimum_zone" | "least_absolute" {
  return method === "minimum_zone" || method === "least_absolute";
}

/** Everything that is wrong with an axis input, each at its place; empty when it can be computed. */
export function findFaults(input: AxisInput): ComputeError[] {
  return [
    ...findMethodFaults(input.method, input.reference.length),
    ...input.stations.flatMap((station, index) => findStationFaults(station, index)),
    ...findReferenceFaults(
      input.method,
      input.reference.map((index) => ({ index, station: input.stations[index]! })),
    ),
  ];
}

/** What the method alone refuses: its number of reference stations. */
export function findMethodFaults(method: AxisMethod, referenceCount: number): ComputeError[] {
  const { min, max } = referenceCounts[method];
  if (referenceCount >= min && referenceCount <= max) return [];
  const wanted = min === max ? String(min) : `${min} or more`;
  const detail = `${method} takes ${wanted} reference stations; ${referenceCount} named.`;
  return [new ComputeError("reference_count", detail, { at: ["axis", "through"] })];
}

/** What one station refuses whatever the axis: its covariance and its tolerance. */
export function findStationFaults(station: AxisStation, index: number): ComputeError[] {
  const sound = !station.covariance || isCovariance(station.covariance);
  const toleranceFaults = station.tolerance ? findToleranceFaults(station.tolerance) : [];
  return [
    ...(sound
      ? []
      : [
          covarianceFault(
            "covariance_not_positive",
            "A covariance has variances of 0 or more, and a correlation within plus or minus 1.",
            index,
          ),
        ]),
    ...toleranceFaults.map(
      ({ code, message, details }) =>
        new ComputeError(code, message, { at: ["stations", index, ...(details.at ?? [])] }),
    ),
  ];
}

/** A reference station and its place among the stations sent. */
export interface ReferenceStation {
  readonly index: number;
  readonly station: AxisStation;
}

/** What the reference stations refuse together: weights for some only, weights without limit, no span. */
export function findReferenceFaults(
  method: AxisMethod,
  references: readonly ReferenceStation[],
): ComputeError[] {
  const weighs = method === "two_station" || method === "least_squares";
  const unstated = references.filter(({ station }) => !station.covariance);
  const incomplete = weighs && unstated.length < references.length ? unstated : [];
  const unweighted = isContactMethod(method)
    ? references.filter(({ station }) => (station.weight ?? null) === null)
    : [];
  const weightsIncomplete = unweighted.length < references.length ? unweighted : [];
  const weightless =
    method === "least_squares" ? references.filter(({ station }) => hasZeroVariance(station)) : [];
  return [
    ...incomplete.map(({ index }) =>
      covarianceFault(
        "weights_incomplete",
        "Covariances are given for other reference stations, not for this one.",
        index,
      ),
    ),
    ...weightsIncomplete.map(
      ({ index }) =>
        new ComputeError(
          "weights_incomplete",
          "A weight is given for other reference stations, not for this one.",
          { at: ["stations", index, "weight"] },
        ),
    ),
    ...weightless.map(({ index }) =>
      covarianceFault(
        "covariance_not_positive",
        "The weight is 1/variance: the variance of centre and target together is above 0 in h and in v.",
        index,
      ),
    ),
    ...(references.length >= 2 && !hasSpan(references) ? [noSpan()] : []),
  ];
}

function covarianceFault(code: ComputeErrorCode, detail: string, index: number): ComputeError {
  return new ComputeError(code, detail, { at: ["stations", index, "covariance"] });
}

function noSpan(): ComputeError {
  const detail = "The reference stations stand at one z: no line is determined.";
  return new ComputeError("stations_coincident", detail, { at: ["axis", "through"] });
}

function hasSpan(references: readonly ReferenceStation[]): boolean {
  const z = references.map(({ station }) => station.zMm);
  const spanMm = Math.max(...z) - Math.min(...z);
  return spanMm > Math.max(spanMinMm, relativeSpanMin * Math.max(...z.map(Math.abs)));
}

function hasZeroVariance(station: AxisStation): boolean {
  const variances = variancesOf(station);
  return variances !== null && (variances.h === 0 || variances.v === 0);
}
