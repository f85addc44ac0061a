import {
  computedSurveys,
  surveyName,
  type ComputedSurvey,
} from "../../shared/figures/job/compared-surveys.ts";
import type { JobRecord } from "../../shared/schemas/jobs.ts";
import type { MachineStation } from "../../shared/schemas/machines.ts";

type FitAnswer = ComputedSurvey["result"]["fits"][number];
type StationAnswer = ComputedSurvey["result"]["stations"][number];

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

/** The computed surveys of a job as its reports set them side by side. */
export interface ReportedSurveys {
  /** The newest of its stage; null where there is none. */
  readonly found: ComputedSurvey | null;
  /** All others in order: after a step, or taken again since. */
  readonly others: readonly ComputedSurvey[];
  /** The newest of its stage; null where there is none. */
  readonly left: ComputedSurvey | null;
}

export function reportedSurveys(record: JobRecord): ReportedSurveys {
  const all = computedSurveys(record);
  const newest = (stage: "as_found" | "as_left") =>
    all.filter(({ survey }) => survey.survey.stage === stage).at(-1) ?? null;
  const [found, left] = [newest("as_found"), newest("as_left")];
  return { found, others: all.filter((survey) => survey !== found && survey !== left), left };
}

/** What a survey that is neither as found nor as left is called: its number, its label and its stage. */
export function numberedName({ number, survey }: ComputedSurvey): string {
  return `survey ${number}, ${surveyName(survey)}`;
}

/** The concession that a station carries as this survey shows it: where no later one has measured it again. */
export function concessionOf(
  record: JobRecord,
  { number }: ComputedSurvey,
  stationId: string,
): JobRecord["concessions"][number] | null {
  const isLatest = !computedSurveys(record).some(
    (other) => other.number > number && other.result.stations.some(({ id }) => id === stationId),
  );
  return isLatest ? (record.concessions.filter(({ station }) => station === stationId).at(-1) ?? null) : null;
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
