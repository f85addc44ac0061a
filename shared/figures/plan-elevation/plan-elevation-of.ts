import type {
  AxisDeviationRequest,
  AxisDeviationResult,
  AxisStationRequest,
} from "../../schemas/axis-deviations.ts";
import type { PlanElevationModel, PlannedStation, Survey } from "./plan-elevation-model.ts";

const axisWords: Record<AxisDeviationResult["axis"]["method"], string> = {
  two_station: "axis through two stations",
  least_squares: "least-squares axis",
  minimum_zone: "minimum-zone axis",
  least_absolute: "least-absolute axis",
  line_of_sight: "line of sight",
};

/** What of a call plan and elevation need: where each station stands, its target and its tolerance. */
export interface PlannedCall {
  readonly units: AxisDeviationRequest["units"];
  readonly stations: readonly Pick<AxisStationRequest, "id" | "z" | "target" | "tolerance">[];
}

/** Plan and elevation of one survey, or of one and the prediction that replaces it. */
export function planElevationOf(
  call: PlannedCall,
  result: AxisDeviationResult,
  predicted: Survey | null = null,
): PlanElevationModel {
  const { through, method } = result.axis;
  return {
    axialUnit: call.units.axial,
    offsetUnit: call.units.offset,
    axisWords: through.length === 0 ? axisWords[method] : `${axisWords[method]} (${through.join(", ")})`,
    zero: "axis",
    stations: call.stations.map((station) => plannedStation(station, new Set(through))),
    surveys: predicted ? [surveyOf("as found", result), predicted] : [surveyOf("measured", result)],
  };
}

/** Where each station of a result was found to lie. */
export function surveyOf(name: string, result: AxisDeviationResult): Survey {
  return {
    name,
    stations: result.stations.map(({ id, deviation, expandedUncertainty, verdict }) => ({
      id,
      deviation: { h: deviation.h, v: deviation.v },
      radial: deviation.radial,
      uncertainty: expandedUncertainty && { h: expandedUncertainty.h, v: expandedUncertainty.v },
      verdict,
    })),
  };
}

function plannedStation(
  station: PlannedCall["stations"][number],
  through: ReadonlySet<string>,
): PlannedStation {
  return {
    id: station.id,
    z: station.z,
    reference: through.has(station.id),
    target: station.target ?? { h: 0, v: 0 },
    allowed: allowedBy(station.tolerance),
  };
}

/** Least and most deviation that a tolerance allows, per plane. */
export function allowedBy(tolerance: AxisStationRequest["tolerance"]): PlannedStation["allowed"] {
  if (!tolerance) return null;
  if ("radial" in tolerance) {
    const side = [-tolerance.radial, tolerance.radial] as const;
    return { h: side, v: side };
  }
  return { h: boundsOf(tolerance.h), v: boundsOf(tolerance.v) };
}

function boundsOf(side: number | number[]): readonly [number, number] {
  if (typeof side === "number") return [-side, side];
  const [least = 0, most = 0] = side;
  return [least, most];
}
