import type { JobRecord } from "../../../shared/schemas/jobs.ts";
import { titleCell, type SheetCell } from "../../spreadsheets/cell.ts";
import type { Sheet } from "../../spreadsheets/sheet.ts";
import { signatureWords } from "../report-words.ts";
import {
  tabulateChecks,
  tabulateDrift,
  tabulateSurveys,
  tabulateTemperatures,
  tabulateWarnings,
} from "../tables/condition-tables.ts";
import { tabulateReadings } from "../tables/reading-tables.ts";
import { tabulateInstruments } from "../tables/job-tables.ts";
import { lineUnderTitle, section } from "./section.ts";

const widths = [46, 30, 20, 20, 24, 20, 20, 24, 20, 60];

/** Under what conditions, with what and by whom it was measured. */
export function conditionsSheet(record: JobRecord): Sheet {
  const rows: SheetCell[][] = [
    [titleCell(`Conditions: ${record.machineName}`)],
    lineUnderTitle(signatureWords(record), { fontWeight: "bold" }),
    [],
    ...section(tabulateChecks(record), "None.", widths.length),
    ...section(tabulateInstruments(record), "No instrument is named.", widths.length),
    ...section(tabulateSurveys(record), "No survey has been begun.", widths.length),
    ...section(tabulateTemperatures(record), "None was noted.", widths.length),
    ...section(tabulateDrift(record), null, widths.length),
    ...record.surveys.flatMap((survey) =>
      section(tabulateReadings(record, survey), "No reading has been stored.", widths.length),
    ),
    ...section(tabulateWarnings(record), null, widths.length),
  ];
  return { name: "Conditions", rows, widths, frozen: { rows: 2, columns: 1 }, paper: "A3" };
}
