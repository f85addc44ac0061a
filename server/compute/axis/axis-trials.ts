import { confirmInterval, type TrialSummary } from "../monte-carlo/confirm-interval.ts";
import type { TrialPlan } from "../monte-carlo/trial-plan.ts";
import type { AxisInput } from "./axis-input.ts";
import type { AxisDeviations, StationDeviation } from "./axis-result.ts";
import { axisErrorsByGains, axisErrorsByFits, type AxisErrors } from "./axis-errors.ts";
import { errorSources, type ErrorSource } from "./error-source.ts";
import { isContactMethod } from "./find-faults.ts";
import { drawScatter, observationErrors } from "./observation-errors.ts";

/** What the trials say of one station's deviation, mm. */
export interface StationTrials {
  readonly h: TrialSummary;
  readonly v: TrialSummary;
}

export interface AxisTrials {
  /** In the order of the input; null where the error of the deviation is not known. */
  readonly stations: readonly (StationTrials | null)[];
  /** How many trials gave no axis, by the code of their refusal. */
  readonly failures: ReadonlyMap<string, number>;
}

/** Rounding of a deviation, in number spacings of what it is the difference of. */
const roundingSpacings = 64;

/**
 * Propagates the distributions of centres and targets through the axis (JCGM 101:2008, clause 7) and holds the
 * first-order intervals of `found` against the result (clause 8). In every trial each station's centre is drawn from
 * the normal distribution with its covariance, or from the multivariate t with its degrees of freedom (JCGM 102:2011,
 * 5.3.2), and its target from a normal one; the axis is set anew through the reference stations by the method of the
 * call, and every deviation taken from it. Where no covariances are stated the scatter of each plane is drawn too, one
 * draw for all stations. `names[i]` and the seed set the stream of station i, whatever stands beside it. Axes of
 * minimum_zone and least_absolute may rest on other contacts in each trial, so that every reference station's
 * covariance is needed. Work: trials × (stations + reference stations), or one search for the axis a trial.
 */
export function runAxisTrials(
  input: AxisInput,
  found: AxisDeviations,
  names: readonly string[],
  plan: TrialPlan,
): AxisTrials {
  const { scatterMm, dof } = found.axis;
  const scatter = scatterMm !== null && dof !== null ? { mm: scatterMm, dof } : null;
  const sources = errorSources(input, scatter);
  const references = input.reference.flatMap((index) => sources[index] ?? []);
  const noAxis = { stations: input.stations.map(() => null), failures: new Map<string, number>() };
  const known = found.stations.some(({ covariance }) => covariance !== null);
  if (!known || references.length < input.reference.length) return noAxis;

  const shared = drawScatter(plan, scatter);
  const drawn = input.reference.map((index) =>
    observationErrors(sources[index]!, names[index]!, plan, shared),
  );
  const axis = isContactMethod(input.method)
    ? axisErrorsByFits(input, found.axis, drawn, plan.trials)
    : axisErrorsByGains(input, drawn, plan.trials);
  const referenceDof = leastDof(references);
  return {
    stations: found.stations.map((station, index) => {
      const source = sources[index];
      if (!source || station.covariance === null) return null;
      const own = observationErrors(source, names[index]!, plan, shared);
      const least = Math.min(referenceDof, leastDof([source]));
      return stationTrials(input, station, index, {
        own,
        axis,
        plan,
        dof: least === Infinity ? null : least,
      });
    }),
    failures: axis.failures,
  };
}

function leastDof(sources: readonly ErrorSource[]): number {
  return sources.reduce((least, { dof }) => Math.min(least, dof ?? Infinity), Infinity);
}

interface Drawn {
  readonly own: ReturnType<typeof observationErrors>;
  readonly axis: AxisErrors;
  readonly plan: TrialPlan;
  readonly dof: number | null;
}

function stationTrials(
  input: AxisInput,
  { deviation, covariance, expandedUncertainty }: StationDeviation,
  index: number,
  { own, axis, plan, dof }: Drawn,
): StationTrials {
  const { zMm, centre, target } = input.stations[index]!;
  const [h, v] = [new Float64Array(plan.trials), new Float64Array(plan.trials)];
  const error = new Float64Array(2);
  let computed = 0;
  let [mostH, mostV] = [0, 0];
  for (let t = 0; t < plan.trials; t++) {
    own(t, error);
    const axisH = axis.h.at(t, zMm);
    const axisV = axis.v.at(t, zMm);
    const [dh, dv] = [deviation.hMm + (error[0]! - axisH), deviation.vMm + (error[1]! - axisV)];
    if (!Number.isFinite(dh + dv)) continue;
    h[computed] = dh;
    v[computed] = dv;
    computed++;
    mostH = Math.max(mostH, Math.abs(error[0]!) + Math.abs(axisH));
    mostV = Math.max(mostV, Math.abs(error[1]!) + Math.abs(axisV));
  }
  const confirm = (values: Float64Array, value: number, variance: number, expanded: number, reach: number) =>
    confirmInterval(
      values.subarray(0, computed),
      plan.trials - computed,
      { value, standard: Math.sqrt(variance), expanded },
      {
        level: input.level,
        digits: plan.digits,
        unit: plan.unitMm,
        dof,
        rounding: roundingSpacings * Number.EPSILON * reach,
      },
    );
  const reach = (member: "hMm" | "vMm") => Math.abs(centre[member]) + Math.abs(target[member]);
  const { hMm, vMm } = expandedUncertainty!;
  return {
    h: confirm(h, deviation.hMm, covariance!.hhMm2, hMm, reach("hMm") + mostH),
    v: confirm(v, deviation.vMm, covariance!.vvMm2, vMm, reach("vMm") + mostV),
  };
}
