import type { z } from "zod";
import { scopesOfRole, type Scope } from "../../shared/access.ts";
import type { createKeyRequest } from "../../shared/schemas/keys.ts";
import type { Deps } from "../deps.ts";
import { HttpProblem, problemOfFaults } from "../http/http-problem.ts";
import type { ApiKey } from "../models/api-key.ts";
import type { Caller } from "./caller.ts";
import type { Claim } from "./idempotency.ts";
import { inTransaction } from "./in-transaction.ts";
import { keyPrefix, makeKey } from "./key-format.ts";
import { recordAudit } from "./record-audit.ts";

/** A key that nobody gave an end lasts this long. */
const DEFAULT_LIFE_MS = 90 * 24 * 60 * 60 * 1000;

type KeyOrder = z.infer<typeof createKeyRequest>;

/**
 * Makes a key no wider than its maker and returns it with the text to show once.
 * @throws HttpProblem scope_missing, out_of_range (an expiry in the past)
 */
export async function issueKey(
  deps: Deps,
  order: KeyOrder,
  by: { readonly caller: Caller; readonly claim: Claim | null; readonly requestId: string },
): Promise<{ row: ApiKey; secret: string }> {
  const now = deps.now();
  const scopes = [...new Set(order.scopes)];
  refuseWiderScopes(scopes, by.caller);
  const expiresAt = expiryOf(order.expiresAt, now);
  const { selector, secret, text } = makeKey();
  const organisationId = by.caller.organisation.id;

  const row = await inTransaction(deps.database.sequelize, async (transaction) => {
    const made = await deps.database.models.apiKeys.create(
      {
        id: deps.newId(),
        organisationId,
        name: order.name,
        selector,
        secretHash: deps.secrets.hash("api-key", secret),
        scopes: scopes.join(" "),
        createdBy: by.caller.by === "member" ? by.caller.member.id : null,
        createdAt: now,
        expiresAt,
      },
      { transaction },
    );
    await recordAudit(deps, transaction, {
      action: "key.created",
      subject: made.id,
      organisationId,
      by: by.caller,
      requestId: by.requestId,
      details: { name: order.name, prefix: keyPrefix(selector), scopes, expiresAt },
    });
    await by.claim?.settle({ status: 201, resourceId: made.id }, transaction);
    return made;
  });
  by.claim?.markSettled();
  return { row, secret: text };
}

/**
 * Revokes a key at once; a key that is revoked already stays as it was.
 * @throws HttpProblem not_found, also for another organisation's key
 */
export async function revokeKey(deps: Deps, id: string, caller: Caller, requestId: string): Promise<ApiKey> {
  const organisationId = caller.organisation.id;
  const row = await inTransaction(deps.database.sequelize, async (transaction) => {
    const key = await deps.database.models.apiKeys.findOne({
      where: { id, organisationId },
      lock: transaction.LOCK.UPDATE,
      transaction,
    });
    if (!key) throw new HttpProblem("not_found", "There is no key with this id.");
    if (key.revokedAt) return key;
    await key.update({ revokedAt: deps.now() }, { transaction });
    await recordAudit(deps, transaction, {
      action: "key.revoked",
      subject: id,
      organisationId,
      by: caller,
      requestId,
      details: { name: key.name, prefix: keyPrefix(key.selector) },
    });
    return key;
  });
  deps.credentials.forget(row.selector);
  return row;
}

function refuseWiderScopes(scopes: readonly Scope[], caller: Caller): void {
  const held: readonly Scope[] = caller.by === "key" ? caller.scopes : scopesOfRole(caller.member.role);
  const wider = scopes.filter((scope) => !held.includes(scope));
  if (wider.length === 0) return;
  const [scope] = wider;
  throw new HttpProblem("scope_missing", `You cannot grant what you may not do: ${wider.join(", ")}.`, {
    ...(scope ? { scope } : {}),
  });
}

function expiryOf(wanted: string | null | undefined, now: Date): Date | null {
  if (wanted === null) return null;
  if (wanted === undefined) return new Date(now.getTime() + DEFAULT_LIFE_MS);
  const expiresAt = new Date(wanted);
  if (expiresAt > now) return expiresAt;
  throw problemOfFaults([
    { pointer: "/expiresAt", code: "out_of_range", detail: "A key's end lies in the future.", value: wanted },
  ]);
}
