import type { AxisDeviationResult } from "../../shared/schemas/axis-deviations.ts";
import type { ConfirmationResult } from "../../shared/schemas/confirmation-answers.ts";
import type { JobFlag } from "../../shared/schemas/job-surveys.ts";
import type { MachineDocument } from "../../shared/schemas/machines.ts";
import { axisStations } from "./job-requests.ts";
import {
  countingReadings,
  isNewestResult,
  isOfNewestResults,
  takenMs,
  type JobState,
  type SurveyState,
} from "./job-log.ts";
import { stationsMovedBy } from "./move-order.ts";
import { flag } from "./survey-flags.ts";

/** What the stored calculations of a job answered. */
export interface JobResults {
  readonly deviationsOf: (survey: SurveyState) => AxisDeviationResult | null;
  readonly confirmationOf: (calculation: string) => ConfirmationResult | null;
}

/**
 * Everything that stands in the way of a signature (common practice, no source): reference stations re-measured after
 * the last move and shown to repeat, or a new axis taken by name; every moved station re-measured; every station with a
 * tolerance conforms, undecided not being enough, or carries a concession.
 */
export function signOffObstacles(machine: MachineDocument, state: JobState, results: JobResults): JobFlag[] {
  const computed = state.surveys.filter((survey) => survey.result && survey.isCurrent);
  const last = computed.at(-1);
  const outdated = state.surveys.filter((survey) => survey.counting.size > 0 && !survey.isCurrent);
  const outdatedFlags = outdated.map(({ entry }) =>
    flag("survey_not_computed", `Survey ${entry.id} has readings that were not computed.`),
  );
  if (!last) return [...outdatedFlags, flag("no_survey", "No survey has been computed.")];
  return [
    ...outdatedFlags,
    ...movedObstacles(machine, state, last),
    ...referenceObstacles(machine, state, last, results),
    ...verdictObstacles(machine, state, computed, results),
  ];
}

function movedObstacles(machine: MachineDocument, { moves }: JobState, last: SurveyState): JobFlag[] {
  if (moves.length === 0) return [];
  const stage =
    last.entry.document.stage === "as_left"
      ? []
      : [flag("as_left_missing", "Parts were moved and no as-left survey has been computed since.")];
  const lastMoveMs = new Map<string, number>();
  for (const { document } of moves) {
    for (const station of stationsMovedBy(machine, document.component)) {
      lastMoveMs.set(station, Math.max(lastMoveMs.get(station) ?? -Infinity, Date.parse(document.at)));
    }
  }
  const unfinished = [...new Set(moves.map(({ document }) => document.component))].filter(
    (component) =>
      moves.filter(({ document }) => document.component === component).at(-1)?.document.finished === false,
  );
  return [
    ...stage,
    ...unfinished.map((component) => flag("move_unfinished", `${component} is not finished and locked.`)),
    ...[...lastMoveMs].flatMap(([station, atMs]) =>
      measuredMs(last, station) > atMs
        ? []
        : [flag("station_not_remeasured", `${station} was not measured since it was moved.`, station)],
    ),
  ];
}

function referenceObstacles(
  machine: MachineDocument,
  state: JobState,
  last: SurveyState,
  { confirmationOf }: JobResults,
): JobFlag[] {
  const { moves, confirmations, axisAcceptances } = state;
  if (moves.length === 0) return [];
  const reference = axisStations({ machine, details: state.details });
  const lastMoveMs = Math.max(...moves.map(({ document }) => Date.parse(document.at)));
  const obstacles = reference.flatMap((station) =>
    measuredMs(last, station) > lastMoveMs
      ? []
      : [
          flag(
            "reference_not_remeasured",
            `Reference station ${station} was not measured after the last move.`,
            station,
          ),
        ],
  );
  if (reference.length === 0) return obstacles;
  const accepted = axisAcceptances.filter(({ document }) => document.survey === last.entry.id);
  if (accepted.some(({ document }) => isNewestResult(state, document.survey, document.surveyResult)))
    return obstacles;
  const moved = new Set(moves.flatMap(({ document }) => stationsMovedBy(machine, document.component)));
  const movedReference = reference.filter((station) => moved.has(station));
  if (movedReference.length > 0) {
    const again = accepted.length > 0 ? ", again since the survey was computed again" : "";
    const detail = `${movedReference.join(", ")} set the axis and was moved: the new axis is to be accepted by name${again}.`;
    return [...obstacles, flag("axis_not_accepted", detail)];
  }
  const ofLast = confirmations.filter(({ document }) => document.after === last.entry.id);
  const confirmation = ofLast.filter((entry) => isOfNewestResults(state, entry)).at(-1);
  if (!confirmation) {
    const detail =
      ofLast.length > 0
        ? "The last survey, or the one before, was computed again since they were compared: confirm again."
        : "The last survey has not been confirmed against an earlier one.";
    return [...obstacles, flag("not_confirmed", detail)];
  }
  const repeats = confirmationOf(confirmation.document.calculation)?.reference.repeats ?? null;
  if (repeats === true) return obstacles;
  return [
    ...obstacles,
    repeats === false
      ? flag(
          "reference_does_not_repeat",
          "The reference stations do not repeat: find out why, or accept a new axis by name.",
        )
      : flag(
          "reference_repeat_unknown",
          "It could not be shown that the reference stations repeat: accept the axis by name, or measure again.",
        ),
  ];
}

function verdictObstacles(
  machine: MachineDocument,
  { concessions }: JobState,
  computed: readonly SurveyState[],
  { deviationsOf }: JobResults,
): JobFlag[] {
  const conceded = new Set(concessions.map(({ document }) => document.station));
  const latest = new Map<string, AxisDeviationResult["stations"][number]>();
  for (const survey of computed) {
    for (const station of deviationsOf(survey)?.stations ?? []) latest.set(station.id, station);
  }
  return machine.stations
    .filter(({ id, tolerance }) => tolerance && !conceded.has(id))
    .flatMap(({ id }) => {
      const verdict = latest.get(id)?.verdict ?? null;
      if (verdict === "conforms") return [];
      if (verdict === null)
        return [flag("station_not_measured", `${id} has a tolerance and no verdict.`, id)];
      const detail = `${id} ${verdict === "exceeds" ? "exceeds its tolerance" : "is undecided"} and carries no concession.`;
      return [flag("station_does_not_conform", detail, id)];
    });
}

/** When a station was read in a survey; long before everything where it was not. */
function measuredMs(survey: SurveyState, station: string): number {
  const taken = countingReadings(survey).opening.filter(
    ({ document }) => document.reading.station === station,
  );
  return Math.max(-Infinity, ...taken.map(takenMs));
}
