import { Op } from "sequelize";
import type { Deps } from "../deps.ts";
import type { QueuedMail } from "../models/queued-mail.ts";
import { inTransaction } from "../services/in-transaction.ts";
import { MailFailed } from "./mailer.ts";

const MINUTE_MS = 60_000;
/** Longer than a mail takes: a process that dies over one frees it by this. */
const LEASE_MS = MINUTE_MS;
const MAILS_AT_ONCE = 20;
/** Waits between tries: a mail server that is away for a day and more finds its mail waiting. */
const waitsMs = [1, 5, 15, 60, 240, 720, 1_440, 1_440].map((minutes) => minutes * MINUTE_MS);

/** Sends the service's own mails that are due, one after another. Several processes may ask at once. Returns how many. */
export async function sendQueuedMails(deps: Deps): Promise<number> {
  let sent = 0;
  for (const row of await claimMails(deps)) if (await sendOne(deps, row)) sent += 1;
  return sent;
}

async function claimMails({ database, now, newId }: Deps): Promise<QueuedMail[]> {
  const { queuedMails } = database.models;
  const at = now();
  const due = { state: "pending" as const, nextAttemptAt: { [Op.lte]: at } };
  const rows = await queuedMails.findAll({
    where: due,
    attributes: ["id"],
    order: ["nextAttemptAt"],
    limit: MAILS_AT_ONCE,
  });
  if (rows.length === 0) return [];
  const id = rows.map((row) => row.id);
  const leaseToken = newId();
  // Each mail of the batch may take its time.
  const leaseUntil = new Date(at.getTime() + LEASE_MS * rows.length);
  return inTransaction(database.sequelize, async (transaction) => {
    await queuedMails.update(
      { leaseToken, nextAttemptAt: leaseUntil },
      { where: { ...due, id }, transaction },
    );
    return queuedMails.findAll({ where: { id, leaseToken }, transaction });
  });
}

async function sendOne(deps: Deps, row: QueuedMail): Promise<boolean> {
  const { organisationId, recipients, subject, text, tries } = row;
  const outcome = await deps.mailer.send({ organisationId, to: recipients.split("\n"), subject, text }).then(
    () => "sent" as const,
    (error: unknown) => {
      if (error instanceof MailFailed) return error.isRefused ? ("failed" as const) : ("pending" as const);
      throw error;
    },
  );
  const wait = outcome === "pending" ? waitsMs[tries] : undefined;
  await row.update({
    state: outcome === "pending" && wait === undefined ? "failed" : outcome,
    tries: tries + 1,
    leaseToken: null,
    nextAttemptAt: wait === undefined ? null : new Date(deps.now().getTime() + wait),
  });
  return outcome === "sent";
}
