import {
  repeatabilityStudyRequest,
  type OneStationStudyRequest,
  type RepeatabilityStudyRequest,
  type RepeatabilityStudyResult,
} from "../../shared/schemas/repeatability-studies.ts";
import type { OneStationResult } from "../../shared/schemas/repeatability-answers.ts";
import { convertersFor, type Converter, type Units } from "../../shared/units.ts";
import type { Tolerance } from "../compute/conformity/tolerance.ts";
import type { PlaneCovariance } from "../compute/plane.ts";
import { describeRepeats } from "../compute/repeatability/describe-repeats.ts";
import type { Drift, SlopeTest } from "../compute/repeatability/drift.ts";
import { shareOfTolerance } from "../compute/repeatability/share-of-tolerance.ts";
import { CalculationRefusal, type CalculationKind } from "./calculation-kind.ts";
import { readTolerance } from "./read-tolerance.ts";
import { readVector } from "./read-vector.ts";
import { crossedAnswer } from "./repeatability-crossed.ts";
import {
  repeatabilityStudyFaults,
  repeatabilityStudyFaultsBesideSchema,
} from "./repeatability-study-faults.ts";
import { repeatsWarnings } from "./repeatability-words.ts";
import { writeCovariance, writeVector } from "./write-plane.ts";

interface RepeatabilityStudyAnswer {
  readonly units: Units;
  readonly level: number;
  readonly result: RepeatabilityStudyResult;
}

const levelDefault = 0.95;
const msPerHour = 3_600_000;

/** POST /v1/repeatability-studies: how well one station repeats, or what people and repeats add to a reading. */
export const repeatabilityStudyKind: CalculationKind<RepeatabilityStudyRequest, RepeatabilityStudyAnswer> = {
  kind: "repeatability-study",
  request: repeatabilityStudyRequest,
  answer(request) {
    const faults = repeatabilityStudyFaults(request);
    if (faults.length > 0) throw new CalculationRefusal(faults);
    const level = request.level ?? levelDefault;
    const { offset } = convertersFor(request.units);
    const tolerance = request.tolerance ? readTolerance(request.tolerance, offset) : null;
    const result =
      request.form === "one_station"
        ? oneStation(request, level, tolerance, offset)
        : crossedAnswer(request, level, tolerance, offset);
    return { units: request.units, level, result };
  },
  faultsBesideSchema: repeatabilityStudyFaultsBesideSchema,
};

function oneStation(
  { station, readings }: OneStationStudyRequest,
  level: number,
  tolerance: Tolerance | null,
  offset: Converter,
): OneStationResult {
  const timed = readings[0]?.at !== undefined;
  const start = Date.parse(readings[0]?.at ?? "");
  const found = describeRepeats({
    readings: readings.map((reading) => readVector(reading, offset)),
    times: readings.map(({ at }, index) => (timed ? (Date.parse(at ?? "") - start) / msPerHour : index)),
    level,
  });
  const { covariance, meanCovariance, expandedUncertainty: expanded } = found;
  const share =
    tolerance && shareOfTolerance({ hMm2: covariance.hhMm2, vMm2: covariance.vvMm2, covariance }, tolerance);
  return {
    form: "one_station",
    station,
    count: readings.length,
    mean: writeVector(found.mean, offset),
    standardDeviation: rootsOf(covariance, offset),
    covariance: writeCovariance(covariance, offset),
    uncertainty: rootsOf(meanCovariance, offset),
    meanCovariance: writeCovariance(meanCovariance, offset),
    dof: found.dof,
    expandedUncertainty: {
      h: offset.fromMm(expanded.hMm),
      v: offset.fromMm(expanded.vMm),
      radial: expanded.radialMm === null ? null : offset.fromMm(expanded.radialMm),
      k: expanded.k,
      kRadial: expanded.kRadial,
    },
    drift: found.drift && writeDrift(found.drift, timed ? "hour" : "reading", offset),
    autocorrelation: found.autocorrelation,
    farthest: found.farthest,
    percentOfTolerance: share,
    warnings: repeatsWarnings(found, readings.length, level, share),
  };
}

function writeDrift(
  { h, v, dof, together }: Drift,
  per: "hour" | "reading",
  offset: Converter,
): OneStationResult["drift"] {
  const slope = ({ slopeMm, standardErrorMm, ...test }: SlopeTest) => ({
    slope: offset.fromMm(slopeMm),
    standardError: offset.fromMm(standardErrorMm),
    ...test,
  });
  return { per, dof, h: slope(h), v: slope(v), together };
}

function rootsOf({ hhMm2, vvMm2 }: PlaneCovariance, offset: Converter): { h: number; v: number } {
  return { h: offset.fromMm(Math.sqrt(hhMm2)), v: offset.fromMm(Math.sqrt(vvMm2)) };
}
