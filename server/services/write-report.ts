import type { JobRecord } from "../../shared/schemas/jobs.ts";
import { reportFormats } from "../reports/index.ts";
import type { ReportContext } from "../reports/report-format.ts";

/** A report as a thread is asked for it: by the name of its form. */
export interface ReportTask {
  readonly extension: string;
  readonly record: JobRecord;
  readonly context: ReportContext;
}

/** The bytes of a report, here and now. */
export async function writeReport({ extension, record, context }: ReportTask): Promise<Uint8Array> {
  const format = reportFormats.find((one) => one.extension === extension);
  if (!format) throw new Error(`There is no report in the form ${extension}.`);
  return format.write(record, context);
}
