import { writeWorkbook } from "../../spreadsheets/write-workbook.ts";
import { computedSurvey } from "../found-and-left.ts";
import { dateOf, type ReportFormat } from "../report-format.ts";
import { creatorOf, signatureWords } from "../report-words.ts";
import { conditionsSheet } from "./conditions-sheet.ts";
import { movesSheet } from "./moves-sheet.ts";
import { summarySheet } from "./summary-sheet.ts";
import { surveySheet } from "./survey-sheet.ts";

/** A workbook in which a customer can compute every deviation again, from centres, targets and axis. */
export const xlsxReport: ReportFormat = {
  extension: "xlsx",
  mediaType: "application/vnd.openxmlformats-officedocument.spreadsheetml.sheet",
  write: (record, context) =>
    writeWorkbook({
      title: `${record.machineName}: ${record.title}`,
      creator: creatorOf(record) ?? "",
      description: `Job ${record.id}, revision ${record.revision}. ${signatureWords(record)}. Record ${context.recordHash}. Engine ${context.engineVersion}.`,
      createdAt: dateOf(record),
      pageHead: { left: `${record.machineName}: ${record.title}`, right: signatureWords(record) },
      pageFoot: [`Job ${record.id} r${record.revision}`, `Record ${context.recordHash}`],
      sheets: [
        summarySheet(record, context),
        surveySheet(record, "As found", computedSurvey(record, "as_found")),
        movesSheet(record),
        surveySheet(record, "As left", computedSurvey(record, "as_left")),
        conditionsSheet(record),
      ],
    }),
};
