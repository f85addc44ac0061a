import type { JobFlag } from "../../shared/schemas/job-surveys.ts";
import { setUpChecks } from "../../shared/set-up-checks.ts";
import { countingReadings, takenMs, type JobEntry, type JobState, type SurveyState } from "./job-log.ts";

export const flag = (code: string, detail: string, station: string | null = null): JobFlag => ({
  code,
  detail,
  station,
});

/** What a reader of a survey must know: how far it was taken as it should be (common practice, no source). */
export function surveyFlags(state: JobState, survey: SurveyState): JobFlag[] {
  const { opening, closing } = countingReadings(survey);
  if (opening.length === 0) return [];
  return [
    ...checkFlags(state, Math.min(...opening.map(takenMs))),
    ...closingFlags(opening, closing),
    ...driftFlags(survey),
    ...opening.flatMap(readingFlags),
    ...instrumentFlags(state, survey, opening),
    ...(survey.result && !survey.isCurrent
      ? [flag("result_outdated", "Readings have changed since the survey was computed.")]
      : []),
  ];
}

function checkFlags({ checks }: JobState, firstReadingMs: number): JobFlag[] {
  const open = setUpChecks.filter(({ id }) => {
    const answer = checks.get(id);
    return !answer || answeredMs(answer) > firstReadingMs;
  });
  const failed = setUpChecks.filter(({ id }) => checks.get(id)?.document.answer === "no");
  return [
    ...(open.length === 0
      ? []
      : [
          flag(
            "set_up_unchecked",
            `Read before these set-up checks were answered: ${open.map(({ id }) => id).join(", ")}.`,
          ),
        ]),
    ...failed.map(({ id, text }) => flag("set_up_check_failed", `Answered no (${id}): ${text}`)),
  ];
}

const answeredMs = ({ document, createdAt }: JobEntry<"check">): number =>
  document.at ? Date.parse(document.at) : createdAt.getTime();

function closingFlags(
  opening: readonly JobEntry<"reading">[],
  closing: readonly JobEntry<"reading">[],
): JobFlag[] {
  const [first] = opening;
  if (!first || opening.length < 2) return [];
  const { station } = first.document.reading;
  if (closing.some(({ document }) => document.reading.station === station)) return [];
  return [
    flag(
      "closing_reading_missing",
      `${station} was read first and not once more at the end: the drift is not known.`,
      station,
    ),
  ];
}

function driftFlags({ result }: SurveyState): JobFlag[] {
  const drift = result?.document.drift;
  if (!drift?.exceeds) return [];
  const percent = Number((100 * drift.level).toPrecision(6));
  const detail = `${drift.station} was read elsewhere at the end than at the beginning, farther than both readings' uncertainty (${percent} %) explains: find the cause and repeat the survey.`;
  return [flag("survey_drifted", detail, drift.station)];
}

function readingFlags({ document: { reading } }: JobEntry<"reading">): JobFlag[] {
  if (reading.upperHalf !== "off") return [];
  const detail = `${reading.station} was read with the upper half off: the open casing is not the structure that runs.`;
  return [flag("upper_half_off", detail, reading.station)];
}

function instrumentFlags(
  { details }: JobState,
  survey: SurveyState,
  opening: readonly JobEntry<"reading">[],
): JobFlag[] {
  return (details.instruments ?? []).flatMap(({ id, description, calibrationDueOn }) => {
    if (!calibrationDueOn) return [];
    const late = opening.some(({ document: { reading } }) => {
      const used = reading.instrument ?? survey.entry.document.instrument ?? null;
      return used === id && reading.takenAt.slice(0, 10) > calibrationDueOn;
    });
    const detail = `${description} (${id}) was used after its calibration was due on ${calibrationDueOn}.`;
    return late ? [flag("calibration_overdue", detail)] : [];
  });
}
