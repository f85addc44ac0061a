import {
  numberCell,
  numberColumn,
  textCell,
  textColumn,
  type FigureTable,
} from "../../../shared/figures/figure-table.ts";
import { surveyName } from "../../../shared/figures/job/compared-surveys.ts";
import type { JobRecord } from "../../../shared/schemas/jobs.ts";
import type { JobSurvey } from "../../../shared/schemas/job-surveys.ts";
import { countsWords } from "../report-words.ts";
import { writeMoment } from "./write-moment.ts";

const dash = "\u2013";
const forms = {
  points: "wall points",
  turned_gauge: "turned gauge",
  rotating_target: "rotating target",
  wire: "stretched wire",
} as const;

/** Every reading of a survey in the order in which it was taken; the raw numbers stand in the record. */
export function tabulateReadings({ details }: JobRecord, survey: JobSurvey): FigureTable {
  const readings = survey.readings.toSorted(
    (one, other) => Date.parse(one.reading.takenAt) - Date.parse(other.reading.takenAt),
  );
  return {
    caption: `Readings ${surveyName(survey)}`,
    columns: [
      textColumn("taken, UTC"),
      textColumn("station"),
      textColumn("form"),
      numberColumn("readings", null),
      textColumn("seen"),
      textColumn("upper half"),
      textColumn("instrument"),
      textColumn("by"),
      textColumn("counts"),
      textColumn("from file"),
    ],
    rows: readings.map(({ reading, standing, sourceFile }) => [
      textCell(writeMoment(reading.takenAt)),
      textCell(reading.closing ? `${reading.station}, closing` : reading.station),
      textCell(forms[reading.form]),
      numberCell(countOf(reading), 0),
      textCell(reading.seen ?? details.seen),
      textCell(reading.upperHalf ?? "not stated"),
      textCell(reading.instrument ?? survey.survey.instrument ?? dash),
      textCell(reading.person ?? dash),
      textCell(countsWords[standing]),
      textCell(sourceFile ? `${sourceFile.name} ${sourceFile.sha256}` : dash),
    ]),
  };
}

function countOf(reading: JobSurvey["readings"][number]["reading"]): number | null {
  switch (reading.form) {
    case "points":
      return reading.points.length;
    case "turned_gauge":
      return reading.readings.length;
    case "rotating_target":
      return reading.spots.length;
    case "wire":
      return null;
  }
}
