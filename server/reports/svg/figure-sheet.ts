import type { JobFigure } from "../../../shared/figures/job/job-figures.ts";
import { withNotes } from "../../../shared/figures/job/with-notes.ts";
import type { JobRecord } from "../../../shared/schemas/jobs.ts";
import { draftMark, type ReportContext } from "../report-format.ts";
import { concessionWords } from "../report-words.ts";
import { writeSvg } from "./write-svg.ts";

/** Width of what A4 across leaves inside a margin: lettering is 2.5 mm high on paper. */
const widthMm = 250;

/** A figure of a job with its flags, and with the record that it was drawn from, as an SVG file. */
export function writeJobFigure(figure: JobFigure, record: JobRecord, context: ReportContext): string {
  const state = record.signature ? `Signed by ${record.signature.name}` : draftMark;
  const words =
    `${figure.title}. ${record.machineName}. ${record.title}, revision ${record.revision}. ${state}. ` +
    `${conceded(figure, record)}Record ${context.recordHash}, engine ${context.engineVersion}.`;
  return writeSvg(withNotes(figure.draw(widthMm), { flags: flagsOf(figure, record), words }));
}

/** A station's concession stands under every figure that judges it. */
function conceded({ survey }: JobFigure, record: JobRecord): string {
  const words = survey === null ? concessionWords(record) : null;
  return words ? `${words} ` : "";
}

/** A bore section bears what is said of its survey; every other figure what is said of the whole job. */
function flagsOf({ survey }: JobFigure, record: JobRecord): JobRecord["flags"] {
  if (survey === null) return record.flags;
  return record.surveys.find(({ id }) => id === survey)?.flags ?? [];
}
