import type { MoveCall } from "../../../../../shared/figures/plan-elevation/plan-elevation-of-moves.ts";
import type { JobRecord } from "../../../../../shared/schemas/jobs.ts";

/** What of a plan's call its sheet shows: the deviations that it was made from, with the machine's tolerances. */
export function moveCallOf(
  { machine }: Pick<JobRecord, "machine">,
  { from }: Pick<JobRecord["plans"][number], "from">,
): MoveCall {
  const toleranceOf = new Map(machine.stations.map(({ id, tolerance }) => [id, tolerance ?? null]));
  return {
    units: machine.units,
    reference: from.reference,
    stations: from.stations.map(({ id, z, deviation: { h, v } }) => ({
      id,
      z,
      deviation: { h, v },
      tolerance: toleranceOf.get(id) ?? null,
    })),
  };
}
