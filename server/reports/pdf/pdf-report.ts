import { setImmediate } from "node:timers/promises";
import PDFDocument from "pdfkit";
import type { JobRecord } from "../../../shared/schemas/jobs.ts";
import { dateOf, draftMark, type ReportContext, type ReportFormat } from "../report-format.ts";
import { creatorOf } from "../report-words.ts";
import { layOutSections } from "./layout/lay-out-sections.ts";
import { legibleLine } from "./layout/legible-text.ts";
import { sheetSize } from "./layout/sheet-geometry.ts";
import { Canvas } from "./paint/canvas.ts";
import { paintFrame, paintState } from "./paint/paint-frame.ts";
import { paintSheet } from "./paint/paint-sheet.ts";
import { Tags } from "./paint/tags.ts";
import { reportType } from "./paint/title-fields.ts";
import { sectionsOf } from "./sections/sections-of.ts";

/**
 * The record as drawing sheets, A3 across: tagged, selectable, lettered in IBM Plex Mono. Dates and the document's id
 * come from the record alone, so that the same record gives the same bytes.
 */
export const pdfReport: ReportFormat = {
  extension: "pdf",
  mediaType: "application/pdf",
  write: async (record, context) => {
    const document = openDocument(record, context);
    const written = collect(document);
    const canvas = new Canvas(document);
    const tags = new Tags(document);
    const sheets = layOutSections(sectionsOf(record, context));
    for (const [index, sheet] of sheets.entries()) {
      // A long report lets other calls in between its sheets.
      await setImmediate();
      canvas.addPage(sheetSize);
      if (sheet.first) {
        tags.beginPart(legibleLine(sheet.section));
        document.outline.addItem(legibleLine(sheet.section));
      }
      tags.artifact(
        () => paintFrame(canvas, record, context, { sheet: index + 1, sheets: sheets.length }),
        "Pagination",
      );
      tags.content("P", () => paintState(canvas, record));
      paintSheet(canvas, tags, sheet);
    }
    tags.endPart();
    document.end();
    return written;
  },
};

function openDocument(record: JobRecord, { recordHash, engineVersion }: ReportContext): PDFKit.PDFDocument {
  const { machineName, title, revision, signature } = record;
  const date = dateOf(record);
  return new PDFDocument({
    autoFirstPage: false,
    pdfVersion: "1.7",
    lang: "en",
    tagged: true,
    displayTitle: true,
    info: {
      Title: legibleLine(`${machineName}: ${title}, revision ${revision}`),
      Author: legibleLine(creatorOf(record) ?? "not stated"),
      Subject: legibleLine(`${reportType}, ${signature ? `signed by ${signature.name}` : draftMark}`),
      Keywords: legibleLine(
        ["alignment", "as found", "as left", record.id, recordHash, `engine ${engineVersion}`].join(", "),
      ),
      Creator: "Borewright",
      CreationDate: date,
      ModDate: date,
    },
  });
}

function collect(document: PDFKit.PDFDocument): Promise<Buffer> {
  return new Promise((resolve, reject) => {
    const parts: Buffer[] = [];
    document.on("data", (part: Buffer) => parts.push(part));
    document.on("end", () => resolve(Buffer.concat(parts)));
    document.on("error", reject);
  });
}
