import { z } from "zod";
import { HttpProblem } from "../http/http-problem.ts";
import { callerOf, defineOperation, reply, type Call, type Reply } from "../http/operation.ts";
import { reportFormats } from "../reports/index.ts";
import type { ReportFormat } from "../reports/report-format.ts";
import { revisionQuery } from "../../shared/schemas/jobs.ts";
import { reportMail, reportMailRequest } from "../../shared/schemas/report-mails.ts";
import { byOf } from "../http/call-parts.ts";
import { mailReport } from "../services/mail-report.ts";
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

const mailReportOperation = defineOperation({
  operationId: "mailReport",
  method: "post",
  path: "/v1/jobs/{id}/report-mails",
  tag,
  summary: "Mail a job's report",
  description: "To named recipients, in the forms asked for; a report of a job that is not signed says so.",
  body: reportMailRequest,
  requestExamples: () => ({
    owner: {
      summary: "To the owner's engineer",
      value: { to: ["owner@fellgate.example"], formats: ["pdf", "xlsx"], message: "As agreed on site." },
    },
  }),
  response: { status: 201, description: "What was sent.", schema: reportMail },
  errors: ["mail_refused", "mail_unavailable"],
  handle: async (call) =>
    reply(201, await mailReport(call.deps, call.params.id ?? "", call.body, byOf(call))),
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

export const jobReportOperations = [readReport, readReportFile, mailReportOperation];
