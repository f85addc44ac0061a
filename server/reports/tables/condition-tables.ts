import {
  numberCell,
  numberColumn,
  signedCell,
  textCell,
  textColumn,
  type FigureTable,
} from "../../../shared/figures/figure-table.ts";
import { computedSurveys, surveyName } from "../../../shared/figures/job/compared-surveys.ts";
import { decimalsAcross } from "../../../shared/figures/write-number.ts";
import type { JobRecord } from "../../../shared/schemas/jobs.ts";
import type { JobSurvey, SurveyDrift } from "../../../shared/schemas/job-surveys.ts";
import { writeMoment } from "./write-moment.ts";

const dash = "\u2013";
const answers = { yes: "yes", no: "no", not_applicable: "not applicable" } as const;

export function tabulateChecks({ checks }: JobRecord): FigureTable {
  return {
    caption: "Set-up checks",
    columns: [
      textColumn("check"),
      textColumn("answer"),
      textColumn("by"),
      textColumn("at, UTC"),
      textColumn("remark"),
    ],
    rows: checks.map(({ text, answer, by, at, remark }) => [
      textCell(text),
      textCell(answer ? answers[answer] : "not answered"),
      textCell(by ?? dash),
      textCell(at ? writeMoment(at) : dash),
      textCell(remark ?? dash),
    ]),
  };
}

/** The surveys with their set-up. */
export function tabulateSurveys({ surveys }: JobRecord): FigureTable {
  return {
    caption: "Surveys",
    columns: [
      numberColumn("survey", null),
      textColumn("stage"),
      textColumn("set-up"),
      textColumn("instrument"),
      numberColumn("readings", null),
      textColumn("from, UTC"),
      textColumn("to, UTC"),
      textColumn("result"),
      textColumn("remark"),
    ],
    rows: surveys.map((survey, index) => {
      const taken = survey.readings.map(({ reading }) => writeMoment(reading.takenAt)).sort();
      return [
        numberCell(index + 1, 0),
        textCell(surveyName(survey)),
        textCell(survey.survey.sameSetUp ? "as before" : "new"),
        textCell(survey.survey.instrument ?? dash),
        numberCell(survey.readings.length, 0),
        textCell(taken[0] ?? dash),
        textCell(taken.at(-1) ?? dash),
        textCell(resultWords(survey)),
        textCell(survey.survey.conditions?.remark ?? dash),
      ];
    }),
  };
}

function resultWords({ result }: JobSurvey): string {
  if (!result) return "not computed";
  return result.current ? "computed" : "computed, readings changed since";
}

export function tabulateTemperatures({ surveys }: JobRecord): FigureTable {
  return {
    caption: "Temperatures",
    columns: [
      textColumn("survey"),
      textColumn("place"),
      numberColumn("temperature", null),
      textColumn("unit"),
    ],
    rows: surveys.flatMap((survey) => {
      const { conditions } = survey.survey;
      if (!conditions) return [];
      const unit = textCell(`\u00b0${conditions.temperatureUnit}`);
      const name = textCell(surveyName(survey));
      const { ambient } = conditions;
      return [
        ...(typeof ambient === "number" ? [[name, textCell("air"), numberCell(ambient, 1), unit]] : []),
        ...(conditions.metal ?? []).map(({ place, value }) => [
          name,
          textCell(place),
          numberCell(value, 1),
          unit,
        ]),
      ];
    }),
  };
}

/** Closing centre less opening centre of each survey. */
export function tabulateDrift(record: JobRecord): FigureTable {
  const { offset } = record.machine.units;
  const decimals = decimalsAcross(offset);
  return {
    caption: "Drift over each survey: the first station, closing less opening",
    columns: [
      textColumn("survey"),
      textColumn("station"),
      numberColumn("h", offset),
      numberColumn("v", offset),
      numberColumn("uncertainty", offset),
      textColumn("explained by it"),
    ],
    rows: computedSurveys(record).map(({ name, result: { drift } }) => [
      textCell(name),
      textCell(drift?.station ?? "no closing reading"),
      signedCell(drift?.h, decimals),
      signedCell(drift?.v, decimals),
      numberCell(drift?.uncertainty, decimals),
      textCell(drift ? driftWords(drift) : dash),
    ]),
  };
}

function driftWords({ exceeds, level }: SurveyDrift): string {
  if (exceeds === null) return "not known";
  return `${exceeds ? "no" : "yes"}, at ${Number((100 * level).toPrecision(6))} %`;
}

/** Everything that the engine said must be known before a number is used. */
export function tabulateWarnings(record: JobRecord): FigureTable {
  return {
    caption: "Warnings of the engine",
    columns: [textColumn("survey"), textColumn("of"), textColumn("warning"), textColumn("says")],
    rows: computedSurveys(record).flatMap(({ name, result: { fits, axis, stations } }) =>
      [
        ...fits.map(({ id, warnings }) => ({ of: `fit of ${id}`, warnings })),
        { of: "axis", warnings: axis.warnings },
        ...stations.map(({ id, warnings }) => ({ of: `deviation of ${id}`, warnings })),
      ].flatMap(({ of, warnings }) =>
        warnings.map(({ code, detail }) => [textCell(name), textCell(of), textCell(code), textCell(detail)]),
      ),
    ),
  };
}
