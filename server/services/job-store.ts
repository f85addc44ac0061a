import type { Transaction } from "sequelize";
import { limits } from "../../shared/limits.ts";
import type { JobFlag } from "../../shared/schemas/job-surveys.ts";
import type { MachineDocument } from "../../shared/schemas/machines.ts";
import type { Deps } from "../deps.ts";
import { HttpProblem } from "../http/http-problem.ts";
import {
  readJobLog,
  type EntryDocuments,
  type JobEntry,
  type JobEntryKind,
  type JobState,
} from "../jobs/job-log.ts";
import type { Job } from "../models/job.ts";
import type { JobEntryRow } from "../models/job-entry.ts";
import { authorColumns, nameOfCaller, type By } from "./author.ts";
import { eventOfEntry } from "../webhooks/event-of-entry.ts";
import { tell } from "../webhooks/events.ts";
import { documentOf, findRevision } from "./machines.ts";

/** A job as its log tells it, on the revision of the machine that it started with. */
export interface LoadedJob {
  readonly row: Job;
  /** The revision of the job that was read. */
  readonly revision: number;
  readonly machine: MachineDocument;
  readonly machineHash: string;
  readonly rows: readonly JobEntryRow[];
  readonly entries: readonly JobEntry[];
  readonly state: JobState;
}

export interface NewEntry<Kind extends JobEntryKind = JobEntryKind> {
  readonly kind: Kind;
  readonly document: EntryDocuments[Kind];
}

/**
 * Reads a job of an organisation: its newest revision, or the one asked for.
 * @throws HttpProblem not_found, alike for an id that never was and for another organisation's
 */
export async function loadJob(
  deps: Deps,
  organisationId: string,
  id: string,
  { revision, transaction }: { readonly revision?: number; readonly transaction?: Transaction } = {},
): Promise<LoadedJob> {
  const { models } = deps.database;
  const within = transaction ? { transaction } : {};
  const row = transaction
    ? await lockJob(deps, transaction, organisationId, id)
    : await models.jobs.findOne({ where: { id, organisationId } });
  if (!row) throw noSuchJob();
  const wanted = revision ?? row.revision;
  const rows = await models.jobEntries.findAll({
    where: { jobId: id, organisationId, revision: wanted },
    order: ["sequence"],
    ...within,
  });
  if (rows.length === 0) throw new HttpProblem("not_found", "The job has no revision with this number.");
  const machine = await findRevision(
    deps,
    { id: row.machineId, organisationId },
    row.machineRevision,
    transaction,
  );
  const entries = rows.map(entryOf);
  return {
    row,
    revision: wanted,
    machine: documentOf(machine),
    machineHash: machine.documentHash,
    rows,
    entries,
    state: readJobLog(entries),
  };
}

/**
 * Takes a job's row for this transaction alone: events are numbered, and a signature is set, while it is held.
 * @throws HttpProblem not_found
 */
export async function lockJob(
  { database }: Pick<Deps, "database">,
  transaction: Transaction,
  organisationId: string,
  id: string,
): Promise<Job> {
  const lock = transaction.LOCK.UPDATE;
  const row = await database.models.jobs.findOne({ where: { id, organisationId }, transaction, lock });
  if (!row) throw noSuchJob();
  return row;
}

const noSuchJob = () => new HttpProblem("not_found", "There is no job with this id.");

/** What adding to a log came to. */
export interface Added {
  readonly ids: readonly string[];
  readonly version: number;
  readonly flags: readonly JobFlag[];
}

/**
 * Adds entries to a job that is locked for it, in the transaction that locks it.
 * @throws HttpProblem job_signed, call_too_large where a log grows past all use
 */
export async function appendEntries(
  deps: Deps,
  transaction: Transaction,
  { row, rows }: Pick<LoadedJob, "row" | "rows">,
  added: readonly NewEntry[],
  by: Pick<By, "caller">,
): Promise<Added> {
  refuseSigned(row);
  const texts = added.map(({ document }) => JSON.stringify(document));
  refuseTooMuch(rows, texts);
  const last = rows.at(-1)?.sequence ?? 0;
  const createdAt = deps.now();
  const firstEvent = row.events + 1;
  const made = added.map(({ kind }, index) => ({
    jobId: row.id,
    revision: row.revision,
    sequence: last + 1 + index,
    id: deps.newId(),
    organisationId: row.organisationId,
    kind,
    documentText: texts[index] ?? "",
    createdAt,
    event: firstEvent + index,
    ...authorColumns(by.caller),
    authorName: nameOfCaller(by.caller),
  }));
  await deps.database.models.jobEntries.bulkCreate(made, { transaction });
  await row.update({ version: row.version + 1, events: row.events + made.length }, { transaction });
  for (const [index, entry] of added.entries()) {
    const event = eventOfEntry(row, made[index]?.id ?? "", entry);
    if (event) await tell(deps, transaction, event);
  }
  return { ids: made.map(({ id }) => id), version: row.version, flags: [] };
}

/** @throws HttpProblem call_too_large where a log grows past all use: each page of a job reads all of it */
export function refuseTooMuch(
  rows: readonly Pick<JobEntryRow, "documentText">[],
  added: readonly string[],
): void {
  const { entriesPerJob, charactersPerJob } = limits;
  if (rows.length + added.length > entriesPerJob) {
    throw new HttpProblem("call_too_large", `A job's log holds ${entriesPerJob} entries.`, {
      limit: entriesPerJob,
    });
  }
  const texts = [...rows.map(({ documentText }) => documentText), ...added];
  if (texts.reduce((sum, { length }) => sum + length, 0) > charactersPerJob) {
    throw new HttpProblem("call_too_large", `A job's log holds ${charactersPerJob} characters.`, {
      limit: charactersPerJob,
    });
  }
}

/** @throws HttpProblem job_signed */
export function refuseSigned({ state, revision }: Pick<Job, "state" | "revision">): void {
  if (state === "signed") throw new HttpProblem("job_signed", `Revision ${revision} of the job is signed.`);
}

function entryOf(row: JobEntryRow): JobEntry {
  const { kind, id, createdAt, memberId, keyId, authorName, documentText } = row;
  return {
    kind,
    id,
    createdAt,
    memberId,
    keyId,
    authorName,
    document: JSON.parse(documentText) as EntryDocuments[typeof kind],
  };
}
