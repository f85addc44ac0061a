import type { Transaction } from "sequelize";
import type { Deps } from "../deps.ts";

/**
 * Writes a mail to all active administrators of an organisation, to be sent once the transaction has committed, and
 * tried again while the mail server cannot be reached. An organisation without one gets none.
 */
export async function queueMailToAdmins(
  { database, now, newId }: Pick<Deps, "database" | "now" | "newId">,
  transaction: Transaction,
  organisationId: string,
  { subject, text }: { readonly subject: string; readonly text: string },
): Promise<void> {
  const admins = await database.models.members.findAll({
    where: { organisationId, role: "admin", disabledAt: null },
    attributes: ["email"],
    order: ["id"],
    transaction,
  });
  if (admins.length === 0) return;
  const at = now();
  await database.models.queuedMails.create(
    {
      id: newId(),
      organisationId,
      recipients: admins.map(({ email }) => email).join("\n"),
      subject: subject.replaceAll(/\p{Cc}+/gu, " ").slice(0, 255),
      text,
      state: "pending",
      nextAttemptAt: at,
      createdAt: at,
    },
    { transaction },
  );
}
