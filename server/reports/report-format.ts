import type { JobRecord } from "../../shared/schemas/jobs.ts";

/** What a report is made of, beside the record: the same record and the same of these give the same bytes. */
export interface ReportContext {
  /** What computed the record's newest results. */
  readonly engineVersion: string;
  /** sha256 of the log as it stands: the signature's own where the job is signed. */
  readonly recordHash: string;
}

/** One form of the report of a job. */
export interface ReportFormat {
  /** As it stands in the address: report.<extension>. */
  readonly extension: string;
  readonly mediaType: string;
  /** Pure: no clock, no chance; a draft says so on every sheet. */
  readonly write: (record: JobRecord, context: ReportContext) => Buffer | Promise<Buffer>;
}

/** What stands on every report of a job that is not signed. */
export const draftMark = "DRAFT, not signed";

/** The moment a report is dated: the signature's, or the last entry's of a draft. Never the clock's. */
export function dateOf({ signature, ...record }: JobRecord): Date {
  if (signature) return new Date(signature.createdAt);
  const moments = [
    record.createdAt,
    ...record.surveys.flatMap((survey) => [survey.createdAt, survey.result?.createdAt ?? survey.createdAt]),
    ...[
      record.plans,
      record.moves,
      record.confirmations,
      record.concessions,
      record.axisAcceptances,
      record.comments,
      record.attachments,
    ].flatMap((entries) => entries.map(({ createdAt }) => createdAt)),
  ];
  return new Date(Math.max(...moments.map((moment) => Date.parse(moment))));
}
