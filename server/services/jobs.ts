import type { Transaction } from "sequelize";
import type { z } from "zod";
import type { JobDetails, LoggedMove } from "../../shared/schemas/job-entries.ts";
import type { createJobRequest, JobRecord } from "../../shared/schemas/jobs.ts";
import type { Deps } from "../deps.ts";
import { HttpProblem, problemOfFaults } from "../http/http-problem.ts";
import { jobDetailsFaults } from "../jobs/job-faults.ts";
import { withdrawable, type JobEntry } from "../jobs/job-log.ts";
import { axisStations } from "../jobs/job-requests.ts";
import { moveEffectFlags, moveOrderFlags } from "../jobs/move-order.ts";
import type { Job } from "../models/job.ts";
import { presentJob } from "../presenters/present-job.ts";
import { isoTime } from "../presenters/time.ts";
import type { By } from "./author.ts";
import { readCallerNames } from "./caller-names.ts";
import { loadResults } from "./job-results.ts";
import {
  appendEntries,
  loadJob,
  refuseSigned,
  type Added,
  type LoadedJob,
  type NewEntry,
} from "./job-store.ts";
import { documentOf, findMachine, findRevision, refuseStale } from "./machines.ts";
import { recordAudit, type AuditAction } from "./record-audit.ts";

/**
 * Starts a job on a machine; it keeps the revision that it starts with.
 * @throws HttpProblem not_found, machine_archived, and every fault of the details under /details
 */
export async function createJob(
  deps: Deps,
  transaction: Transaction,
  { machineId, machineRevision, details }: z.infer<typeof createJobRequest>,
  by: By,
): Promise<Job> {
  const organisationId = by.caller.organisation.id;
  const machine = await findMachine(deps, organisationId, machineId, transaction);
  if (machine.archivedAt) throw new HttpProblem("machine_archived", `${machine.name} is archived.`);
  const revision = await findRevision(deps, machine, machineRevision ?? machine.revision, transaction);
  refuseDetails(details, documentOf(revision));
  const job = await deps.database.models.jobs.create(
    {
      id: deps.newId(),
      organisationId,
      machineId,
      machineRevision: revision.revision,
      title: details.title,
      revision: 1,
      state: "open",
      createdAt: deps.now(),
    },
    { transaction },
  );
  await appendEntries(
    deps,
    transaction,
    { row: job, rows: [] },
    [{ kind: "details", document: details }],
    by,
  );
  await audit(deps, transaction, "job.created", job, by, { title: details.title });
  return job;
}

/**
 * Replaces a job's details, where the job still is at the version the caller read.
 * @throws HttpProblem not_found, version_stale, job_signed, and every fault of the details
 */
export async function updateJob(
  deps: Deps,
  transaction: Transaction,
  { id, version }: { readonly id: string; readonly version: number },
  details: JobDetails,
  by: By,
): Promise<Job> {
  const loaded = await loadJob(deps, by.caller.organisation.id, id, { transaction });
  refuseStale("job", loaded.row.version, version);
  refuseDetails(details, loaded.machine);
  await appendEntries(deps, transaction, loaded, [{ kind: "details", document: details }], by);
  await loaded.row.update({ title: details.title }, { transaction });
  await audit(deps, transaction, "job.changed", loaded.row, by, {
    before: loaded.state.details,
    after: details,
  });
  return loaded.row;
}

/** Adds what `entriesOf` makes of the job as it stands, locked meanwhile. */
export async function addToJob(
  deps: Deps,
  transaction: Transaction,
  id: string,
  by: By,
  entriesOf: (loaded: LoadedJob) => readonly NewEntry[],
): Promise<Added> {
  const loaded = await loadJob(deps, by.caller.organisation.id, id, { transaction });
  return appendEntries(deps, transaction, loaded, entriesOf(loaded), by);
}

/**
 * Logs a move. What is out of the usual order is stored as such, and only with a reason.
 * @throws HttpProblem unknown_reference, reason_required
 */
export async function logMove(
  deps: Deps,
  transaction: Transaction,
  id: string,
  move: LoggedMove,
  by: By,
): Promise<Added> {
  const loaded = await loadJob(deps, by.caller.organisation.id, id, { transaction });
  const { machine, state } = loaded;
  refuseSigned(loaded.row);
  refuseUnknownParts(loaded, move);
  const plan = state.plans.at(-1);
  const planned = plan
    ? (await loadResults(deps, loaded, transaction)).moves(plan.document.calculation)
    : null;
  const order = moveOrderFlags(
    machine,
    planned,
    state.moves.map(({ document }) => document),
    move,
  );
  if (order.length > 0 && !move.reason) {
    throw problemOfFaults(
      order.map(({ detail }) => ({ pointer: "/reason", code: "reason_required" as const, detail })),
    );
  }
  const effects = moveEffectFlags(machine, axisStations({ machine, details: state.details }), move);
  const added = await appendEntries(deps, transaction, loaded, [{ kind: "move", document: move }], by);
  return { ...added, flags: [...order, ...effects] };
}

/**
 * Takes an entry back. It stays in the log, and counts no more.
 * @throws HttpProblem not_found, entry_not_withdrawable
 */
export async function withdrawEntry(
  deps: Deps,
  transaction: Transaction,
  place: { readonly id: string; readonly entry: string },
  reason: string,
  by: By,
): Promise<Added> {
  const loaded = await loadJob(deps, by.caller.organisation.id, place.id, { transaction });
  const entry = loaded.entries.find(({ id }) => id === place.entry);
  if (!entry) throw new HttpProblem("not_found", "The job has no entry with this id.");
  if (!withdrawable.includes(entry.kind)) {
    throw new HttpProblem("entry_not_withdrawable", `An entry of kind ${entry.kind} cannot be withdrawn.`);
  }
  if (isWithdrawn(loaded.entries, entry.id)) {
    throw new HttpProblem("entry_not_withdrawable", "The entry has been withdrawn already.");
  }
  const document = { entry: entry.id, reason };
  const added = await appendEntries(deps, transaction, loaded, [{ kind: "withdrawal", document }], by);
  await audit(deps, transaction, "job.entry_withdrawn", loaded.row, by, { ...document, kind: entry.kind });
  return added;
}

function isWithdrawn(entries: readonly JobEntry[], id: string): boolean {
  return entries.some(
    (entry) => entry.kind === "withdrawal" && (entry.document as { entry: string }).entry === id,
  );
}

/** The whole record of a job, as it is or as an earlier revision was. */
export async function readJobRecord(
  deps: Deps,
  organisationId: string,
  id: string,
  revision?: number,
): Promise<JobRecord> {
  const loaded = await loadJob(deps, organisationId, id, revision === undefined ? {} : { revision });
  return recordOf(deps, loaded);
}

/** Inside a transaction everything is read through it: a second connection could wait for the first for ever. */
export async function recordOf(deps: Deps, loaded: LoadedJob, transaction?: Transaction): Promise<JobRecord> {
  const { organisationId } = loaded.row;
  const [results, names, revisions] = await Promise.all([
    loadResults(deps, loaded, transaction),
    readCallerNames(deps.database, organisationId, loaded.rows, transaction),
    readRevisions(deps, loaded.row, transaction),
  ]);
  return presentJob({ loaded, results, names, revisions });
}

async function readRevisions(
  deps: Deps,
  { id, organisationId, revision }: Job,
  transaction?: Transaction,
): Promise<JobRecord["revisions"]> {
  const rows = await deps.database.models.jobEntries.findAll({
    where: { jobId: id, organisationId, kind: ["revision", "signature"] },
    order: ["revision", "sequence"],
    ...(transaction ? { transaction } : {}),
  });
  return Array.from({ length: revision }, (_, index) => {
    const own = rows.filter((row) => row.revision === index + 1);
    const reasons = own.filter(({ kind }) => kind === "revision");
    const signed = own.find(({ kind }) => kind === "signature");
    const reason = reasons.at(-1);
    return {
      revision: index + 1,
      reason: index > 0 && reason ? (JSON.parse(reason.documentText) as { reason: string }).reason : null,
      signedAt: signed ? isoTime(signed.createdAt) : null,
    };
  });
}

function refuseUnknownParts({ machine }: LoadedJob, { component, moved = [] }: LoggedMove): void {
  const part = machine.components?.find(({ id }) => id === component);
  const unknown = (pointer: string, what: string) => ({
    pointer,
    code: "unknown_reference" as const,
    detail: `The machine has no ${what} with this id.`,
  });
  if (!part) throw problemOfFaults([unknown("/component", "component")]);
  const supports = (part.supports ?? []).map(({ id }) => id);
  const faults = moved.flatMap(({ support }, index) =>
    supports.includes(support) ? [] : [unknown(`/moved/${index}/support`, `support of ${component}`)],
  );
  if (faults.length > 0) throw problemOfFaults(faults);
}

function refuseDetails(details: JobDetails, machine: LoadedJob["machine"]): void {
  const faults = jobDetailsFaults(details, machine);
  if (faults.length > 0) throw problemOfFaults(faults);
}

export async function audit(
  deps: Deps,
  transaction: Transaction,
  action: Extract<AuditAction, `job.${string}`>,
  { id, organisationId }: Pick<Job, "id" | "organisationId">,
  by: By,
  details: Record<string, unknown>,
): Promise<void> {
  await recordAudit(deps, transaction, {
    action,
    subject: id,
    organisationId,
    by: by.caller,
    requestId: by.requestId,
    details,
  });
}
