import type { JobRecord, JobSurvey, SurveyResult } from "../../shared/schemas/jobs.ts";
import type { MachineStation } from "../../shared/schemas/machines.ts";

type FitAnswer = SurveyResult["fits"][number];
type StationAnswer = SurveyResult["stations"][number];

/** A survey with what it came to. */
export interface ComputedSurvey {
  readonly survey: JobSurvey;
  readonly result: SurveyResult;
}

/** One bore of a computed survey: as drawn, as fitted, as judged. Lengths in the machine's units. */
export interface SurveyedBore {
  readonly station: MachineStation;
  readonly fit: FitAnswer;
  readonly answer: StationAnswer;
  /** Absent on the drawing is on the axis. */
  readonly target: { readonly h: number; readonly v: number };
  /** The axis at the station's z. */
  readonly axis: { readonly h: number; readonly v: number };
}

/** The newest computed survey of a stage; null where there is none. */
export function computedSurvey(record: JobRecord, stage: "as_found" | "as_left"): ComputedSurvey | null {
  const found = record.surveys
    .filter(({ survey, result }) => survey.stage === stage && result !== null)
    .at(-1);
  return found?.result ? { survey: found, result: found.result } : null;
}

/** Every bore of the survey, in the order of the machine's stations. */
export function boresOf({ machine }: JobRecord, { result }: ComputedSurvey): SurveyedBore[] {
  const { axis, fits, stations } = result;
  return machine.stations.flatMap((station) => {
    const fit = fits.find(({ id }) => id === station.id);
    const answer = stations.find(({ id }) => id === station.id);
    if (!fit || !answer) return [];
    const at = ({ at0, slope }: { at0: number; slope: number }) => at0 + slope * answer.z;
    return [
      {
        station,
        fit,
        answer,
        target: station.target ?? { h: 0, v: 0 },
        axis: { h: at(axis.h), v: at(axis.v) },
      },
    ];
  });
}

/** A station's tolerance as what it allows: a radius, or a range in each plane. */
export type Allowed =
  | { readonly form: "radial"; readonly radius: number }
  | { readonly form: "planes"; readonly h: readonly [number, number]; readonly v: readonly [number, number] };

export function allowedBy({ tolerance }: MachineStation): Allowed | null {
  if (!tolerance) return null;
  if ("radial" in tolerance) return { form: "radial", radius: tolerance.radial };
  return { form: "planes", h: rangeOf(tolerance.h), v: rangeOf(tolerance.v) };
}

function rangeOf(side: number | readonly number[]): [number, number] {
  return typeof side === "number" ? [-side, side] : [side[0] ?? 0, side[1] ?? 0];
}
