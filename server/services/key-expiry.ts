import { Op } from "sequelize";
import type { Deps } from "../deps.ts";
import type { ApiKey } from "../models/api-key.ts";
import { queueMailToAdmins } from "../mail/queue-mail.ts";
import { tell } from "../webhooks/events.ts";
import { inTransaction, isDuplicateEntry } from "./in-transaction.ts";
import { keyPrefix } from "./key-format.ts";

/** Days before its end that a key's organisation is told. */
export const noticeDays = [14, 7, 1] as const;

const DAY_MS = 24 * 60 * 60 * 1000;
const KEYS_AT_ONCE = 500;

/**
 * The notice that is due for a key, in days before its end; null when none is. A key that was made to last no longer
 * than that is not told of: its maker has just read it. Of notices that were missed, only the nearest is still news.
 */
export function noticeDue(
  { createdAt, expiresAt, revokedAt }: Pick<ApiKey, "createdAt" | "expiresAt" | "revokedAt">,
  now: Date,
): number | null {
  if (!expiresAt || revokedAt || expiresAt <= now) return null;
  const leftMs = expiresAt.getTime() - now.getTime();
  const lifeMs = expiresAt.getTime() - createdAt.getTime();
  const due = noticeDays.filter((days) => leftMs <= days * DAY_MS && lifeMs > days * DAY_MS);
  return due.at(-1) ?? null;
}

/** Tells of keys that end soon, each notice once however many processes ask. Returns how many it told. */
export async function tellOfExpiringKeys(deps: Deps): Promise<number> {
  const now = deps.now();
  const horizon = new Date(now.getTime() + Math.max(...noticeDays) * DAY_MS);
  let told = 0;
  let after = "";
  for (let found = KEYS_AT_ONCE; found === KEYS_AT_ONCE;) {
    const keys = await deps.database.models.apiKeys.findAll({
      where: { id: { [Op.gt]: after }, revokedAt: null, expiresAt: { [Op.gt]: now, [Op.lte]: horizon } },
      order: ["id"],
      limit: KEYS_AT_ONCE,
    });
    const known = await noticesOf(deps, keys);
    for (const key of keys) {
      const days = noticeDue(key, now);
      if (days !== null && !known.has(`${key.id} ${days}`) && (await tellOnce(deps, key, days))) told += 1;
    }
    found = keys.length;
    after = keys.at(-1)?.id ?? "";
  }
  return told;
}

async function noticesOf({ database }: Deps, keys: readonly ApiKey[]): Promise<Set<string>> {
  const rows = await database.models.keyNotices.findAll({ where: { keyId: keys.map(({ id }) => id) } });
  return new Set(rows.map(({ keyId, days }) => `${keyId} ${days}`));
}

/** The notice's row, the events and the mail are kept together; whoever comes second finds the row and tells nothing. */
async function tellOnce(deps: Deps, key: ApiKey, days: number): Promise<boolean> {
  const { id: keyId, organisationId, name, selector, expiresAt } = key;
  const ends = expiresAt?.toISOString() ?? null;
  try {
    await inTransaction(deps.database.sequelize, async (transaction) => {
      await deps.database.models.keyNotices.create(
        { keyId, days, organisationId, createdAt: deps.now() },
        { transaction },
      );
      await tell(deps, transaction, {
        organisationId,
        type: "key.expiring",
        data: { keyId, expiresAt: ends, days },
      });
      await queueMailToAdmins(deps, transaction, organisationId, {
        subject: `API key ends within ${days === 1 ? "a day" : `${days} days`}: ${name}`,
        text: [
          `The API key "${name}" (${keyPrefix(selector)}…) ends at ${ends ?? ""}.`,
          "What still uses it will be refused from then on. Issue a new key and put it in its place.",
        ].join("\n"),
      });
    });
    return true;
  } catch (error) {
    if (isDuplicateEntry(error)) return false;
    throw error;
  }
}
