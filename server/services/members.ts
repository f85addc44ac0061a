import { Op } from "sequelize";
import type { Transaction } from "sequelize";
import type { z } from "zod";
import type { createMemberRequest, updateMemberRequest } from "../../shared/schemas/members.ts";
import type { acceptInvitationRequest } from "../../shared/schemas/sessions.ts";
import type { Deps } from "../deps.ts";
import { HttpProblem, problemOfFaults } from "../http/http-problem.ts";
import type { Member } from "../models/member.ts";
import type { By } from "./author.ts";
import { inTransaction, isDuplicateEntry } from "./in-transaction.ts";
import { randomText } from "./key-format.ts";
import { hashPassword, refuseWeakPassword } from "./passwords.ts";
import { recordAudit } from "./record-audit.ts";

const INVITATION_MS = 7 * 24 * 60 * 60 * 1000;

export interface Invited {
  readonly member: Member;
  readonly token: string;
  readonly expiresAt: Date;
}

/**
 * Adds a member who can sign in once the link has been used.
 * @throws HttpProblem email_taken
 */
export async function inviteMember(
  deps: Deps,
  order: z.infer<typeof createMemberRequest>,
  by: By,
): Promise<Invited> {
  const organisationId = by.caller.organisation.id;
  try {
    const invited = await inTransaction(deps.database.sequelize, async (transaction) => {
      const member = await deps.database.models.members.create(
        {
          id: deps.newId(),
          organisationId,
          email: order.email.toLowerCase(),
          name: order.name,
          role: order.role,
          createdAt: deps.now(),
        },
        { transaction },
      );
      await recordAudit(deps, transaction, {
        action: "member.invited",
        subject: member.id,
        organisationId,
        by: by.caller,
        requestId: by.requestId,
        details: { email: member.email, role: member.role },
      });
      const invitation = await makeInvitation(deps, member, transaction);
      await by.claim?.settle({ status: 201, resourceId: member.id }, transaction);
      return { member, ...invitation };
    });
    by.claim?.markSettled();
    return invited;
  } catch (error) {
    if (!isDuplicateEntry(error)) throw error;
    throw new HttpProblem("email_taken", "A member with this e-mail exists.", {
      errors: [{ pointer: "/email", code: "email_taken", detail: "A member with this e-mail exists." }],
    });
  }
}

/** A new link for a member who has not signed in yet, or has lost the password; earlier links stop working. */
export async function renewInvitation(deps: Deps, id: string, by: By): Promise<Invited> {
  const organisationId = by.caller.organisation.id;
  const invited = await inTransaction(deps.database.sequelize, async (transaction) => {
    const member = await lockMember(deps, id, organisationId, transaction);
    await recordAudit(deps, transaction, {
      action: "invitation.renewed",
      subject: id,
      organisationId,
      by: by.caller,
      requestId: by.requestId,
    });
    const invitation = await makeInvitation(deps, member, transaction);
    await by.claim?.settle({ status: 201, resourceId: member.id }, transaction);
    return { member, ...invitation };
  });
  by.claim?.markSettled();
  return invited;
}

/**
 * Uses a link: sets the password and ends the member's other sessions. The link is good once.
 * @throws HttpProblem invitation_invalid, password_weak
 */
export async function acceptInvitation(
  deps: Deps,
  order: z.infer<typeof acceptInvitationRequest>,
  requestId: string,
): Promise<Member> {
  const tokenHash = deps.secrets.hash("invitation", order.token);
  const found = await deps.database.models.invitations.findOne({ where: { tokenHash }, include: "member" });
  const invited = found as (typeof found & { member: Member }) | null;
  if (!invited) throw invitationInvalid();
  refuseWeakPassword(order.password, [invited.member.email, invited.member.name]);
  const passwordHash = await hashPassword(order.password);
  return inTransaction(deps.database.sequelize, async (transaction) => {
    const now = deps.now();
    const [used] = await deps.database.models.invitations.update(
      { usedAt: now },
      { where: { id: invited.id, usedAt: null, expiresAt: { [Op.gt]: now } }, transaction },
    );
    const member = await lockMember(deps, invited.memberId, invited.organisationId, transaction);
    if (used !== 1 || member.disabledAt) throw invitationInvalid();
    await member.update({ passwordHash, ...(order.name ? { name: order.name } : {}) }, { transaction });
    await deps.database.models.sessions.update(
      { endedAt: now },
      { where: { memberId: member.id, endedAt: null }, transaction },
    );
    await recordAudit(deps, transaction, {
      action: "invitation.accepted",
      subject: member.id,
      organisationId: member.organisationId,
      by: { memberId: member.id },
      requestId,
    });
    return member;
  });
}

/**
 * Changes a member whose version is the one the caller read.
 * @throws HttpProblem not_found, version_stale, last_admin
 */
export async function updateMember(
  deps: Deps,
  id: string,
  version: number,
  change: z.infer<typeof updateMemberRequest>,
  by: Omit<By, "claim">,
): Promise<Member> {
  const organisationId = by.caller.organisation.id;
  const changed = await inTransaction(deps.database.sequelize, async (transaction) => {
    // All administrators are locked together, so that two demotions at once cannot leave none.
    const admins = await deps.database.models.members.findAll({
      where: { organisationId, role: "admin", disabledAt: null },
      order: ["id"],
      lock: transaction.LOCK.UPDATE,
      transaction,
    });
    const member = await lockMember(deps, id, organisationId, transaction);
    if (member.version !== version) {
      throw new HttpProblem(
        "version_stale",
        `The member is at version ${member.version}.`,
        {},
        { ETag: `"${member.version}"` },
      );
    }
    const staysAdmin = (change.role ?? member.role) === "admin" && (change.active ?? true);
    if (!staysAdmin && admins.every((admin) => admin.id === id) && admins.length > 0) {
      throw new HttpProblem("last_admin", "This member is the last active administrator.");
    }
    const before = { name: member.name, role: member.role, active: !member.disabledAt };
    const { active, name, role } = change;
    await member.update(
      {
        ...(name === undefined ? {} : { name }),
        ...(role === undefined ? {} : { role }),
        ...(active === undefined ? {} : { disabledAt: active ? null : (member.disabledAt ?? deps.now()) }),
      },
      { transaction },
    );
    await recordAudit(deps, transaction, {
      action: "member.changed",
      subject: id,
      organisationId,
      by: by.caller,
      requestId: by.requestId,
      details: { before, change },
    });
    return member;
  });
  const { sessions } = deps.database.models;
  const open = await sessions.findAll({ attributes: ["id"], where: { memberId: id, endedAt: null } });
  for (const session of open) deps.credentials.forget(session.id);
  return changed;
}

async function lockMember(
  deps: Deps,
  id: string,
  organisationId: string,
  transaction: Transaction,
): Promise<Member> {
  const member = await deps.database.models.members.findOne({
    where: { id, organisationId },
    lock: transaction.LOCK.UPDATE,
    transaction,
  });
  if (!member) throw new HttpProblem("not_found", "There is no member with this id.");
  return member;
}

async function makeInvitation(
  deps: Deps,
  member: Member,
  transaction: Transaction,
): Promise<{ token: string; expiresAt: Date }> {
  const now = deps.now();
  const { invitations } = deps.database.models;
  await invitations.update({ usedAt: now }, { where: { memberId: member.id, usedAt: null }, transaction });
  const token = randomText(43);
  const expiresAt = new Date(now.getTime() + INVITATION_MS);
  await invitations.create(
    {
      id: deps.newId(),
      organisationId: member.organisationId,
      memberId: member.id,
      tokenHash: deps.secrets.hash("invitation", token),
      createdAt: now,
      expiresAt,
    },
    { transaction },
  );
  return { token, expiresAt };
}

function invitationInvalid(): HttpProblem {
  return problemOfFaults([
    { pointer: "/token", code: "invitation_invalid", detail: "The link is used, expired or not valid." },
  ]);
}
