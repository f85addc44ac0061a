import { createHash } from "node:crypto";
import type { JobRecord } from "../../shared/schemas/jobs.ts";
import { engineVersion } from "../compute/version.ts";
import type { Deps } from "../deps.ts";
import type { ReportContext, ReportFormat } from "../reports/report-format.ts";
import { loadResults } from "./job-results.ts";
import { loadJob } from "./job-store.ts";
import { recordOf } from "./jobs.ts";
import { hashOf } from "./sign-job.ts";

export interface MadeReport {
  readonly bytes: Buffer;
  readonly fileName: string;
  readonly etag: string;
}

/** Of which job, and of which of its revisions: the newest where none is named. */
export interface ReportedJob {
  readonly id: string;
  readonly revision?: number;
}

/**
 * Reads a job's record, with what its reports are made of beside it.
 * @throws HttpProblem not_found
 */
export async function readForReport(
  deps: Deps,
  organisationId: string,
  { id, revision }: ReportedJob,
): Promise<{ readonly record: JobRecord; readonly context: ReportContext }> {
  const loaded = await loadJob(deps, organisationId, id, revision === undefined ? {} : { revision });
  const whole = await recordOf(deps, loaded);
  // Revisions begun after this one are nothing that it can tell: what was signed is handed out the same for ever.
  const record = {
    ...whole,
    revisions: whole.revisions.filter(({ revision: later }) => later <= whole.revision),
  };
  const recordHash = hashOf(loaded, await loadResults(deps, loaded));
  const computed = record.surveys
    .map(({ result }) => result?.engineVersion)
    .filter((version) => version !== undefined);
  return { record, context: { engineVersion: computed.at(-1) ?? engineVersion, recordHash } };
}

/**
 * Makes a report from a job's record.
 * @throws HttpProblem not_found
 */
export async function makeReport(
  deps: Deps,
  organisationId: string,
  job: ReportedJob,
  format: ReportFormat,
): Promise<MadeReport> {
  const { record, context } = await readForReport(deps, organisationId, job);
  const bytes = await deps.compute.report({ extension: format.extension, record, context });
  const name = `${record.title} r${record.revision}${record.signature ? "" : " draft"}`;
  return {
    bytes,
    // ASCII alone: a name in a header can hold no more without a dialect of its own.
    fileName: `${name
      .normalize("NFKD")
      .replaceAll(/[^A-Za-z0-9 ._-]/g, "")
      .trim()
      .replaceAll(" ", "-")}.${format.extension}`,
    etag: `"${createHash("sha256").update(bytes).digest("hex")}"`,
  };
}
