import type { JobRecord } from "../../../shared/schemas/jobs.ts";
import {
  headingCell,
  numberCell,
  numberHeadingCell,
  titleCell,
  type SheetCell,
} from "../../spreadsheets/cell.ts";
import type { Sheet } from "../../spreadsheets/sheet.ts";
import { boresOf } from "../found-and-left.ts";
import type { ComputedSurvey } from "../../../shared/figures/job/compared-surveys.ts";
import { signatureWords, signWords, verdictWords } from "../report-words.ts";
import { formatsOf } from "./number-formats.ts";
import { headingRow, lineUnderTitle } from "./section.ts";
import { stationColumns } from "./station-columns.ts";

/** Row of the table's headings, counted from 0. */
const tableRow = 8;

/** Every bore of a survey: what was measured and drawn as numbers, what follows from them as formulas. */
export function surveySheet(
  record: JobRecord,
  name: string,
  computed: ComputedSurvey | null,
  stage = name,
): Sheet {
  const title = titleCell(`${stage}: ${record.machineName}`);
  if (!computed) {
    return {
      name,
      rows: [
        [title],
        lineUnderTitle(signatureWords(record), { fontWeight: "bold" }),
        lineUnderTitle("No survey of this stage has been computed."),
      ],
      widths: [60],
    };
  }
  const { axial, offset } = record.machine.units;
  const bores = boresOf(record, computed);
  const columns = stationColumns(record, computed);
  const { axis, createdAt, engineVersion } = computed.result;
  const { across } = formatsOf(record);
  const table = bores.map((bore, index) => columns.map(({ cell }) => cell(bore, tableRow + 2 + index)));
  const rows: SheetCell[][] = [
    [title],
    lineUnderTitle(`${signatureWords(record)}${flagWords(record)}`, { fontWeight: "bold" }),
    lineUnderTitle(
      `Computed ${createdAt.slice(0, 19)}Z by engine ${engineVersion}; axis ${axis.method.replaceAll("_", " ")} through ${axis.through.join(", ") || "no station"}.${computed.result.current ? "" : " Readings have changed since."}`,
    ),
    lineUnderTitle(`deviation = centre - target - axis at z. ${signWords} ${verdictWords(record)}`),
    [headingCell("Axis"), numberHeadingCell("h"), numberHeadingCell("v")],
    [headingCell(`at z = 0 (${offset})`), numberCell(axis.h.at0, across), numberCell(axis.v.at0, across)],
    [
      headingCell(`slope (${offset}/${axial})`),
      numberCell(axis.h.slope, "0.0000E+00"),
      numberCell(axis.v.slope, "0.0000E+00"),
    ],
    [],
    headingRow(
      columns.map(({ heading }) => heading),
      table,
    ),
    ...table,
  ];
  return {
    name,
    rows,
    widths: columns.map(({ width }) => width),
    frozen: { rows: tableRow + 1, columns: 1 },
    headingRow: tableRow,
    paper: "A3",
    names: { axis_h_at0: "B6", axis_v_at0: "C6", axis_h_slope: "B7", axis_v_slope: "C7" },
  };
}

function flagWords({ flags }: JobRecord): string {
  return flags.length > 0 ? `. ${flags.length} flags to be read first: see Summary.` : "";
}
