import type { Transaction } from "sequelize";
import type { Deps } from "../deps.ts";
import type { Caller } from "./caller.ts";

export type AuditAction =
  | "key.created"
  | "key.revoked"
  | "member.invited"
  | "member.changed"
  | "invitation.renewed"
  | "invitation.accepted"
  | "session.started"
  | "session.refused"
  | "session.ended"
  | "session.reuse_detected"
  | "webhook.created"
  | "webhook.changed"
  | "webhook.secret_replaced"
  | "webhook.removed"
  | "webhook.stopped"
  | "organisation.created"
  | "machine.created"
  | "machine.revised"
  | "machine.archived"
  | "machine.restored"
  | "job.created"
  | "job.changed"
  | "job.signed"
  | "job.signature_refused"
  | "job.revised"
  | "job.entry_withdrawn"
  | "job.report_mailed";

export interface AuditEntry {
  readonly action: AuditAction;
  /** Id of what the action was done to. */
  readonly subject: string;
  readonly organisationId: string;
  readonly by: Caller | { readonly memberId: string } | null;
  readonly requestId: string | null;
  /** Never a secret. */
  readonly details?: Readonly<Record<string, unknown>>;
}

/** Writes what was done, by whom, in the transaction that does it. */
export async function recordAudit(
  deps: Pick<Deps, "database" | "now" | "newId">,
  transaction: Transaction,
  entry: AuditEntry,
): Promise<void> {
  const { by } = entry;
  const memberId =
    by === null ? null : "memberId" in by ? by.memberId : by.by === "member" ? by.member.id : null;
  await deps.database.models.auditEvents.create(
    {
      createdAt: deps.now(),
      id: deps.newId(),
      organisationId: entry.organisationId,
      memberId,
      keyId: by && "by" in by && by.by === "key" ? by.key.id : null,
      action: entry.action,
      subject: entry.subject,
      details: JSON.stringify(entry.details ?? {}),
      requestId: entry.requestId,
    },
    { transaction },
  );
}
