import type { EntryDocuments, JobEntryKind } from "../jobs/job-log.ts";
import type { Job } from "../models/job.ts";
import type { WebhookEvent } from "./events.ts";

interface Entry<Kind extends JobEntryKind = JobEntryKind> {
  readonly kind: Kind;
  readonly document: EntryDocuments[Kind];
}

const is = <Kind extends JobEntryKind>(kind: Kind, entry: Entry): entry is Entry<Kind> => entry.kind === kind;

/** What is told of an entry in a job's log; null for those that nobody is told of. */
export function eventOfEntry(
  job: Pick<Job, "id" | "organisationId" | "machineId" | "revision">,
  entryId: string,
  entry: Entry,
): WebhookEvent | null {
  const { organisationId, machineId, revision } = job;
  const place = { jobId: job.id, machineId, revision, entryId };
  if (is("survey_result", entry)) {
    const { survey, boreFit, axisDeviation } = entry.document;
    return {
      organisationId,
      type: "survey.computed",
      data: { ...place, surveyId: survey, boreFitId: boreFit, axisDeviationId: axisDeviation },
    };
  }
  if (is("signature", entry)) {
    return { organisationId, type: "job.signed", data: { ...place, recordHash: entry.document.recordHash } };
  }
  return null;
}
