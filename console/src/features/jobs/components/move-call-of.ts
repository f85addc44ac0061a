import type { MoveCall } from "../../../../../shared/figures/plan-elevation/plan-elevation-of-moves.ts";
import type { JobRecord } from "../../../../../shared/schemas/jobs.ts";

/** What of a plan's call its sheet shows: the survey's deviations, with the machine's tolerances. */
export function moveCallOf({ machine, surveys }: JobRecord, survey: string): MoveCall | null {
  const result = surveys.find(({ id }) => id === survey)?.result;
  if (!result) return null;
  const toleranceOf = new Map(machine.stations.map(({ id, tolerance }) => [id, tolerance ?? null]));
  return {
    units: machine.units,
    reference: result.axis.through,
    stations: result.stations.map(({ id, z, deviation: { h, v } }) => ({
      id,
      z,
      deviation: { h, v },
      tolerance: toleranceOf.get(id) ?? null,
    })),
  };
}
