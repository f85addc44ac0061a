import { QueryTypes } from "sequelize";
import type { Deps } from "../deps.ts";

const ROWS_AT_ONCE = 1_000;
/** How long it can be read what was delivered, and which mails went out. */
const LOG_KEPT_MS = 30 * 24 * 60 * 60 * 1000;

/**
 * Takes away what is past its time, a batch at a time, so that no lock is held long: idempotency claims, sessions, the
 * log of deliveries, mails that went out.
 */
export async function purgeExpired({ database, now }: Pick<Deps, "database" | "now">): Promise<number> {
  const at = now();
  const logged = new Date(at.getTime() - LOG_KEPT_MS);
  const rules = [
    ["idempotency_claims", "expiresAt", at],
    ["sessions", "expiresAt", at],
    ["webhook_deliveries", "createdAt", logged],
    ["queued_mails", "createdAt", logged],
  ] as const;
  let purged = 0;
  for (const [table, column, before] of rules) {
    for (let batch = ROWS_AT_ONCE; batch === ROWS_AT_ONCE; purged += batch) {
      batch = await database.sequelize.query(
        `DELETE FROM ${table} WHERE ${column} < $before LIMIT ${ROWS_AT_ONCE}`,
        { bind: { before }, type: QueryTypes.BULKDELETE },
      );
    }
  }
  return purged;
}
