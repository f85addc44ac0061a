import { writeWorkbook } from "../../spreadsheets/write-workbook.ts";
import { numberedName, reportedSurveys } from "../found-and-left.ts";
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
  write: (record, context) => {
    const { found, others, left } = reportedSurveys(record);
    return writeWorkbook({
      title: `${record.machineName}: ${record.title}`,
      creator: creatorOf(record) ?? "",
      description: `Job ${record.id}, revision ${record.revision}. ${signatureWords(record)}. Record ${context.recordHash}. Engine ${context.engineVersion}.`,
      createdAt: dateOf(record),
      pageHead: { left: `${record.machineName}: ${record.title}`, right: signatureWords(record) },
      pageFoot: [`Job ${record.id} r${record.revision}`, `Record ${context.recordHash}`],
      sheets: [
        summarySheet(record, context),
        surveySheet(record, "As found", found),
        movesSheet(record),
        ...others.map((survey) => {
          const stage = numberedName(survey);
          return surveySheet(
            record,
            `Survey ${survey.number}`,
            survey,
            `${stage.charAt(0).toUpperCase()}${stage.slice(1)}`,
          );
        }),
        surveySheet(record, "As left", left),
        conditionsSheet(record),
      ],
    });
  },
};
