import { ComputeError } from "../compute-error.ts";
import type { AxisInput } from "./axis-input.ts";
import type { Axis } from "./axis-result.ts";
import { gainsOfMethod } from "./deviations-from-axis.ts";
import type { Line } from "./fit-line.ts";
import type { LineGains } from "./line-gains.ts";
import type { ObservationErrors } from "./observation-errors.ts";
import { fitOptimalAxis } from "./optimal-axis.ts";

/** By trial, how far the axis of one plane lies from the one answered: NaN where there was none. */
interface PlaneErrors {
  /** At z, mm. */
  readonly at: (trial: number, zMm: number) => number;
}

export interface AxisErrors {
  readonly h: PlaneErrors;
  readonly v: PlaneErrors;
  readonly failures: ReadonlyMap<string, number>;
}

/** Errors of an axis that is linear in its observations: its gains times theirs. O(trials × reference stations). */
export function axisErrorsByGains(
  input: AxisInput,
  drawn: readonly ObservationErrors[],
  trials: number,
): AxisErrors {
  const gains = gainsOfMethod(input);
  const h = gainedErrors(gains.h, trials);
  const v = gainedErrors(gains.v, trials);
  const error = new Float64Array(2);
  for (const [place, draw] of drawn.entries()) {
    for (let t = 0; t < trials; t++) {
      draw(t, error);
      h.add(t, place, error[0]!);
      v.add(t, place, error[1]!);
    }
  }
  return { h, v, failures: new Map() };
}

function gainedErrors({ centreMm, shares, moments, spread }: LineGains, trials: number) {
  const share = new Float64Array(trials);
  const moment = new Float64Array(trials);
  return {
    add(trial: number, place: number, errorMm: number) {
      share[trial]! += shares[place]! * errorMm;
      moment[trial]! += moments[place]! * errorMm;
    },
    at: (trial: number, zMm: number) => share[trial]! + (moment[trial]! * (zMm - centreMm)) / spread,
  };
}

/**
 * Errors of an axis of minimum_zone or least_absolute, searched anew in every trial. A trial without an axis is
 * counted by the code of its refusal.
 */
export function axisErrorsByFits(
  input: AxisInput,
  { h, v }: Pick<Axis, "h" | "v">,
  drawn: readonly ObservationErrors[],
  trials: number,
): AxisErrors {
  const at = input.reference.map((index) => input.stations[index]!);
  const reference = at.map((_, place) => place);
  const error = new Float64Array(2);
  const failures = new Map<string, number>();
  const errors = { h: lineErrors(h, trials), v: lineErrors(v, trials) };
  for (let t = 0; t < trials; t++) {
    const stations = at.map((station, place) => {
      drawn[place]!(t, error);
      const { hMm, vMm } = station.centre;
      return { ...station, centre: { hMm: hMm + error[0]!, vMm: vMm + error[1]! } };
    });
    try {
      const { fits } = fitOptimalAxis({ ...input, reference, stations });
      errors.h.put(t, fits.h.line);
      errors.v.put(t, fits.v.line);
    } catch (refusal) {
      if (!(refusal instanceof ComputeError)) throw refusal;
      failures.set(refusal.code, (failures.get(refusal.code) ?? 0) + 1);
    }
  }
  return { ...errors, failures };
}

function lineErrors(answered: Line, trials: number) {
  const at0 = new Float64Array(trials).fill(NaN);
  const slope = new Float64Array(trials);
  return {
    put(trial: number, line: Line) {
      at0[trial] = line.at0Mm - answered.at0Mm;
      slope[trial] = line.slope - answered.slope;
    },
    at: (trial: number, zMm: number) => at0[trial]! + slope[trial]! * zMm,
  };
}
