import { setTimeout as sleep } from "node:timers/promises";
import type { Sequelize, Transaction } from "sequelize";

/** Deadlock (also a cluster's certification conflict), lock wait timeout, node not ready: worth the same work again. */
const RETRYABLE = new Set([1213, 1205, 1047]);
const ATTEMPTS = 5;

/**
 * Runs `work` in one transaction, and the whole of it again when the database undid it for another's sake.
 * The only way to open a transaction: `work` must have no effect outside of it.
 */
export async function inTransaction<T>(
  sequelize: Sequelize,
  work: (transaction: Transaction) => Promise<T>,
): Promise<T> {
  for (let attempt = 1; ; attempt += 1) {
    try {
      return await sequelize.transaction(work);
    } catch (error) {
      if (attempt === ATTEMPTS || !RETRYABLE.has(databaseErrorNumber(error) ?? 0)) throw error;
      await sleep(5 * 2 ** attempt);
    }
  }
}

/** The server's own error number behind an ORM error; null when the error is not the database's. */
export function databaseErrorNumber(error: unknown): number | null {
  for (let cause: unknown = error; typeof cause === "object" && cause !== null;) {
    const {
      errno,
      original,
      cause: inner,
    } = cause as { errno?: unknown; original?: unknown; cause?: unknown };
    if (typeof errno === "number") return errno;
    cause = original ?? inner;
  }
  return null;
}

const DUPLICATE_ENTRY = 1062;

export function isDuplicateEntry(error: unknown): boolean {
  return databaseErrorNumber(error) === DUPLICATE_ENTRY;
}
