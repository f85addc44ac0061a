import type { Transaction } from "sequelize";
import { addedEntries } from "../../shared/schemas/jobs.ts";
import { byOf } from "../http/call-parts.ts";
import { versionTag } from "../http/entity-tag.ts";
import { problemOfFaults } from "../http/http-problem.ts";
import type { Call, Reply } from "../http/operation.ts";
import { changeOnce } from "../services/change-once.ts";
import type { Added, LoadedJob, NewEntry } from "../services/job-store.ts";
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
