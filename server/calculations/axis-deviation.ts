import {
  axisDeviationRequest,
  type AxisDeviationRequest,
  type AxisDeviationResult,
} from "../../shared/schemas/axis-deviations.ts";
import { convertersFor, type Converter, type Dimension, type Units } from "../../shared/units.ts";
import type { Axis, AxisDeviations, Matrix2, StationDeviation } from "../compute/axis/axis-result.ts";
import { runAxisTrials, type AxisTrials } from "../compute/axis/axis-trials.ts";
import type { AxisInput } from "../compute/axis/axis-input.ts";
import { deviationsFromAxis } from "../compute/axis/deviations-from-axis.ts";
import { axisDeviationFaults, axisDeviationFaultsBesideSchema } from "./axis-deviation-faults.ts";
import { readAxisStation } from "./axis-deviation-input.ts";
import { answerOptimum } from "./axis-optimum-answer.ts";
import { CalculationRefusal, type CalculationKind } from "./calculation-kind.ts";
import { answerStationTrials, readTrialPlan } from "./monte-carlo-answer.ts";
import { levelDefault } from "./monte-carlo-faults.ts";
import { writeDeviation } from "./write-deviation.ts";

type Converters = Record<Dimension, Converter>;
type AxisAnswer = AxisDeviationResult["axis"];
type StationAnswer = AxisDeviationResult["stations"][number];

interface AxisDeviationAnswer {
  readonly units: Units;
  readonly level: number;
  readonly result: AxisDeviationResult;
}

/** Reference stations whose covariances are carried through in less time than a thread takes to be worth it. */
const referencesInPlace = 200;

/** POST /v1/axis-deviations: a reference axis, every station's deviation from it, and verdicts. */
export const axisDeviationKind: CalculationKind<AxisDeviationRequest, AxisDeviationAnswer> = {
  kind: "axis-deviation",
  request: axisDeviationRequest,

  answer(request) {
    const faults = axisDeviationFaults(request);
    if (faults.length > 0) throw new CalculationRefusal(faults);
    const { units, axis, stations } = request;
    const level = request.level ?? levelDefault;
    const convert = convertersFor(units);
    const through = axis.through ?? [];
    const input: AxisInput = {
      method: axis.method,
      zone: axis.zone ?? "planes",
      reference: through.map((id) => stations.findIndex((station) => station.id === id)),
      stations: stations.map((station) => readAxisStation(station, convert)),
      level,
      rule: request.verdict?.rule ?? "guarded",
    };
    const found = deviationsFromAxis(input);
    const withTrials = trialsOf(request, input, found, convert);
    const answered = found.stations.map((station, index) =>
      withTrials(answerStation(station, stations[index]!, convert), index),
    );
    const result = {
      axis: answerAxis(found.axis, through, unusedMembers(request), convert),
      stations: answered,
      summary: summarise(found, request),
    };
    return { units, level, result };
  },

  isLong: ({ axis, monteCarlo }) =>
    monteCarlo !== undefined || (axis.through ?? []).length > referencesInPlace,
  faultsBesideSchema: axisDeviationFaultsBesideSchema,
};

/** Adds to each station what the trials say of it, where trials are asked for. */
function trialsOf(
  { monteCarlo, stations }: AxisDeviationRequest,
  input: AxisInput,
  found: AxisDeviations,
  { offset }: Converters,
): (answer: StationAnswer, index: number) => StationAnswer {
  if (!monteCarlo) return (answer) => answer;
  const plan = readTrialPlan(monteCarlo, offset);
  const names = stations.map(({ id }) => id);
  const { stations: tried, failures }: AxisTrials = runAxisTrials(input, found, names, plan);
  return (answer, index) => ({
    ...answer,
    monteCarlo: answerStationTrials(plan, tried[index] ?? null, failures, offset),
  });
}

function answerAxis(
  { method, h, v, covariance, chiSquare, scatterMm, dof, optimum, warnings }: Axis,
  through: string[],
  unused: AxisAnswer["warnings"],
  { axial, offset }: Converters,
): AxisAnswer {
  const mmPerAxial = axial.toMm(1);
  const line = ({ at0Mm, slope }: Axis["h"]) => ({
    at0: offset.fromMm(at0Mm),
    slope: offset.fromMm(slope * mmPerAxial),
  });
  const matrix = ([[aa, ab], [ba, bb]]: Matrix2) => [
    [offset.squareFromMm2(aa), offset.squareFromMm2(ab * mmPerAxial)],
    [offset.squareFromMm2(ba * mmPerAxial), offset.squareFromMm2(bb * mmPerAxial * mmPerAxial)],
  ];
  return {
    method,
    through,
    h: line(h),
    v: line(v),
    covariance: covariance && {
      h: matrix(covariance.h),
      v: matrix(covariance.v),
      hv: matrix(covariance.hv),
    },
    ...(chiSquare ? { chiSquare: { ...chiSquare } } : {}),
    ...(scatterMm ? { scatter: { h: offset.fromMm(scatterMm.h), v: offset.fromMm(scatterMm.v) } } : {}),
    ...(dof === null ? {} : { dof }),
    ...(optimum ? answerOptimum(method, optimum, through, offset) : {}),
    warnings: [...warnings, ...unused],
  };
}

function answerStation(
  { deviation, covariance, expandedUncertainty, verdict, ratio, reference, warnings }: StationDeviation,
  { id, z }: AxisDeviationRequest["stations"][number],
  { offset }: Converters,
): StationAnswer {
  return {
    id,
    z,
    deviation: writeDeviation(deviation, offset),
    expandedUncertainty: expandedUncertainty && {
      h: offset.fromMm(expandedUncertainty.hMm),
      v: offset.fromMm(expandedUncertainty.vMm),
      radial: offset.fromMm(expandedUncertainty.radialMm),
      k: expandedUncertainty.k,
      kRadial: expandedUncertainty.kRadial,
      dof: expandedUncertainty.dof,
    },
    covariance: covariance && [
      [offset.squareFromMm2(covariance.hhMm2), offset.squareFromMm2(covariance.hvMm2)],
      [offset.squareFromMm2(covariance.hvMm2), offset.squareFromMm2(covariance.vvMm2)],
    ],
    verdict,
    ratio,
    reference,
    warnings: [...warnings],
  };
}

function summarise(
  { stations }: AxisDeviations,
  request: AxisDeviationRequest,
): AxisDeviationResult["summary"] {
  const count = (wanted: string) => stations.filter(({ verdict }) => verdict === wanted).length;
  let worst: { id: string; ratio: number } | null = null;
  for (const [index, { ratio }] of stations.entries()) {
    if (ratio !== null && (worst === null || ratio > worst.ratio)) {
      worst = { id: request.stations[index]!.id, ratio };
    }
  }
  return { conforms: count("conforms"), undecided: count("undecided"), exceeds: count("exceeds"), worst };
}

/** Members that say something to another method: told, so that nobody believes they counted. */
function unusedMembers({ axis, stations }: AxisDeviationRequest): AxisAnswer["warnings"] {
  if (axis.method === "minimum_zone" || axis.method === "least_absolute") {
    const idle = stations.some(({ id, weight }) => weight !== undefined && !axis.through?.includes(id));
    return idle ? [{ code: "weights_not_used", detail: "A weight counts at a reference station only." }] : [];
  }
  return [
    ...(axis.zone === "cylinder"
      ? [{ code: "zone_not_used", detail: `${axis.method} has no zone: h and v are fitted apart.` }]
      : []),
    ...(stations.some(({ weight }) => weight !== undefined)
      ? [
          {
            code: "weights_not_used",
            detail: `${axis.method} takes its weights from covariances, not from weight.`,
          },
        ]
      : []),
  ];
}
