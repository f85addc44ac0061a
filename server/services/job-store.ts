import { Op, type Transaction } from "sequelize";
import type { AxisDeviationResult } from "../../shared/schemas/axis-deviations.ts";
import type { BoreFitResult } from "../../shared/schemas/bore-fits.ts";
import type { ConfirmationResult } from "../../shared/schemas/confirmation-answers.ts";
import { limits } from "../../shared/limits.ts";
import type { JobFlag } from "../../shared/schemas/jobs.ts";
import type { MachineDocument } from "../../shared/schemas/machines.ts";
import type { ShimMoveResult } from "../../shared/schemas/shim-moves.ts";
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
import { authorColumns, type By } from "./author.ts";
import { eventOfEntry } from "../webhooks/event-of-entry.ts";
import { tell } from "../webhooks/events.ts";
import { timeOfId } from "./ids.ts";
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

/** What the calculations of a job answered, by record id. */
export interface StoredResults {
  readonly fits: (id: string) => readonly BoreFitResult[];
  readonly deviations: (id: string) => AxisDeviationResult | null;
  readonly moves: (id: string) => ShimMoveResult | null;
  readonly confirmation: (id: string) => ConfirmationResult | null;
  /** resultHash of each, in the order asked for. */
  readonly hashes: readonly { readonly id: string; readonly resultHash: string | null }[];
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
  const row = await models.jobs.findOne({
    where: { id, organisationId },
    ...(transaction ? { transaction, lock: transaction.LOCK.UPDATE } : {}),
  });
  if (!row) throw new HttpProblem("not_found", "There is no job with this id.");
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

/** Reads every calculation that a job's state refers to, in one query. */
export async function loadResults(
  deps: Deps,
  { row, state }: Pick<LoadedJob, "row" | "state">,
  transaction?: Transaction,
): Promise<StoredResults> {
  const ids = calculationIds(state);
  const places = ids.flatMap((id) => {
    const createdAt = timeOfId(id);
    return createdAt ? [{ createdAt, id }] : [];
  });
  const found =
    places.length === 0
      ? []
      : await deps.database.models.calculations.findAll({
          where: { organisationId: row.organisationId, [Op.or]: places },
          attributes: ["createdAt", "id", "answerText", "resultHash"],
          ...(transaction ? { transaction } : {}),
        });
  const resultOf = new Map(
    found.map(({ id, answerText }) => [id, (JSON.parse(answerText) as { result: unknown }).result]),
  );
  const hashOf = new Map(found.map(({ id, resultHash }) => [id, resultHash]));
  const read = <Result>(id: string) => (resultOf.get(id) ?? null) as Result | null;
  return {
    fits: (id) => read<{ bores: BoreFitResult[] }>(id)?.bores ?? [],
    deviations: (id) => read<AxisDeviationResult>(id),
    moves: (id) => read<ShimMoveResult>(id),
    confirmation: (id) => read<ConfirmationResult>(id),
    hashes: ids.map((id) => ({ id, resultHash: hashOf.get(id) ?? null })),
  };
}

function calculationIds(state: JobState): string[] {
  return [
    ...state.surveys.flatMap(({ result }) =>
      result ? [result.document.boreFit, result.document.axisDeviation] : [],
    ),
    ...state.plans.map(({ document }) => document.calculation),
    ...state.confirmations.map(({ document }) => document.calculation),
  ];
}

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
  const last = rows.at(-1)?.sequence ?? 0;
  if (last + added.length > limits.entriesPerJob) {
    throw new HttpProblem("call_too_large", `A job's log holds ${limits.entriesPerJob} entries.`, {
      limit: limits.entriesPerJob,
    });
  }
  const createdAt = deps.now();
  const made = added.map(({ kind, document }, index) => ({
    jobId: row.id,
    revision: row.revision,
    sequence: last + 1 + index,
    id: deps.newId(),
    organisationId: row.organisationId,
    kind,
    documentText: JSON.stringify(document),
    createdAt,
    ...authorColumns(by.caller),
  }));
  await deps.database.models.jobEntries.bulkCreate(made, { transaction });
  await row.update({ version: row.version + 1 }, { transaction });
  for (const [index, entry] of added.entries()) {
    const event = eventOfEntry(row, made[index]?.id ?? "", entry);
    if (event) await tell(deps, transaction, event);
  }
  return { ids: made.map(({ id }) => id), version: row.version, flags: [] };
}

/** @throws HttpProblem job_signed */
export function refuseSigned({ state, revision }: Pick<Job, "state" | "revision">): void {
  if (state === "signed") throw new HttpProblem("job_signed", `Revision ${revision} of the job is signed.`);
}

function entryOf(row: JobEntryRow): JobEntry {
  const { kind, id, createdAt, memberId, keyId, documentText } = row;
  return {
    kind,
    id,
    createdAt,
    memberId,
    keyId,
    document: JSON.parse(documentText) as EntryDocuments[typeof kind],
  };
}
