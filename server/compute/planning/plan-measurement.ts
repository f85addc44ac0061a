import { ComputeError } from "../compute-error.ts";
import {
  addAll,
  addGreedily,
  dropOne,
  exchange,
  isBetter,
  type Choice,
  type Chosen,
} from "./choose-readings.ts";
import { limitsOf, rounding, suffices, type Limits } from "./demands.ts";
import { frameOf, sumsOfTaken } from "./information.ts";
import { leastCount, type LeastCount } from "./least-count.ts";
import type { PlanInput, TakenReading } from "./plan-input.ts";
import { predictCentre, type Prediction } from "./predict-centre.ts";
import { spreadEvenly } from "./spread-evenly.ts";

/** Centre and radius of a wall; centre and mounting error by spots of two coordinates. */
const fewestReadings = { wall: 3, rotating_target: 2 } as const;

/** How the readings stand to what is wanted. */
export type PlanStatus =
  /** Those taken do. */
  | "suffices"
  /** Those taken and those added do. */
  | "suffices_when_added"
  /** All that can be reached do not. */
  | "out_of_reach"
  /** All that can be reached do, but more than `addedMax` would have to be added, as far as was found. */
  | "too_many_needed";

export interface MeasurementPlan {
  readonly status: PlanStatus;
  /** By the readings taken alone; null where they leave the centre open. */
  readonly now: Prediction | null;
  /** In the order of the places; those with none left out. */
  readonly added: readonly { readonly clockDeg: number; readonly readings: number }[];
  readonly addedCount: number;
  /** By the readings taken and those added; null where `addedMax` are too few to determine the centre. */
  readonly planned: Prediction | null;
  /** By all that can be reached. */
  readonly best: Prediction;
  /** No choice does with fewer; null where none was found to do. */
  readonly least: LeastCount | null;
  /** Readings evenly round the whole bore, none taken before, that would do. */
  readonly evenRingReadings: number;
}

/**
 * Which and how many readings to add so that the centre becomes as certain as wanted. A heuristic: readings are added
 * one by one, each where it lowers the largest variance most; then moved and dropped while that betters them. How far
 * the count can be from the best at most is told by a proved lower bound (`leastCount`); equal to it, it is the best.
 * When nothing does, all that can be reached is added, or the best `addedMax` found. Work: places × (readings added +
 * some hundreds), and at most `exchangesMax` pairs weighed.
 * @throws ComputeError angles_insufficient at places, or at taken where there are none
 */
export function planMeasurement(input: PlanInput): MeasurementPlan {
  const { form, taken, places, uMm, level } = input;
  const limits = limitsOf(input.wanted, level);
  const frame = frameOf([...taken, ...places].map(({ clockDeg }) => clockDeg));
  const choice: Choice = {
    form,
    limits,
    base: sumsOfTaken(taken, frame),
    directions: places.map(({ clockDeg }) => frame.direction(clockDeg)),
    capacity: places.map(({ readingsMax }) => readingsMax),
    weight: 1 / (uMm * uMm),
  };
  const predict = ({ added }: Pick<Chosen, "added">) =>
    predictCentre(readingsOf(input, added), form, limits, level);
  const everything = addAll(choice);
  const best = predict(everything);
  if (best === null) throw anglesRefusal(places.length > 0 ? "places" : "taken");
  const now = predictCentre(taken, form, limits, level);
  const chosen = chooseFor(input, choice, everything, now);
  const isEnough = suffices(chosen.share);
  const least = isEnough ? leastCount(choice, frame.middle, floorOf(input, chosen), chosen.count) : null;
  const kept = least === null ? chosen : shrink(input, choice, chosen, least.count);
  return {
    status: statusOf(kept, isEnough, best),
    now,
    added: places.flatMap(({ clockDeg }, place) =>
      kept.added[place]! > 0 ? [{ clockDeg, readings: kept.added[place]! }] : [],
    ),
    addedCount: kept.count,
    planned: predict(kept),
    best,
    least,
    evenRingReadings: evenRingReadings(input, limits),
  };
}

function chooseFor(input: PlanInput, choice: Choice, everything: Chosen, now: Prediction | null): Chosen {
  if (now !== null && suffices(now.ratio ** 2))
    return { added: choice.directions.map(() => 0), count: 0, share: now.ratio ** 2 };
  if (!suffices(everything.share) && everything.count <= input.addedMax) return everything;
  const greedy = addGreedily(choice, input.addedMax);
  return suffices(greedy.share) ? greedy : exchange(choice, greedy, "enough", { left: input.exchangesMax });
}

/** Fewer readings while they do, then the best of that many that is found: of equals the evenly spread. */
function shrink(input: PlanInput, choice: Choice, chosen: Chosen, least: number): Chosen {
  const clockDegs = input.places.map(({ clockDeg }) => clockDeg);
  const budget = { left: input.exchangesMax };
  const spread = (count: number, wanted: "enough" | "best") =>
    exchange(choice, spreadEvenly(choice, clockDegs, count), wanted, budget);
  let kept = chosen;
  while (kept.count > least && budget.left > 0) {
    const dropped = exchange(choice, dropOne(choice, kept), "enough", budget);
    const fewer = suffices(dropped.share) ? dropped : spread(kept.count - 1, "enough");
    if (!suffices(fewer.share)) break;
    kept = fewer;
  }
  const [moved, even] = [exchange(choice, kept, "best", budget), spread(kept.count, "best")];
  return suffices(even.share) && !isBetter(moved, even) ? even : moved;
}

/** As many readings in all as there are unknowns, and one where those taken do not do. */
function floorOf({ form, taken }: PlanInput, { count }: Chosen): number {
  const known = taken.reduce((sum, { times }) => sum + times, 0);
  return count === 0 ? 0 : Math.max(1, fewestReadings[form] - known);
}

function statusOf(chosen: Chosen, isEnough: boolean, best: Prediction): PlanStatus {
  if (isEnough) return chosen.count === 0 ? "suffices" : "suffices_when_added";
  return !suffices(best.ratio ** 2) ? "out_of_reach" : "too_many_needed";
}

function readingsOf({ taken, places, uMm }: PlanInput, added: readonly number[]): TakenReading[] {
  const planned = places.map(({ clockDeg }, place) => ({ clockDeg, uMm, times: added[place]! }));
  return [...taken, ...planned.filter(({ times }) => times > 0)];
}

/** C = 2u²/n of wall distances evenly round, u²/n of spots, the same in every direction. */
function evenRingReadings({ form, uMm }: PlanInput, limits: Limits): number {
  const limitMm2 = limits.form === "radial" ? limits.worstMm2 : Math.min(limits.hMm2, limits.vMm2);
  const times = form === "wall" ? 2 : 1;
  return Math.max(fewestReadings[form], Math.ceil(((times * uMm * uMm) / limitMm2) * (1 - rounding)));
}

/** Why no plan can be made: at these clock angles no number of readings determines the centre. Null where one can. */
export function planRefusal(input: PlanInput): ComputeError | null {
  const all = readingsOf(
    input,
    input.places.map(({ readingsMax }) => readingsMax),
  );
  const open = predictCentre(all, input.form, limitsOf(input.wanted, input.level), input.level) === null;
  return open ? anglesRefusal(input.places.length > 0 ? "places" : "taken") : null;
}

function anglesRefusal(member: "places" | "taken"): ComputeError {
  const detail = "At these clock angles no number of readings determines the centre.";
  return new ComputeError("angles_insufficient", detail, { at: [member] });
}
