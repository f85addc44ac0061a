import type { Sequelize } from "sequelize";
import { defineApiKey } from "./api-key.ts";
import { defineAuditEvent } from "./audit-event.ts";
import { defineCalculation } from "./calculation.ts";
import { defineInvitation } from "./invitation.ts";
import { defineMember } from "./member.ts";
import { defineOrganisation } from "./organisation.ts";
import { defineSession } from "./session.ts";

export type Models = ReturnType<typeof defineModels>;

/** Models bound to one connection pool: no global state, so that tests run databases side by side. */
export function defineModels(sequelize: Sequelize) {
  const models = {
    organisations: defineOrganisation(sequelize),
    members: defineMember(sequelize),
    invitations: defineInvitation(sequelize),
    sessions: defineSession(sequelize),
    apiKeys: defineApiKey(sequelize),
    calculations: defineCalculation(sequelize),
    auditEvents: defineAuditEvent(sequelize),
  };
  models.members.belongsTo(models.organisations, { as: "organisation", foreignKey: "organisationId" });
  models.sessions.belongsTo(models.members, { as: "member", foreignKey: "memberId" });
  models.invitations.belongsTo(models.members, { as: "member", foreignKey: "memberId" });
  models.apiKeys.belongsTo(models.organisations, { as: "organisation", foreignKey: "organisationId" });
  models.apiKeys.belongsTo(models.members, { as: "maker", foreignKey: "createdBy" });
  return models;
}
