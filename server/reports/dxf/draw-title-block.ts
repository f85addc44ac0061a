import type { JobRecord } from "../../../shared/schemas/jobs.ts";
import { dateOf, draftMark, type ReportContext } from "../report-format.ts";
import { axisWords, creatorOf, ownerOf, signatureWords, verdictWords } from "../report-words.ts";
import { numberedName, reportedSurveys } from "../found-and-left.ts";
import { lineSpacing, linesIn, type Drawing } from "./drawing.ts";
import { writeTimes, type SheetScale } from "./sheet-scale.ts";

type Field = readonly [name: string, value: string];

/** The fields of ISO 7200, what the drawing is made from, and beside them flags and cautions. */
export function drawTitleBlock(
  drawing: Drawing,
  record: JobRecord,
  context: ReportContext,
  scale: SheetScale,
): void {
  const { letter } = scale;
  const { left, top, width } = scale.titleBlock;
  const middle = left + 0.62 * width;
  const fields = fieldsOf(record, context, scale).map(([name, value]) => `${name}: ${value}`);
  drawColumn(drawing, letter, [left, middle, top], fields);
  drawColumn(
    drawing,
    letter,
    [middle, left + width, top],
    [
      ...[...new Set(record.flags.map(({ detail }) => detail))].map((detail) => `Flag: ${detail}`),
      ...record.cautions.map(({ text }) => `Caution: ${text}`),
    ],
  );
  if (!record.signature) {
    drawing.text("DRAFT", [scale.zLow + scale.length / 2, scale.planY / 2], draftMark.toUpperCase(), {
      height: 6 * letter,
      align: "middle",
      rotationDeg: 15,
    });
  }
}

function drawColumn(
  drawing: Drawing,
  letter: number,
  [left, right, top]: readonly [number, number, number],
  rows: readonly string[],
): void {
  let y = top;
  for (const lines of rows.map((row) => linesIn(right - left, letter, row))) {
    const bottom = y - (lines.length * lineSpacing + 0.6) * letter;
    drawing.box("TITLE-BLOCK", [left, bottom], [right, y]);
    lines.forEach((line, index) => {
      drawing.text("TITLE-BLOCK", [left + letter, y - (index + 1) * lineSpacing * letter], line, {
        height: letter,
      });
    });
    y = bottom;
  }
}

/** ISO 7200:2004, clauses 5.1 to 5.3, then what a reader needs to compute it again. */
function fieldsOf(
  record: JobRecord,
  { recordHash, engineVersion }: ReportContext,
  { exaggeration, endViews }: SheetScale,
): Field[] {
  const { machine, details, signature } = record;
  const { axial, offset } = machine.units;
  const converted =
    axial === "mm" && offset === "mm"
      ? ""
      : `; the record is in ${axial} and ${offset}, converted to mm here`;
  const fields: readonly (readonly [string, string | null | undefined])[] = [
    ["Legal owner", ownerOf(record)],
    ["Title", `${machine.name}: bore alignment, ${record.title}`],
    ["Document type", "Alignment record: elevation, plan and end views"],
    ["Identification number", record.id],
    ["Revision index", String(record.revision)],
    ["Date of issue", dateOf(record).toISOString().slice(0, 10)],
    ["Creator", creatorOf(record)],
    ["Approval person", signature?.name ?? draftMark],
    ["Status", signatureWords(record)],
    ["Sheet", "1/1"],
    ["Site, order", [details.site, details.orderNumber].filter(Boolean).join(", ")],
    ["Downstream, where z increases", machine.downstream],
    ["Units", `mm${converted}`],
    [
      "Scale",
      `1:1 along z; across it ${writeTimes(exaggeration)} as large, in the end views ${writeTimes(endViews.exaggeration)}. Elevation and plan show target + deviation, each survey from its own axis.`,
    ],
    ["Axis", axisWords(record)],
    ["Verdicts", verdictWords(record)],
    ["Surveys", surveyWords(record)],
    ["Record hash", recordHash],
    ["Engine version", engineVersion],
  ];
  return fields.flatMap(([name, value]) => (value ? [[name, value] as const] : []));
}

function surveyWords(record: JobRecord): string {
  const { found, others, left } = reportedSurveys(record);
  const drawn = [
    ...(found ? ["as found on layer AS-FOUND"] : []),
    ...(left ? ["as left on layer AS-LEFT"] : []),
    ...others.map((survey) => `${numberedName(survey)}, in the other forms of the report`),
  ];
  return drawn.length > 0 ? drawn.join("; ") : "none has been computed";
}
