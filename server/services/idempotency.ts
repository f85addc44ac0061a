import { createHash } from "node:crypto";
import { QueryTypes, type Transaction } from "sequelize";
import type { Deps } from "../deps.ts";
import { HttpProblem } from "../http/http-problem.ts";
import type { Reply } from "../http/operation.ts";
import { isDuplicateEntry } from "./in-transaction.ts";

/** How long a call may hold a key before another may take it over: a crash between compute and commit frees it. */
const LEASE_MS = 30_000;
/** How long a settled answer is kept. */
const KEPT_MS = 24 * 60 * 60 * 1000;

/** What a settled claim answers with: the answer's text, or only the id when the answer held a secret. */
export type Outcome =
  | { readonly status: number; readonly answerText: string }
  | { readonly status: number; readonly resourceId: string };

export interface ClaimRow {
  readonly organisationId: string;
  readonly credentialId: string;
  readonly keyHash: string;
  readonly token: string;
}

interface StoredClaim extends ClaimRow {
  readonly fingerprint: string;
  readonly leaseUntil: Date;
  readonly expiresAt: Date;
  readonly settledAt: Date | null;
  readonly status: number | null;
  readonly answerText: string | null;
  readonly resourceId: string | null;
}

/** What one call has reserved by its Idempotency-Key. */
export class Claim {
  private settled = false;

  constructor(
    private readonly deps: Deps,
    readonly row: ClaimRow,
  ) {}

  get isSettled(): boolean {
    return this.settled;
  }

  /** To be called once the transaction that settled it has committed. */
  markSettled(): void {
    this.settled = true;
  }

  /**
   * Writes the outcome in the caller's transaction.
   * @throws HttpProblem idempotency_in_progress when the lease ran out and another call took the key over
   */
  async settle(outcome: Outcome, transaction?: Transaction): Promise<void> {
    const { sql, bind } = settleStatement(this.row, outcome, this.deps.now());
    const [, affected] = await this.deps.database.sequelize.query(sql, {
      bind,
      type: QueryTypes.UPDATE,
      ...(transaction ? { transaction } : {}),
    });
    if (affected !== 1) throw inProgress();
    if (!transaction) this.settled = true;
  }

  /** Gives the key back after a failure that may be tried again. */
  async release(): Promise<void> {
    await this.deps.database.sequelize.query(
      `DELETE FROM idempotency_claims WHERE ${MINE} AND settledAt IS NULL`,
      {
        bind: mine(this.row),
      },
    );
  }
}

const MINE =
  "organisationId = $organisationId AND credentialId = $credentialId AND keyHash = $keyHash AND token = $token";
const mine = ({ organisationId, credentialId, keyHash, token }: ClaimRow) => ({
  organisationId,
  credentialId,
  keyHash,
  token,
});

/** The statement that settles a claim: shared with the record writer, which runs it inside its own transaction. */
export function settleStatement(
  row: ClaimRow,
  outcome: Outcome,
  now: Date,
): { sql: string; bind: Record<string, unknown> } {
  return {
    sql: `UPDATE idempotency_claims SET settledAt = $settledAt, status = $status, answerText = $answerText,
      resourceId = $resourceId, expiresAt = $expiresAt WHERE ${MINE} AND settledAt IS NULL`,
    bind: {
      ...mine(row),
      settledAt: now,
      status: outcome.status,
      answerText: "answerText" in outcome ? outcome.answerText : null,
      resourceId: "resourceId" in outcome ? outcome.resourceId : null,
      expiresAt: new Date(now.getTime() + KEPT_MS),
    },
  };
}

export interface ClaimRequest {
  readonly organisationId: string;
  readonly credentialId: string;
  readonly key: string;
  /** What makes two calls the same: method, path and canonical body. */
  readonly call: string;
}

/**
 * Reserves an Idempotency-Key for this call, or answers what an earlier call with the same key and body answered.
 * @throws HttpProblem idempotency_key_reused (422), idempotency_in_progress, secret_already_shown (409)
 */
export async function openClaim(deps: Deps, request: ClaimRequest): Promise<Claim | Reply> {
  const { sequelize } = deps.database;
  const now = deps.now();
  const row: ClaimRow = {
    organisationId: request.organisationId,
    credentialId: request.credentialId,
    keyHash: createHash("sha256").update(request.key).digest("hex"),
    token: deps.newId(),
  };
  const fresh = {
    ...row,
    fingerprint: deps.secrets.hash("idempotency", request.call),
    leaseUntil: new Date(now.getTime() + LEASE_MS),
    expiresAt: new Date(now.getTime() + KEPT_MS),
  };
  try {
    await sequelize.query(
      `INSERT INTO idempotency_claims (organisationId, credentialId, keyHash, token, fingerprint, leaseUntil, expiresAt)
       VALUES ($organisationId, $credentialId, $keyHash, $token, $fingerprint, $leaseUntil, $expiresAt)`,
      { bind: fresh },
    );
    return new Claim(deps, row);
  } catch (error) {
    if (!isDuplicateEntry(error)) throw error;
  }
  const stored = await readClaim(deps, row);
  if (!stored) throw inProgress();
  if (stored.expiresAt > now) {
    if (stored.fingerprint !== fresh.fingerprint) {
      throw new HttpProblem(
        "idempotency_key_reused",
        "This Idempotency-Key was first sent with another body or to another address.",
      );
    }
    if (stored.settledAt) return replayOf(stored);
    if (stored.leaseUntil > now) throw inProgress();
  }
  const [, affected] = await sequelize.query(
    `UPDATE idempotency_claims SET token = $token, fingerprint = $fingerprint, leaseUntil = $leaseUntil,
       expiresAt = $expiresAt, settledAt = NULL, status = NULL, answerText = NULL, resourceId = NULL
     WHERE organisationId = $organisationId AND credentialId = $credentialId AND keyHash = $keyHash AND token = $stored`,
    { bind: { ...fresh, stored: stored.token }, type: QueryTypes.UPDATE },
  );
  if (affected !== 1) throw inProgress();
  return new Claim(deps, row);
}

async function readClaim(deps: Deps, row: ClaimRow): Promise<StoredClaim | undefined> {
  const [stored] = await deps.database.sequelize.query<StoredClaim>(
    `SELECT * FROM idempotency_claims
     WHERE organisationId = $organisationId AND credentialId = $credentialId AND keyHash = $keyHash`,
    {
      bind: { organisationId: row.organisationId, credentialId: row.credentialId, keyHash: row.keyHash },
      type: QueryTypes.SELECT,
    },
  );
  return stored;
}

function replayOf(stored: StoredClaim): Reply {
  if (stored.answerText === null) {
    const id = stored.resourceId ?? "";
    throw new HttpProblem("secret_already_shown", `The secret of ${id} was shown in the first answer.`, {
      id,
    });
  }
  return {
    status: stored.status ?? 200,
    body: JSON.parse(stored.answerText),
    headers: { "Idempotent-Replayed": "true" },
  };
}

function inProgress(): HttpProblem {
  return new HttpProblem(
    "idempotency_in_progress",
    "A call with this Idempotency-Key is still running.",
    { retryAfterSeconds: 1 },
    { "Retry-After": "1" },
  );
}
