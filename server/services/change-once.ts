import type { Transaction } from "sequelize";
import type { Deps } from "../deps.ts";
import { reply, type Reply } from "../http/operation.ts";
import type { By } from "./author.ts";
import { inTransaction } from "./in-transaction.ts";

/**
 * Runs a change and keeps its answer under the call's Idempotency-Key in one transaction: a process that dies has done
 * both or neither. `work` gives the body, and has no effect outside of the transaction.
 */
export async function changeOnce(
  deps: Deps,
  { claim }: Pick<By, "claim">,
  status: number,
  work: (transaction: Transaction) => Promise<{ body: unknown; headers?: Record<string, string> }>,
): Promise<Reply> {
  const { body, headers } = await inTransaction(deps.database.sequelize, async (transaction) => {
    const done = await work(transaction);
    await claim?.settle({ status, answerText: JSON.stringify(done.body) }, transaction);
    return done;
  });
  claim?.markSettled();
  return reply(status, body, headers);
}
