import { timingSafeEqual } from "node:crypto";
import { Op } from "sequelize";
import { HttpProblem } from "../http/http-problem.ts";
import { scopesOf, type ApiKey } from "../models/api-key.ts";
import type { Member } from "../models/member.ts";
import type { Organisation } from "../models/organisation.ts";
import type { Session } from "../models/session.ts";
import type { Database } from "../database.ts";
import { readAccessToken } from "./access-tokens.ts";
import type { Caller } from "./caller.ts";
import { keyPrefix, looksLikeKey, parseKey } from "./key-format.ts";
import type { Secrets } from "./secrets.ts";

/** How long a row may be believed without asking again: a revoked key is refused everywhere within this. */
const BELIEVED_MS = 500;
/** last-used is written at most this often for each key. */
const LAST_USED_MS = 60_000;
const CACHED_ROWS = 10_000;

type KeyRow = ApiKey & { organisation: Organisation };
type SessionRow = Session & { member: Member & { organisation: Organisation } };

/** Turns what a request brings into who is calling, as things stand now. */
export class Credentials {
  private readonly rows = new Map<string, { readonly readAt: number; readonly row: Promise<unknown> }>();

  constructor(
    private readonly database: Database,
    private readonly secrets: Secrets,
    private readonly now: () => Date,
  ) {}

  /**
   * @throws HttpProblem credential_invalid, key_expired, key_revoked, session_expired. Only someone who holds the
   * right secret learns that a key is expired or revoked.
   */
  async callerOf(bearer: string): Promise<Caller> {
    return looksLikeKey(bearer) ? this.callerOfKey(bearer) : this.callerOfToken(bearer);
  }

  /** Forgets a row in this process at once; other processes follow within half a second. */
  forget(id: string): void {
    this.rows.delete(id);
  }

  private async callerOfKey(text: string): Promise<Caller> {
    const parts = parseKey(text);
    const key = parts && (await this.believed(parts.selector, () => this.readKey(parts.selector)));
    if (!key || !sameText(key.secretHash, this.secrets.hash("api-key", parts.secret))) throw invalid();
    const now = this.now();
    if (key.revokedAt) throw refused("key_revoked", `The key ${keyPrefix(key.selector)} was revoked.`);
    if (key.expiresAt && key.expiresAt <= now) {
      throw refused(
        "key_expired",
        `The key ${keyPrefix(key.selector)} expired at ${key.expiresAt.toISOString()}.`,
      );
    }
    await this.touch(key, now);
    const { id, name, selector, organisation } = key;
    return {
      by: "key",
      organisation: { id: organisation.id, name: organisation.name },
      key: { id, name, prefix: keyPrefix(selector) },
      scopes: scopesOf(key),
    };
  }

  private async callerOfToken(text: string): Promise<Caller> {
    const token = readAccessToken(this.secrets, text, this.now());
    if (!token) throw invalid();
    const session = await this.believed(token.sessionId, () => this.readSession(token.sessionId));
    if (!session || session.memberId !== token.memberId) throw invalid();
    const { member } = session;
    if (session.endedAt || session.expiresAt <= this.now() || member.disabledAt) {
      throw refused("session_expired", "The session has ended.");
    }
    const { id, name, email, role, organisation } = member;
    return {
      by: "member",
      organisation: { id: organisation.id, name: organisation.name },
      member: { id, name, email, role },
      sessionId: session.id,
    };
  }

  private readKey(selector: string): Promise<KeyRow | null> {
    return this.database.models.apiKeys.findOne({
      where: { selector },
      include: "organisation",
    }) as Promise<KeyRow | null>;
  }

  private readSession(id: string): Promise<SessionRow | null> {
    return this.database.models.sessions.findByPk(id, {
      include: [{ association: "member", include: ["organisation"] }],
    }) as Promise<SessionRow | null>;
  }

  private async believed<Row>(id: string, read: () => Promise<Row | null>): Promise<Row | null> {
    const at = performance.now();
    const known = this.rows.get(id);
    if (known && at - known.readAt < BELIEVED_MS) return known.row as Promise<Row | null>;
    if (this.rows.size >= CACHED_ROWS) this.rows.clear();
    const row = read();
    this.rows.set(id, { readAt: at, row });
    // A failed read is not an answer: the next request asks again.
    row.catch(() => this.rows.delete(id));
    return row;
  }

  private async touch(key: KeyRow, now: Date): Promise<void> {
    const due = new Date(now.getTime() - LAST_USED_MS);
    if (key.lastUsedAt && key.lastUsedAt > due) return;
    key.lastUsedAt = now;
    const { apiKeys } = this.database.models;
    await apiKeys.update(
      { lastUsedAt: now },
      {
        where: { id: key.id, [Op.or]: [{ lastUsedAt: null }, { lastUsedAt: { [Op.lte]: due } }] },
        silent: true,
      },
    );
  }
}

function sameText(a: string, b: string): boolean {
  return a.length === b.length && timingSafeEqual(Buffer.from(a), Buffer.from(b));
}

const challenge = { "WWW-Authenticate": 'Bearer realm="borewright"' };

export function invalid(): HttpProblem {
  return new HttpProblem("credential_invalid", "The credential is not valid.", {}, challenge);
}

export function missing(): HttpProblem {
  return new HttpProblem(
    "credential_missing",
    "Send an API key or an access token as Authorization: Bearer.",
    {},
    challenge,
  );
}

function refused(code: "key_expired" | "key_revoked" | "session_expired", detail: string): HttpProblem {
  return new HttpProblem(code, detail, {}, challenge);
}
