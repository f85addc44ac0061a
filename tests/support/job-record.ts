import { fellgateDocument } from "../../server/demo/fellgate-document.ts";
import {
  asFoundReadings,
  asFoundSurvey,
  asLeftReadings,
  asLeftSurvey,
  fellgateChecks,
  fellgateJobDetails,
  movesAsPlanned,
} from "../../server/demo/fellgate-job.ts";
import type { ReportContext } from "../../server/reports/report-format.ts";
import type { JobRecord } from "../../shared/schemas/jobs.ts";
import { JobWriter } from "./job-writer.ts";

/** How far the demo's job has come. */
export type FellgateStage = "started" | "found" | "planned" | "left";

/** The demo's job as far as `stage`, all of it computed and nothing drawn by chance. */
export function writeFellgateJob(stage: FellgateStage = "left"): JobWriter {
  const job = new JobWriter(fellgateDocument, fellgateJobDetails);
  if (stage === "started") return job;
  for (const check of fellgateChecks) job.add("check", check);
  const found = job.survey(asFoundSurvey, asFoundReadings());
  if (stage === "found") return job;
  const plan = job.plan(found);
  if (stage === "planned") return job;
  for (const move of movesAsPlanned(plan)) job.add("move", move);
  const left = job.survey(asLeftSurvey, asLeftReadings(job.resultOf(found), plan));
  job.confirm(found, left);
  return job;
}

/** The record of the demo's job: as found, moved, as left, confirmed; signed where asked. */
export function fellgateRecord({ signed }: { readonly signed: boolean }): JobRecord {
  return fellgateReport({ signed }).record;
}

/** The same with what its reports are made of beside it. */
export function fellgateReport({ signed }: { readonly signed: boolean }): {
  readonly record: JobRecord;
  readonly context: ReportContext;
} {
  const job = writeFellgateJob();
  if (signed) job.sign();
  return { record: job.record(), context: job.context() };
}
