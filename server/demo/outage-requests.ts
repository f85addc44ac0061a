import type { AxisDeviationRequest, AxisDeviationResult } from "../../shared/schemas/axis-deviations.ts";
import type { BoreFitRequest, BoreFitResult } from "../../shared/schemas/bore-fits.ts";
import type { ShimMoveRequest, ShimMoveResult } from "../../shared/schemas/shim-moves.ts";
import {
  fellgateStations,
  referenceStations,
  units,
  type FellgateStation,
  type OffsetPair,
} from "./fellgate-machine.ts";
import { readBore, type Survey } from "./fellgate-readings.ts";
import { fellgateComponents, fellgateIndicators } from "./fellgate-supports.ts";
import { seededNormal } from "./seeded-normal.ts";

const level = 0.95;
/** How the line of sight ran through the machine: it need not lie on the axis, the axis is found in it. */
const sight = { at0: { h: 0.12, v: 0.2 }, slope: { h: 2.5e-5, v: -6e-5 } };
/** How near a part stays to where its shims put it when it is bolted down, in millimetres. */
const settling = 0.006;

/** Where every bore lay when the outage began, off the line of sight. */
export function foundCentres(): Map<string, OffsetPair> {
  return new Map(
    fellgateStations.map(({ id, z, target, foundOff }) => [
      id,
      {
        h: sight.at0.h + sight.slope.h * z + target.h + foundOff.h,
        v: sight.at0.v + sight.slope.v * z + target.v + foundOff.v,
      },
    ]),
  );
}

/** Where every bore lies after the moves: each by what the shims chosen move it, and settled. */
export function leftCentres(
  before: Pick<AxisDeviationResult, "stations">,
  moves: Pick<ShimMoveResult, "predicted">,
): Map<string, OffsetPair> {
  const found = new Map(before.stations.map(({ id, deviation }) => [id, deviation]));
  const predicted = new Map(moves.predicted.map(({ id, deviation }) => [id, deviation]));
  const normal = seededNormal(3);
  return new Map(
    [...foundCentres()].map(([id, centre]) => {
      const from = valueOf(found, id);
      const to = valueOf(predicted, id);
      const moved = { h: to.h - from.h, v: to.v - from.v };
      if (moved.h === 0 && moved.v === 0) return [id, centre];
      return [
        id,
        {
          h: centre.h + moved.h + settling * normal(),
          v: centre.v + moved.v + settling * normal(),
        },
      ];
    }),
  );
}

/** The readings of all bores. */
export function surveyRequest(note: string, survey: Survey): BoreFitRequest {
  return {
    units,
    seen: "downstream",
    level,
    bores: fellgateStations.map((station) => readBore(station, survey)),
    note,
  };
}

/** The readings of one bore, of which only the first few were taken. */
export function cutShortRequest(note: string, id: string, taken: number, survey: Survey): BoreFitRequest {
  const bore = readBore(stationOf(id), survey);
  if (bore.form !== "turned_gauge") throw new Error(`${id} is read with a turned gauge.`);
  return {
    units,
    seen: "downstream",
    bores: [{ ...bore, readings: bore.readings.slice(0, taken) }],
    note,
  };
}

/** The centres fitted, against the targets, from the axis through the reference stations. */
export function deviationRequest(note: string, fits: readonly BoreFitResult[]): AxisDeviationRequest {
  return {
    units,
    level,
    axis: { method: "two_station", through: referenceStations },
    stations: fits.map(({ id, centre, covariance, expandedUncertainty }) => {
      const { z, target, targetUncertainty, tolerance } = stationOf(id);
      const dof = expandedUncertainty?.dof ?? null;
      return { id, z, centre, covariance, dof, target, targetUncertainty, tolerance };
    }),
    note,
  };
}

/** The deviations, on the supports and shims of the machine. */
export function moveRequest(note: string, { stations }: AxisDeviationResult): ShimMoveRequest {
  return {
    units,
    level,
    stations: stations.map(({ id, z, deviation: { h, v }, covariance, expandedUncertainty }) => ({
      id,
      z,
      deviation: { h, v },
      covariance,
      dof: expandedUncertainty?.dof ?? null,
      tolerance: stationOf(id).tolerance,
    })),
    reference: referenceStations,
    components: fellgateComponents,
    shims: { cutToSize: { increment: 0.01 } },
    objective: "least_squares",
    maximumIncrement: 0.25,
    maximumMisfit: 0.02,
    indicators: fellgateIndicators,
    note,
  };
}

function stationOf(id: string): FellgateStation {
  const station = fellgateStations.find((one) => one.id === id);
  if (!station) throw new Error(`The machine has no station ${id}.`);
  return station;
}

function valueOf(values: ReadonlyMap<string, OffsetPair>, id: string): OffsetPair {
  const value = values.get(id);
  if (!value) throw new Error(`There is no answer for ${id}.`);
  return value;
}
