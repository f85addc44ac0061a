import type {
  Machine,
  MachineRevision,
  MachineRevisionSummary,
  MachineSummary,
} from "../../shared/schemas/machines.ts";
import type { Machine as MachineRow } from "../models/machine.ts";
import type { MachineRevision as RevisionRow } from "../models/machine-revision.ts";
import { presentAuthor } from "../services/author.ts";
import type { CallerNames } from "../services/caller-names.ts";
import { documentOf, type RevisedMachine } from "../services/machines.ts";
import { isoTime } from "./time.ts";

export function presentMachineSummary(row: MachineRow): MachineSummary {
  return {
    id: row.id,
    name: row.name,
    plantTag: row.plantTag,
    revision: row.revision,
    archived: Boolean(row.archivedAt),
    createdAt: isoTime(row.createdAt),
    version: row.version,
  };
}

export function presentMachine({ machine, revision }: RevisedMachine): Machine {
  return {
    ...presentMachineSummary(machine),
    documentHash: revision.documentHash,
    document: documentOf(revision),
  };
}

/** What a list of revisions reads: all but the document. */
export function presentRevisionSummary(
  row: Omit<RevisionRow, "documentText">,
  names: CallerNames,
): MachineRevisionSummary {
  return {
    revision: row.revision,
    reason: row.reason,
    documentHash: row.documentHash,
    createdAt: isoTime(row.createdAt),
    by: presentAuthor(row, names),
  };
}

export function presentRevision(row: RevisionRow, names: CallerNames): MachineRevision {
  return { ...presentRevisionSummary(row, names), machineId: row.machineId, document: documentOf(row) };
}
