import { z } from "zod";
import { HttpProblem } from "../http/http-problem.ts";
import { callerOf, defineOperation, reply, type Call, type Reply } from "../http/operation.ts";
import { reportFormats } from "../reports/index.ts";
import type { ReportFormat } from "../reports/report-format.ts";
import { revisionQuery } from "../../shared/schemas/jobs.ts";
import { makeReport } from "../services/make-report.ts";

const tag = "Jobs";
const mediaTypes = reportFormats.map(({ mediaType }) => mediaType);
const description =
  "Made from the record at any time, marked as a draft until the job is signed; the same record gives the same bytes.";

const readReport = defineOperation({
  operationId: "readReport",
  method: "get",
  path: "/v1/jobs/{id}/report",
  tag,
  summary: "Read a job's report",
  description: `${description} The form is the one that Accept asks for.`,
  query: revisionQuery,
  response: { status: 200, description: "The report.", files: mediaTypes },
  errors: [],
  handle: (call) => {
    const wanted = call.request.accepts(mediaTypes);
    const format = reportFormats.find(({ mediaType }) => mediaType === wanted);
    if (!format) throw new HttpProblem("not_acceptable", `A report comes as ${mediaTypes.join(", ")}.`);
    return answer(call, format, call.query.revision);
  },
});

const readReportFile = defineOperation({
  operationId: "readReportFile",
  method: "get",
  path: "/v1/jobs/{id}/report.{format}",
  tag,
  summary: "Read a job's report as a file",
  description: `${description} The same bytes as by Accept, for browsers.`,
  params: { format: z.enum(reportFormats.map(({ extension }) => extension) as [string, ...string[]]) },
  query: revisionQuery,
  response: { status: 200, description: "The report.", files: mediaTypes },
  errors: [],
  handle: (call) => {
    const format = reportFormats.find(({ extension }) => extension === call.params.format);
    if (!format) throw new HttpProblem("not_found", "There is no report in this form.");
    return answer(call, format, call.query.revision);
  },
});

async function answer(
  call: Pick<Call, "deps" | "caller" | "params">,
  format: ReportFormat,
  revision: string | undefined,
): Promise<Reply> {
  const { bytes, fileName, etag } = await makeReport(
    call.deps,
    callerOf(call).organisation.id,
    { id: call.params.id ?? "", ...(revision === undefined ? {} : { revision: Number(revision) }) },
    format,
  );
  return reply(200, bytes, {
    "Content-Type": format.mediaType,
    "Content-Disposition": `attachment; filename="${fileName}"`,
    ETag: etag,
    Vary: "Accept, Authorization",
    "Cache-Control": "private, no-cache",
  });
}

export const jobReportOperations = [readReport, readReportFile];
