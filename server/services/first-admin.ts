import type { Transaction } from "sequelize";
import type { Role } from "../../shared/access.ts";
import type { Deps } from "../deps.ts";
import type { Member } from "../models/member.ts";
import { inTransaction } from "./in-transaction.ts";
import { randomText } from "./key-format.ts";
import { hashPassword } from "./passwords.ts";
import { recordAudit } from "./record-audit.ts";

export interface NewMember {
  readonly email: string;
  readonly name: string;
  readonly role: Role;
  readonly password: string;
}

/** Sees to it that someone can sign in: the configured administrator, or one made up and told once. */
export async function ensureFirstAdmin(deps: Deps, announce: (line: string) => void): Promise<void> {
  const { models } = deps.database;
  const { admin, demo } = deps.config;
  if (admin && (await models.members.count({ where: { email: admin.email.toLowerCase() } })) > 0) return;
  if (!admin && (demo || (await models.members.count()) > 0)) return;
  const { email, password } = admin ?? { email: "admin@borewright.example", password: randomText(20) };
  const existing = await models.organisations.findOne({ order: ["createdAt", "id"] });
  await createMembers(deps, { existingOrganisationId: existing?.id, name: "First organisation" }, [
    { email, name: "Administrator", role: "admin", password },
  ]);
  announce(
    admin
      ? `First administrator: ${email}.`
      : `First administrator: ${email}, password ${password} (told this once).`,
  );
}

/** Makes members who can sign in at once, with their organisation where there is none yet. */
export async function createMembers(
  deps: Deps,
  organisation: { readonly existingOrganisationId?: string | undefined; readonly name: string },
  people: readonly NewMember[],
): Promise<{ organisationId: string; members: Member[] }> {
  const hashes = await Promise.all(people.map(({ password }) => hashPassword(password)));
  return inTransaction(deps.database.sequelize, async (transaction) => {
    const organisationId =
      organisation.existingOrganisationId ?? (await makeOrganisation(deps, organisation.name, transaction));
    const members: Member[] = [];
    for (const [index, { email, name, role }] of people.entries()) {
      const member = await deps.database.models.members.create(
        {
          id: deps.newId(),
          organisationId,
          email: email.toLowerCase(),
          name,
          role,
          passwordHash: hashes[index] ?? null,
          createdAt: deps.now(),
        },
        { transaction },
      );
      await recordAudit(deps, transaction, {
        action: "member.invited",
        subject: member.id,
        organisationId,
        by: null,
        requestId: null,
        details: { email: member.email, role },
      });
      members.push(member);
    }
    return { organisationId, members };
  });
}

async function makeOrganisation(deps: Deps, name: string, transaction: Transaction): Promise<string> {
  const { id } = await deps.database.models.organisations.create(
    { id: deps.newId(), name, createdAt: deps.now() },
    { transaction },
  );
  await recordAudit(deps, transaction, {
    action: "organisation.created",
    subject: id,
    organisationId: id,
    by: null,
    requestId: null,
    details: { name },
  });
  return id;
}
