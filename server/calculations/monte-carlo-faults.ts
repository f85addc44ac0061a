import type { Fault } from "../../shared/error-codes.ts";
import { limits, trialWork } from "../../shared/limits.ts";
import type { AxisDeviationRequest } from "../../shared/schemas/axis-deviations.ts";
import type { BoreRequest } from "../../shared/schemas/bore-fits.ts";
import { levelSchema } from "../../shared/schemas/common.ts";
import { monteCarloSchema, type MonteCarloRequest } from "../../shared/schemas/monte-carlo.ts";
import type { PreparedBore } from "../compute/bore/fit-bore.ts";
import type { PreparedCriterion } from "../compute/bore/fit-criterion.ts";
import { readingsInCall } from "./bore-faults.ts";
import { membersOf } from "./common-faults.ts";

const pointer = "/monteCarlo/trials";
/** Of a call that states none. */
export const levelDefault = 0.95;

/** What a call for trials breaks: too few for its level, more than its work allows. Empty where none are asked for. */
export function monteCarloFaults(
  asked: MonteCarloRequest | undefined,
  level: number,
  workPerTrial: number,
): Fault[] {
  if (!asked) return [];
  const { trials } = asked;
  // 1 − level is rounded: 40/(1 − 0.95) comes out above 800.
  const least = Math.ceil((2 * limits.trialsOutside) / (1 - level) - 1e-6);
  const most = Math.floor(limits.trialWorkPerCall / Math.max(1, workPerTrial));
  return [
    ...(trials < least
      ? [
          {
            pointer,
            code: "out_of_range" as const,
            detail: `An interval at the level ${level} needs at least ${least} trials, so that ${limits.trialsOutside} lie outside on each side.`,
            value: trials,
            allowed: { min: least, max: limits.trialsMax },
          },
        ]
      : []),
    ...(trials > most
      ? [
          {
            pointer,
            code: "call_too_large" as const,
            detail: `Trials × work of one is at most ${limits.trialWorkPerCall}: with the ${workPerTrial} of this call, ${most} trials.`,
            value: trials,
            allowed: { max: most },
          },
        ]
      : []),
  ];
}

/** What the trials and the level of a body that failed its schema elsewhere already tell: too few of them. */
export function monteCarloFaultsBesideSchema(body: unknown): Fault[] {
  const sent = membersOf(body);
  const level = sent["level"] === undefined ? levelDefault : levelSchema.safeParse(sent["level"]).data;
  const asked = monteCarloSchema.safeParse(sent["monteCarlo"]).data;
  return level === undefined ? [] : monteCarloFaults(asked, level, 0);
}

/** Work of one trial of a bore, in the units of `trialWork`. */
export function boreTrialWork(bore: BoreRequest, prepared: PreparedBore | PreparedCriterion): number {
  const { each, perReading } = workOf(prepared);
  return each + perReading * readingsInCall({ bores: [bore] });
}

function workOf(prepared: PreparedBore | PreparedCriterion) {
  switch (prepared.kind) {
    case "criterion":
      return trialWork[prepared.method];
    case "wall":
      return trialWork.surface;
    case "circle":
    case "target":
    case "refused":
      return trialWork.circle;
  }
}

/** Work of one trial of all stations of a call. */
export function axisTrialWork({ axis, stations }: Pick<AxisDeviationRequest, "axis" | "stations">): number {
  const references = (axis.through ?? []).length;
  const searched = axis.method === "minimum_zone" || axis.method === "least_absolute";
  const { each, perReading } = trialWork.searchedAxis;
  const search = searched ? each + perReading * references : 0;
  return search + trialWork.station * (stations.length + references);
}
