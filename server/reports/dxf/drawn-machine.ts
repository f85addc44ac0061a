import type { JobRecord } from "../../../shared/schemas/jobs.ts";
import { convertersFor } from "../../../shared/units.ts";
import { allowedBy, boresOf, concessionOf, reportedSurveys } from "../found-and-left.ts";

/** h to the right, v up; millimetres. */
export interface PlaneMm {
  readonly h: number;
  readonly v: number;
}

export interface DrawnStation {
  readonly id: string;
  readonly zMm: number;
  readonly targetMm: PlaneMm;
  /** Least and most deviation in each plane; a round tolerance is its radius each way. */
  readonly allowedMm: {
    readonly h: readonly [number, number];
    readonly v: readonly [number, number];
    /** Null where the tolerance is not round. */
    readonly radius: number | null;
  } | null;
}

export interface DrawnBore {
  readonly station: DrawnStation;
  readonly deviationMm: PlaneMm;
  /** Whether it set the axis of its survey. */
  readonly reference: boolean;
  /** Null without a tolerance. */
  readonly verdict: "conforms" | "undecided" | "exceeds" | null;
  /** Who granted one; null where none is shown with this survey. */
  readonly concession: string | null;
  /** Expanded; null when nothing is known. */
  readonly uncertaintyMm: PlaneMm | null;
}

export interface DrawnSurvey {
  readonly layer: "AS-FOUND" | "AS-LEFT";
  readonly name: string;
  readonly bores: readonly DrawnBore[];
}

/** What is drawn, in millimetres, stations and bores in order of z. */
export interface DrawnMachine {
  readonly stations: readonly DrawnStation[];
  readonly surveys: readonly DrawnSurvey[];
}

export function drawnMachine(record: JobRecord): DrawnMachine {
  const { axial, offset } = convertersFor(record.machine.units);
  const plane = ({ h, v }: PlaneMm): PlaneMm => ({ h: offset.toMm(h), v: offset.toMm(v) });
  const range = ([least, most]: readonly [number, number]) =>
    [offset.toMm(least), offset.toMm(most)] as const;
  const stations = record.machine.stations.map((station): DrawnStation => {
    const allowed = allowedBy(station);
    const radius = allowed?.form === "radial" ? allowed.radius : null;
    return {
      id: station.id,
      zMm: axial.toMm(station.z),
      targetMm: plane(station.target ?? { h: 0, v: 0 }),
      allowedMm: allowed && {
        h: range(allowed.form === "radial" ? [-allowed.radius, allowed.radius] : allowed.h),
        v: range(allowed.form === "radial" ? [-allowed.radius, allowed.radius] : allowed.v),
        radius: radius === null ? null : offset.toMm(radius),
      },
    };
  });
  const byId = new Map(stations.map((station) => [station.id, station]));
  const { found, left } = reportedSurveys(record);
  const surveys = (
    [
      ["AS-FOUND", "as found", found],
      ["AS-LEFT", "as left", left],
    ] as const
  ).flatMap(([layer, name, computed]): DrawnSurvey[] => {
    if (!computed) return [];
    const bores = boresOf(record, computed).flatMap(({ station: { id }, answer }): DrawnBore[] => {
      const station = byId.get(id);
      const uncertainty = answer.expandedUncertainty;
      return station
        ? [
            {
              station,
              reference: answer.reference,
              verdict: answer.verdict,
              concession: concessionOf(record, computed, id)?.name ?? null,
              deviationMm: plane(answer.deviation),
              uncertaintyMm: uncertainty && plane(uncertainty),
            },
          ]
        : [];
    });
    return [{ layer, name, bores: bores.toSorted((a, b) => a.station.zMm - b.station.zMm) }];
  });
  return { stations: stations.toSorted((a, b) => a.zMm - b.zMm), surveys };
}
