import type { AxisStationRequest } from "../../schemas/axis-deviations.ts";
import type { PlannedCall } from "../plan-elevation/plan-elevation-of.ts";
import { allowedBy } from "../plan-elevation/plan-elevation-of.ts";
import type { Survey } from "../plan-elevation/plan-elevation-model.ts";
import type { EndViewModel, ToleranceOutline } from "./end-view-model.ts";

/** The end view of the stations of a call that were surveyed, in order of z. */
export function endViewOf(
  { units, stations }: PlannedCall,
  surveys: readonly Survey[],
  reference: ReadonlySet<string>,
): EndViewModel {
  const surveyed = new Set(surveys.flatMap((survey) => survey.stations.map(({ id }) => id)));
  return {
    axialUnit: units.axial,
    offsetUnit: units.offset,
    stations: stations
      .filter(({ id }) => surveyed.has(id))
      .map(({ id, z, tolerance }) => ({
        id,
        z,
        reference: reference.has(id),
        tolerance: outlineOf(tolerance),
      }))
      .sort((one, other) => one.z - other.z),
    surveys,
  };
}

function outlineOf(tolerance: AxisStationRequest["tolerance"]): ToleranceOutline | null {
  if (!tolerance) return null;
  if ("radial" in tolerance) return { kind: "ring", radius: tolerance.radial };
  const allowed = allowedBy(tolerance);
  return allowed && { kind: "box", h: allowed.h, v: allowed.v };
}
