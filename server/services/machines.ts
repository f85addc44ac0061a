import canonicalize from "canonicalize";
import type { Transaction } from "sequelize";
import type { MachineDocument } from "../../shared/schemas/machines.ts";
import type { Deps } from "../deps.ts";
import { HttpProblem, problemOfFaults } from "../http/http-problem.ts";
import { machineFaults, under } from "../machines/machine-faults.ts";
import type { Machine } from "../models/machine.ts";
import type { MachineRevision } from "../models/machine-revision.ts";
import { authorColumns, type By } from "./author.ts";
import { recordAudit } from "./record-audit.ts";
import { sha256 } from "./run-calculation.ts";

/** A machine with one of its revisions. */
export interface RevisedMachine {
  readonly machine: Machine;
  readonly revision: MachineRevision;
}

/** What a change is made to: the id, and the version the caller read. */
interface Read {
  readonly id: string;
  readonly version: number;
}

/**
 * Stores a machine as its first revision.
 * @throws HttpProblem naming every fault of the document
 */
export async function createMachine(
  deps: Deps,
  transaction: Transaction,
  order: { readonly document: MachineDocument; readonly reason: string },
  by: By,
): Promise<RevisedMachine> {
  refuseFaults(machineFaults(order.document));
  const machine = await deps.database.models.machines.create(
    {
      id: deps.newId(),
      organisationId: by.caller.organisation.id,
      ...titles(order.document),
      revision: 1,
      createdAt: deps.now(),
    },
    { transaction },
  );
  return { machine, revision: await addRevision(deps, transaction, machine, order, by) };
}

/**
 * Adds a revision to a machine that still is at the version the caller read.
 * @throws HttpProblem not_found, version_stale, and every fault of the document under /document
 */
export async function reviseMachine(
  deps: Deps,
  transaction: Transaction,
  { id, version }: Read,
  order: { readonly document: MachineDocument; readonly reason: string },
  by: By,
): Promise<RevisedMachine> {
  refuseFaults(under("document", machineFaults(order.document)));
  const machine = await lockMachine(deps, transaction, { id, version }, by);
  await machine.update({ ...titles(order.document), revision: machine.revision + 1 }, { transaction });
  return { machine, revision: await addRevision(deps, transaction, machine, order, by) };
}

/** Puts a machine away, or takes it out again. */
export async function archiveMachine(
  deps: Deps,
  transaction: Transaction,
  { id, version }: Read,
  archived: boolean,
  by: By,
): Promise<RevisedMachine> {
  const machine = await lockMachine(deps, transaction, { id, version }, by);
  if (archived !== Boolean(machine.archivedAt)) {
    await machine.update({ archivedAt: archived ? deps.now() : null }, { transaction });
    await recordAudit(deps, transaction, {
      action: archived ? "machine.archived" : "machine.restored",
      subject: id,
      organisationId: machine.organisationId,
      by: by.caller,
      requestId: by.requestId,
    });
  }
  return { machine, revision: await findRevision(deps, machine, machine.revision, transaction) };
}

/** @throws HttpProblem not_found, alike for an id that never was and for another organisation's */
export async function findMachine(
  deps: Deps,
  organisationId: string,
  id: string,
  transaction?: Transaction,
): Promise<Machine> {
  const machine = await deps.database.models.machines.findOne({
    where: { id, organisationId },
    ...(transaction ? { transaction } : {}),
  });
  if (!machine) throw new HttpProblem("not_found", "There is no machine with this id.");
  return machine;
}

/** @throws HttpProblem not_found */
export async function findRevision(
  deps: Deps,
  machine: Pick<Machine, "id" | "organisationId">,
  revision: number,
  transaction?: Transaction,
): Promise<MachineRevision> {
  const found = await deps.database.models.machineRevisions.findOne({
    where: { machineId: machine.id, organisationId: machine.organisationId, revision },
    ...(transaction ? { transaction } : {}),
  });
  if (!found) throw new HttpProblem("not_found", "The machine has no revision with this number.");
  return found;
}

export function documentOf({ documentText }: Pick<MachineRevision, "documentText">): MachineDocument {
  return JSON.parse(documentText) as MachineDocument;
}

const titles = ({ name, plantTag }: MachineDocument) => ({ name, plantTag: plantTag ?? null });

async function addRevision(
  deps: Deps,
  transaction: Transaction,
  machine: Machine,
  { document, reason }: { readonly document: MachineDocument; readonly reason: string },
  by: By,
): Promise<MachineRevision> {
  const documentHash = sha256(canonicalize(document) ?? "");
  const row = await deps.database.models.machineRevisions.create(
    {
      id: deps.newId(),
      organisationId: machine.organisationId,
      machineId: machine.id,
      revision: machine.revision,
      documentText: JSON.stringify(document),
      documentHash,
      reason,
      ...authorColumns(by.caller),
      createdAt: deps.now(),
    },
    { transaction },
  );
  await recordAudit(deps, transaction, {
    action: machine.revision === 1 ? "machine.created" : "machine.revised",
    subject: machine.id,
    organisationId: machine.organisationId,
    by: by.caller,
    requestId: by.requestId,
    details: { name: machine.name, revision: machine.revision, documentHash },
  });
  return row;
}

async function lockMachine(
  deps: Deps,
  transaction: Transaction,
  { id, version }: Read,
  by: By,
): Promise<Machine> {
  const machine = await deps.database.models.machines.findOne({
    where: { id, organisationId: by.caller.organisation.id },
    lock: transaction.LOCK.UPDATE,
    transaction,
  });
  if (!machine) throw new HttpProblem("not_found", "There is no machine with this id.");
  refuseStale("machine", machine.version, version);
  return machine;
}

/** @throws HttpProblem version_stale, with the version that stands as ETag */
export function refuseStale(what: string, stands: number, sent: number): void {
  if (stands === sent) return;
  throw new HttpProblem("version_stale", `The ${what} is at version ${stands}.`, {}, { ETag: `"${stands}"` });
}

function refuseFaults(faults: ReturnType<typeof machineFaults>): void {
  if (faults.length > 0) throw problemOfFaults(faults);
}
