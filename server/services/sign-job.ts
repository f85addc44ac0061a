import canonicalize from "canonicalize";
import type { Transaction } from "sequelize";
import type { z } from "zod";
import type { signatureRequest } from "../../shared/schemas/jobs.ts";
import type { Deps } from "../deps.ts";
import { HttpProblem, problemOfFaults } from "../http/http-problem.ts";
import type { Job } from "../models/job.ts";
import type { By } from "./author.ts";
import { loadResults, type StoredResults } from "./job-results.ts";
import { appendEntries, loadJob, refuseSigned, type LoadedJob } from "./job-store.ts";
import { inTransaction } from "./in-transaction.ts";
import { audit, recordOf } from "./jobs.ts";
import { verifyPassword } from "./passwords.ts";
import { sha256 } from "./run-calculation.ts";

/**
 * Checks the signing member's password anew, and keeps in the audit that a wrong one was sent, never which. Done before
 * the job is locked, since it takes its time by design.
 * @throws HttpProblem member_required for a key, password_wrong
 */
export async function checkSigner(
  deps: Deps,
  job: Pick<Job, "id" | "organisationId" | "revision">,
  by: By,
  password: string,
): Promise<void> {
  const { caller } = by;
  if (caller.by !== "member") throw new HttpProblem("member_required", "A key cannot sign.");
  const member = await deps.database.models.members.findOne({
    where: { id: caller.member.id, organisationId: caller.organisation.id },
  });
  if (await verifyPassword(member?.passwordHash ?? null, password)) return;
  await inTransaction(deps.database.sequelize, (transaction) =>
    audit(deps, transaction, "job.signature_refused", job, by, { revision: job.revision }),
  );
  throw problemOfFaults([
    { pointer: "/password", code: "password_wrong", detail: "This is not the password you sign in with." },
  ]);
}

/**
 * Signs a job: nothing stands in the way, then its log is hashed with all that it refers to, and changes no more.
 * @throws HttpProblem not_found, job_signed, sign_off_blocked with every obstacle
 */
export async function signJob(
  deps: Deps,
  transaction: Transaction,
  id: string,
  { meaning }: Pick<z.infer<typeof signatureRequest>, "meaning">,
  by: By,
): Promise<Job> {
  const loaded = await loadJob(deps, by.caller.organisation.id, id, { transaction });
  refuseSigned(loaded.row);
  const { signOff } = await recordOf(deps, loaded, transaction);
  if (!signOff.ready) {
    throw new HttpProblem(
      "sign_off_blocked",
      `${signOff.obstacles.length} points are open; the first: ${signOff.obstacles[0]?.detail ?? ""}`,
      { obstacles: signOff.obstacles },
    );
  }
  const recordHash = hashOf(loaded, await loadResults(deps, loaded, transaction));
  const name = by.caller.by === "member" ? by.caller.member.name : "";
  await appendEntries(
    deps,
    transaction,
    loaded,
    [{ kind: "signature", document: { name, meaning, recordHash } }],
    by,
  );
  await loaded.row.update({ state: "signed", signedAt: deps.now() }, { transaction });
  await audit(deps, transaction, "job.signed", loaded.row, by, { revision: loaded.revision, recordHash });
  return loaded.row;
}

/**
 * Opens a signed job again as its next revision, whose log starts as a copy without the signature. The old one stays.
 * @throws HttpProblem not_found, job_not_signed
 */
export async function reviseJob(
  deps: Deps,
  transaction: Transaction,
  id: string,
  reason: string,
  by: By,
): Promise<Job> {
  const loaded = await loadJob(deps, by.caller.organisation.id, id, { transaction });
  const { row, rows } = loaded;
  if (row.state !== "signed") throw new HttpProblem("job_not_signed", "The job is open as it stands.");
  const copied = rows
    .filter(({ kind }) => kind !== "signature")
    .map((entry) => ({ ...entry.get(), revision: row.revision + 1, event: null }));
  await deps.database.models.jobEntries.bulkCreate(copied, { transaction });
  await row.update({ revision: row.revision + 1, state: "open", signedAt: null }, { transaction });
  await appendEntries(deps, transaction, { row, rows }, [{ kind: "revision", document: { reason } }], by);
  await audit(deps, transaction, "job.revised", row, by, { revision: row.revision, reason });
  return row;
}

/**
 * sha256 of the RFC 8785 form of the machine's hash, every entry of the log in order, and the result hash of every
 * calculation it refers to: what GET /v1/jobs/{id}/log answers, so that anyone can compute it anew.
 */
export function hashOf(
  { row, revision, machineHash, entries }: Pick<LoadedJob, "row" | "revision" | "machineHash" | "entries">,
  { hashes }: Pick<StoredResults, "hashes">,
): string {
  return sha256(canonicalize(hashedRecord({ row, revision, machineHash, entries }, { hashes })) ?? "");
}

/** What a record hash is over: everything but the signature itself. */
export function hashedRecord(
  { row, revision, machineHash, entries }: Pick<LoadedJob, "row" | "revision" | "machineHash" | "entries">,
  { hashes }: Pick<StoredResults, "hashes">,
) {
  return {
    job: row.id,
    revision,
    machine: row.machineId,
    machineRevision: row.machineRevision,
    machineHash,
    entries: entries
      .filter(({ kind }) => kind !== "signature")
      .map(({ id, kind, createdAt, memberId, keyId, authorName, document }) => ({
        id,
        kind,
        createdAt: createdAt.toISOString(),
        memberId,
        keyId,
        authorName,
        document,
      })),
    calculations: hashes.map(({ id, resultHash }) => ({ id, resultHash })),
  };
}
