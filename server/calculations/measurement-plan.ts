import {
  measurementPlanRequest,
  type BoreMeasurementPlan,
  type CentrePredictionAnswer,
  type MeasurementPlanRequest,
  type PlannedBoreRequest,
} from "../../shared/schemas/measurement-plans.ts";
import { convertersFor, type Converter, type Units } from "../../shared/units.ts";
import { warnRedundancy, warnWeak } from "../compute/bore/fit-warnings.ts";
import { suffices } from "../compute/planning/demands.ts";
import type { PlanInput } from "../compute/planning/plan-input.ts";
import { planMeasurement, type MeasurementPlan } from "../compute/planning/plan-measurement.ts";
import type { Prediction } from "../compute/planning/predict-centre.ts";
import { CalculationRefusal, type CalculationKind } from "./calculation-kind.ts";
import { computeEach } from "./collect-faults.ts";
import { measurementPlanFaults } from "./measurement-plan-faults.ts";
import { placesOf, planInputOf } from "./measurement-plan-input.ts";
import { writeCovariance } from "./write-plane.ts";

interface MeasurementPlanAnswer {
  readonly units: Units;
  readonly level: number;
  readonly result: { readonly bores: readonly BoreMeasurementPlan[] };
}

const levelDefault = 0.95;
/** Places planned in less time than a thread takes to be worth it. */
const placesInPlace = 100;

/** POST /v1/measurement-plans: how certain readings make a centre, and where to read more. */
export const measurementPlanKind: CalculationKind<MeasurementPlanRequest, MeasurementPlanAnswer> = {
  kind: "measurement-plan",
  request: measurementPlanRequest,
  answer(request) {
    const faults = measurementPlanFaults(request);
    if (faults.length > 0) throw new CalculationRefusal(faults);
    const { units, bores, level = levelDefault } = request;
    const { offset } = convertersFor(units);
    return {
      units,
      level,
      result: { bores: computeEach(bores, ["bores"], (bore) => planOne(bore, request, offset)) },
    };
  },
  isLong: ({ bores }) =>
    bores.reduce((sum, { reachable }) => sum + (reachable ? placesOf(reachable).length : 0), 0) >
    placesInPlace,
  faultsBesideSchema: measurementPlanFaults,
};

function planOne(
  bore: PlannedBoreRequest,
  request: MeasurementPlanRequest,
  offset: Converter,
): BoreMeasurementPlan {
  const wanted = bore.wanted ?? request.wanted;
  if (!wanted) throw new RangeError("A bore without anything wanted is refused before it is planned.");
  const input = planInputOf(bore, wanted, request, request.bores.length, offset);
  const plan = planMeasurement(input);
  const { now, added, addedCount, planned, best, least } = plan;
  return {
    id: bore.id,
    form: bore.form,
    wanted:
      input.wanted.form === "radial"
        ? { radial: offset.fromMm(input.wanted.radialMm) }
        : { h: offset.fromMm(input.wanted.hMm), v: offset.fromMm(input.wanted.vMm) },
    status: plan.status,
    now: now && writePrediction(now, offset),
    add: added.map(({ clockDeg, readings }) => ({ clockDeg, readings })),
    addCount: addedCount,
    after: planned && writePrediction(planned, offset),
    best: writePrediction(best, offset),
    least: least && { ...least, proved: least.count === addedCount },
    evenRingReadings: plan.evenRingReadings,
    warnings: warningsOf(input, plan),
  };
}

function writePrediction(prediction: Prediction, offset: Converter): CentrePredictionAnswer {
  const { readings, covariance, expanded, ratio, evenRingMm, dilution } = prediction;
  return {
    readings,
    covariance: writeCovariance(covariance, offset),
    expandedUncertainty: {
      h: offset.fromMm(expanded.hMm),
      v: offset.fromMm(expanded.vMm),
      radial: offset.fromMm(expanded.radialMm),
      k: expanded.k,
      kRadial: expanded.kRadial,
    },
    ratio,
    suffices: suffices(ratio ** 2),
    evenRing: { uncertainty: offset.fromMm(evenRingMm), dilution },
  };
}

/** What to know before the plan is carried out. */
function warningsOf(
  { form }: PlanInput,
  { planned, added }: MeasurementPlan,
): BoreMeasurementPlan["warnings"] {
  if (planned === null) return [];
  const redundancy = form === "wall" ? planned.readings - 3 : 2 * planned.readings - 4;
  const repeated = added.some(({ readings }) => readings > 1);
  return [
    ...warnWeak(planned.dilution, form === "wall" ? "weak_arc" : "weak_angles"),
    ...warnRedundancy(redundancy),
    ...(repeated
      ? [
          {
            code: "repeats_at_one_place",
            detail:
              "Readings repeated at one place average the instrument only: what the bore is out of round there stays in each of them.",
          },
        ]
      : []),
  ];
}
