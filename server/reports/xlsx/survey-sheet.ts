import type { JobRecord } from "../../../shared/schemas/jobs.ts";
import { headingCell, numberCell, textCell, titleCell, type SheetCell } from "../../spreadsheets/cell.ts";
import type { Sheet } from "../../spreadsheets/sheet.ts";
import { boresOf, type ComputedSurvey } from "../found-and-left.ts";
import { signatureWords, verdictWords } from "../report-words.ts";
import { formatsOf } from "./number-formats.ts";
import { stationColumns } from "./station-columns.ts";

/** Row of the table's headings, counted from 0. */
const headingRow = 8;

/** Every bore of a survey: what was measured and drawn as numbers, what follows from them as formulas. */
export function surveySheet(record: JobRecord, name: string, computed: ComputedSurvey | null): Sheet {
  const title = titleCell(`${name}: ${record.machineName}`);
  if (!computed) {
    return {
      name,
      rows: [
        [title],
        [textCell(signatureWords(record))],
        [textCell("No survey of this stage has been computed.")],
      ],
      widths: [60],
    };
  }
  const { axial, offset } = record.machine.units;
  const bores = boresOf(record, computed);
  const columns = stationColumns(record);
  const { axis, createdAt, engineVersion } = computed.result;
  const { across } = formatsOf(record);
  const rows: SheetCell[][] = [
    [title],
    [textCell(`${signatureWords(record)}${flagWords(record)}`, { fontWeight: "bold" })],
    [
      textCell(
        `Computed ${createdAt.slice(0, 19)}Z by engine ${engineVersion}; axis ${axis.method.replaceAll("_", " ")} through ${axis.through.join(", ") || "no station"}.`,
      ),
    ],
    [textCell(`deviation = centre - target - axis at z. ${verdictWords(record)}`)],
    [headingCell("Axis"), headingCell("h"), headingCell("v")],
    [headingCell(`at z = 0 (${offset})`), numberCell(axis.h.at0, across), numberCell(axis.v.at0, across)],
    [
      headingCell(`slope (${offset}/${axial})`),
      numberCell(axis.h.slope, "0.0000E+00"),
      numberCell(axis.v.slope, "0.0000E+00"),
    ],
    [],
    columns.map(({ heading }) => headingCell(heading)),
    ...bores.map((bore, index) => {
      const row = headingRow + 2 + index;
      return columns.map(({ cell }) => cell(bore, row));
    }),
  ];
  return {
    name,
    rows,
    widths: columns.map(({ width }) => width),
    frozen: { rows: headingRow + 1, columns: 1 },
    headingRow,
    paper: "A3",
    names: { axis_h_at0: "B6", axis_v_at0: "C6", axis_h_slope: "B7", axis_v_slope: "C7" },
  };
}

function flagWords({ flags }: JobRecord): string {
  return flags.length > 0 ? `. ${flags.length} flags to be read first: see Summary.` : "";
}
