import { QueryTypes } from "sequelize";
import type { Deps } from "../deps.ts";

const EVERY_MS = 10 * 60 * 1000;
const ROWS_AT_ONCE = 1_000;

/** Takes away idempotency claims and sessions past their time, a batch at a time, so that no lock is held long. */
export async function purgeExpired({ database, now }: Pick<Deps, "database" | "now">): Promise<number> {
  let purged = 0;
  for (const table of ["idempotency_claims", "sessions"]) {
    for (let batch = ROWS_AT_ONCE; batch === ROWS_AT_ONCE; purged += batch) {
      batch = await database.sequelize.query(
        `DELETE FROM ${table} WHERE expiresAt < $now LIMIT ${ROWS_AT_ONCE}`,
        {
          bind: { now: now() },
          type: QueryTypes.BULKDELETE,
        },
      );
    }
  }
  return purged;
}

/** Purges from time to time; returns what stops it. */
export function startPurge(deps: Deps): () => void {
  const timer = setInterval(() => {
    purgeExpired(deps).catch((error: unknown) =>
      deps.log.warn({ err: error }, "purge failed; it will be tried again"),
    );
  }, EVERY_MS);
  timer.unref();
  return () => clearInterval(timer);
}
