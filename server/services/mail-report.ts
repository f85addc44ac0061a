import { createHash } from "node:crypto";
import type { z } from "zod";
import { cautions } from "../../shared/cautions.ts";
import type { reportMail, reportMailRequest } from "../../shared/schemas/report-mails.ts";
import type { Deps } from "../deps.ts";
import { problemOfFaults } from "../http/http-problem.ts";
import { sendMail } from "../mail/send-mail.ts";
import { reportFormats } from "../reports/index.ts";
import type { ReportFormat } from "../reports/report-format.ts";
import type { By } from "./author.ts";
import { inTransaction } from "./in-transaction.ts";
import { readJobRecord } from "./jobs.ts";
import { makeReport } from "./make-report.ts";
import { recordAudit } from "./record-audit.ts";

/**
 * Mails a job's reports to named recipients, and keeps in the audit who sent what to whom. The mail goes first: it
 * cannot be taken back, where an audit of a mail that never went would be a lie.
 * @throws HttpProblem not_found, choice_unknown at /formats, and what sendMail throws
 */
export async function mailReport(
  deps: Deps,
  id: string,
  order: z.infer<typeof reportMailRequest>,
  by: By,
): Promise<z.infer<typeof reportMail>> {
  const organisationId = by.caller.organisation.id;
  const record = await readJobRecord(deps, organisationId, id);
  const reports = await Promise.all(
    formatsOf(order.formats).map(async (format) => ({
      format,
      ...(await makeReport(deps, organisationId, { id }, format)),
    })),
  );
  const state = record.signature ? "signed" : "draft, not signed";
  const subject = `${oneLine(record.machineName)}: ${oneLine(record.title)}, revision ${record.revision} (${state})`;
  const sender = by.caller.by === "member" ? by.caller.member.name : by.caller.key.name;
  const files = reports.map(({ fileName, bytes }) => ({
    name: fileName,
    bytes: bytes.length,
    sha256: createHash("sha256").update(bytes).digest("hex"),
  }));
  const { notTaken } = await sendMail(deps, {
    organisationId,
    to: [...order.to],
    subject,
    text: [
      ...(order.message ? [order.message, ""] : []),
      `Sent by ${oneLine(sender)}, ${oneLine(by.caller.organisation.name)}.`,
      `Job ${record.id}, revision ${record.revision}, ${state}.`,
      "",
      ...files.map(({ name, sha256 }) => `${name}, sha256 ${sha256}`),
      "",
      ...cautions.map(({ text }) => text),
    ].join("\n"),
    attachments: reports.map(({ format, fileName, bytes }) => ({
      filename: fileName,
      contentType: format.mediaType,
      content: bytes,
    })),
  });
  await inTransaction(deps.database.sequelize, (transaction) =>
    recordAudit(deps, transaction, {
      action: "job.report_mailed",
      subject: id,
      organisationId,
      by: by.caller,
      requestId: by.requestId,
      details: { to: order.to, notTaken, files },
    }),
  );
  return { to: order.to, notTaken, subject, files };
}

function formatsOf(wanted: readonly string[]): ReportFormat[] {
  const found = wanted.map((extension) => reportFormats.find((format) => format.extension === extension));
  const faults = found.flatMap((format, index) =>
    format
      ? []
      : [
          {
            pointer: `/formats/${index}`,
            code: "choice_unknown" as const,
            detail: `A report comes as ${reportFormats.map(({ extension }) => extension).join(", ")}.`,
          },
        ],
  );
  if (faults.length > 0) throw problemOfFaults(faults);
  return found.filter((format) => format !== undefined);
}

/** A title may hold anything; a header holds one line. */
const oneLine = (text: string): string => text.replaceAll(/[\p{Cc}\p{Cf}]+/gu, " ").trim();
