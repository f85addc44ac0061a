import type { JobRecord } from "../../../shared/schemas/jobs.ts";
import { dateOf, draftMark, type ReportContext } from "../report-format.ts";
import { creatorOf, ownerOf, signatureWords } from "../report-words.ts";
import { Drawing } from "./drawing.ts";
import type { SheetScale } from "./sheet-scale.ts";

type Field = readonly [name: string, value: string];

/** The fields of ISO 7200, what the drawing is made from, and beside them flags and cautions. */
export function drawTitleBlock(
  drawing: Drawing,
  record: JobRecord,
  context: ReportContext,
  scale: SheetScale,
): void {
  const { letter, exaggeration } = scale;
  const { left, top, width } = scale.titleBlock;
  const middle = left + 0.62 * width;
  const fields = fieldsOf(record, context, exaggeration).map(([name, value]) => `${name}: ${value}`);
  drawColumn(drawing, letter, [left, middle, top], fields);
  drawColumn(
    drawing,
    letter,
    [middle, left + width, top],
    [
      ...record.flags.map(({ detail }) => `Flag: ${detail}`),
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
  const signs = Math.floor((right - left - 2 * letter) / (letter * Drawing.signWidth));
  let y = top;
  for (const lines of rows.map((row) => wrap(row, signs))) {
    const bottom = y - (lines.length * 1.7 + 0.6) * letter;
    drawing.box("TITLE-BLOCK", [left, bottom], [right, y]);
    lines.forEach((line, index) => {
      drawing.text("TITLE-BLOCK", [left + letter, y - (index + 1) * 1.7 * letter], line, { height: letter });
    });
    y = bottom;
  }
}

/** ISO 7200:2004, clauses 5.1 to 5.3, then what a reader needs to compute it again. */
function fieldsOf(
  record: JobRecord,
  { recordHash, engineVersion }: ReportContext,
  exaggeration: number,
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
    ["Document type", "Alignment record: elevation, plan and end view"],
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
      `1:1 along z; across it, and in the end view, ${Number(exaggeration.toPrecision(6))} times as large. Elevation and plan show target + deviation, each survey from its own axis.`,
    ],
    ["Surveys", surveyWords(record)],
    ["Record hash", recordHash],
    ["Engine version", engineVersion],
  ];
  return fields.flatMap(([name, value]) => (value ? [[name, value] as const] : []));
}

function surveyWords({ surveys }: JobRecord): string {
  const has = (stage: string) => surveys.some(({ survey, result }) => survey.stage === stage && result);
  const drawn = [
    ...(has("as_found") ? ["as found on layer AS-FOUND"] : []),
    ...(has("as_left") ? ["as left on layer AS-LEFT"] : []),
  ];
  return drawn.length > 0 ? drawn.join(", ") : "none has been computed";
}

/** Lines of at most so many signs, broken between words where that can be. */
export function wrap(text: string, signs: number): string[] {
  const lines: string[] = [];
  let line = "";
  for (const word of text.split(/\s+/)) {
    for (const part of pieces(word, signs)) {
      if (line !== "" && line.length + 1 + part.length > signs) {
        lines.push(line);
        line = part;
      } else line = line === "" ? part : `${line} ${part}`;
    }
  }
  return line === "" ? lines : [...lines, line];
}

function pieces(word: string, signs: number): string[] {
  const all = [...word];
  return Array.from({ length: Math.ceil(all.length / signs) }, (_, index) =>
    all.slice(index * signs, (index + 1) * signs).join(""),
  );
}
