import { csvReport } from "./csv/csv-report.ts";
import { dxfReport } from "./dxf/dxf-report.ts";
import { jsonReport } from "./json-report.ts";
import { pdfReport } from "./pdf/pdf-report.ts";
import type { ReportFormat } from "./report-format.ts";
import { xlsxReport } from "./xlsx/xlsx-report.ts";

/** Every form of a report, the first being the one sent where a caller states none. */
export const reportFormats: readonly ReportFormat[] = [
  jsonReport,
  pdfReport,
  xlsxReport,
  csvReport,
  dxfReport,
];
