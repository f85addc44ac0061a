import type { Transaction } from "sequelize";
import { addedEntries } from "../../shared/schemas/jobs.ts";
import { byOf } from "../http/call-parts.ts";
import { versionTag } from "../http/entity-tag.ts";
import { problemOfFaults } from "../http/http-problem.ts";
import { callerOf, type Call, type Reply } from "../http/operation.ts";
import { changeOnce } from "../services/change-once.ts";
import { addComputed, type ComputedEntry } from "../services/job-computations.ts";
import { loadJob, type Added, type LoadedJob, type NewEntry } from "../services/job-store.ts";
import { addToJob } from "../services/jobs.ts";

/** What every operation that adds to a job's log answers. */
export const added = (description: string) => ({ status: 201, description, schema: addedEntries });

type ChangeCall = Pick<Call, "deps" | "caller" | "claim" | "requestId" | "params">;

/** Adds entries made from the job as it stands, and answers their ids. */
export function addOne(
  call: ChangeCall,
  entriesOf: (loaded: LoadedJob) => readonly NewEntry[],
): Promise<Reply> {
  return change(call, (transaction) =>
    addToJob(call.deps, transaction, call.params.id ?? "", byOf(call), entriesOf),
  );
}

/** Computes from the job as it stands, then stores the calculations and the entry that names them in one transaction. */
export async function addComputedEntry(
  call: ChangeCall,
  compute: (loaded: LoadedJob) => Promise<ComputedEntry>,
): Promise<Reply> {
  const id = call.params.id ?? "";
  const computed = await compute(await loadJob(call.deps, callerOf(call).organisation.id, id));
  return change(call, (transaction) => addComputed(call.deps, transaction, id, byOf(call), computed));
}

export function change(call: ChangeCall, work: (transaction: Transaction) => Promise<Added>): Promise<Reply> {
  return changeOnce(call.deps, call, 201, async (transaction) => {
    const { ids, version, flags } = await work(transaction);
    return {
      body: { ids, version, flags },
      headers: { ETag: versionTag(version), Location: `/v1/jobs/${call.params.id ?? ""}` },
    };
  });
}

export function refuse(faults: Parameters<typeof problemOfFaults>[0]): void {
  if (faults.length > 0) throw problemOfFaults(faults);
}
