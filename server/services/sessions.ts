import type { Transaction } from "sequelize";
import type { Deps } from "../deps.ts";
import { HttpProblem } from "../http/http-problem.ts";
import type { Member } from "../models/member.ts";
import type { Organisation } from "../models/organisation.ts";
import type { Session } from "../models/session.ts";
import { signAccessToken, type AccessToken } from "./access-tokens.ts";
import { inTransaction } from "./in-transaction.ts";
import { randomText } from "./key-format.ts";
import { verifyPassword } from "./passwords.ts";
import { recordAudit } from "./record-audit.ts";

/** A session ends this long after sign-in, whatever happens. */
export const SESSION_MS = 12 * 60 * 60 * 1000;
/** For this long the refresh secret before the last is still taken: two tabs may renew at the same moment. */
const GRACE_MS = 30_000;

type SignedIn = Member & { organisation: Organisation };

export interface OpenSession {
  readonly accessToken: AccessToken;
  readonly member: SignedIn;
  readonly session: Session;
  /** What the cookie holds; null when another tab has just set the newer one. */
  readonly refresh: string | null;
}

/**
 * Checks e-mail and password. The answer, and the time it takes, is the same whether or not the member exists.
 * @throws HttpProblem sign_in_refused
 */
export async function checkPassword(
  deps: Deps,
  email: string,
  password: string,
  requestId: string,
): Promise<SignedIn> {
  const member = (await deps.database.models.members.findOne({
    where: { email: email.toLowerCase() },
    include: "organisation",
  })) as SignedIn | null;
  const matches = await verifyPassword(member?.passwordHash ?? null, password);
  if (member && matches && !member.disabledAt) return member;
  if (member) {
    await inTransaction(deps.database.sequelize, (transaction) =>
      recordAudit(deps, transaction, {
        action: "session.refused",
        subject: member.id,
        organisationId: member.organisationId,
        by: null,
        requestId,
      }),
    );
  }
  throw new HttpProblem("sign_in_refused", "E-mail or password is wrong.");
}

/** Starts a session for a member whose password was right. */
export async function startSession(
  deps: Deps,
  member: SignedIn,
  requestId: string,
  settle: (sessionId: string, transaction: Transaction) => Promise<void> = async () => {},
): Promise<OpenSession> {
  const now = deps.now();
  const secret = randomText(43);
  const session = await inTransaction(deps.database.sequelize, async (transaction) => {
    const made = await deps.database.models.sessions.create(
      {
        id: deps.newId(),
        organisationId: member.organisationId,
        memberId: member.id,
        refreshHash: deps.secrets.hash("refresh", secret),
        rotatedAt: now,
        createdAt: now,
        expiresAt: new Date(now.getTime() + SESSION_MS),
      },
      { transaction },
    );
    await deps.database.models.members.update(
      { lastSignedInAt: now },
      { where: { id: member.id }, transaction },
    );
    await recordAudit(deps, transaction, {
      action: "session.started",
      subject: made.id,
      organisationId: member.organisationId,
      by: { memberId: member.id },
      requestId,
    });
    await settle(made.id, transaction);
    return made;
  });
  return { member, session, refresh: `${session.id}.${secret}`, accessToken: tokenOf(deps, session) };
}

/**
 * Takes a refresh secret and gives a new one. The one before the last is taken for a short grace and rotates nothing;
 * later use of it means that it was stolen, and ends the session for both.
 * @throws HttpProblem session_expired
 */
export async function refreshSession(deps: Deps, refresh: string, requestId: string): Promise<OpenSession> {
  const [id = "", secret = ""] = refresh.split(".");
  const hash = deps.secrets.hash("refresh", secret);
  const opened = await inTransaction(
    deps.database.sequelize,
    async (transaction): Promise<OpenSession | null> => {
      const now = deps.now();
      const session = await deps.database.models.sessions.findByPk(id, {
        lock: transaction.LOCK.UPDATE,
        transaction,
      });
      if (!session || session.endedAt || session.expiresAt <= now) return null;
      const member = (await deps.database.models.members.findByPk(session.memberId, {
        include: "organisation",
        transaction,
      })) as SignedIn | null;
      if (!member || member.disabledAt) return null;
      const base = { member, session, accessToken: tokenOf(deps, session) };
      if (session.refreshHash === hash) {
        const renewed = randomText(43);
        await session.update(
          { refreshHash: deps.secrets.hash("refresh", renewed), previousHash: hash, rotatedAt: now },
          { transaction },
        );
        return { ...base, refresh: `${session.id}.${renewed}` };
      }
      if (session.previousHash !== hash) return null;
      if (now.getTime() - session.rotatedAt.getTime() <= GRACE_MS) return { ...base, refresh: null };
      await endRow(deps, session, "session.reuse_detected", requestId, transaction);
      return null;
    },
  );
  if (!opened) {
    deps.credentials.forget(id);
    throw new HttpProblem("session_expired", "The session has ended. Sign in again.");
  }
  return opened;
}

/** Ends a session: its access tokens are refused from the next request on. */
export async function endSession(deps: Deps, id: string, requestId: string): Promise<void> {
  await inTransaction(deps.database.sequelize, async (transaction) => {
    const session = await deps.database.models.sessions.findByPk(id, {
      lock: transaction.LOCK.UPDATE,
      transaction,
    });
    if (session && !session.endedAt) await endRow(deps, session, "session.ended", requestId, transaction);
  });
  deps.credentials.forget(id);
}

async function endRow(
  deps: Deps,
  session: Session,
  action: "session.ended" | "session.reuse_detected",
  requestId: string,
  transaction: Transaction,
): Promise<void> {
  await session.update({ endedAt: deps.now() }, { transaction });
  await recordAudit(deps, transaction, {
    action,
    subject: session.id,
    organisationId: session.organisationId,
    by: { memberId: session.memberId },
    requestId,
  });
}

function tokenOf(deps: Deps, session: Session): AccessToken {
  return signAccessToken(deps.secrets, { memberId: session.memberId, sessionId: session.id }, deps.now());
}
