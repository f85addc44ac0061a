import type { Sequelize } from "sequelize";
import { defineApiKey } from "./api-key.ts";
import { defineAuditEvent } from "./audit-event.ts";
import { defineCalculation } from "./calculation.ts";
import { defineInvitation } from "./invitation.ts";
import { defineJob } from "./job.ts";
import { defineJobEntry } from "./job-entry.ts";
import { defineJobIndication } from "./job-indication.ts";
import { defineMachine } from "./machine.ts";
import { defineMachineRevision } from "./machine-revision.ts";
import { defineMember } from "./member.ts";
import { defineOrganisation } from "./organisation.ts";
import { defineKeyNotice } from "./key-notice.ts";
import { defineQueuedMail } from "./queued-mail.ts";
import { defineSession } from "./session.ts";
import { defineStoredFile, defineStoredFilePart } from "./stored-file.ts";
import { defineWebhookAttempt } from "./webhook-attempt.ts";
import { defineWebhookDelivery } from "./webhook-delivery.ts";
import { defineWebhookEndpoint } from "./webhook-endpoint.ts";

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
    machines: defineMachine(sequelize),
    machineRevisions: defineMachineRevision(sequelize),
    jobs: defineJob(sequelize),
    jobEntries: defineJobEntry(sequelize),
    jobIndications: defineJobIndication(sequelize),
    storedFiles: defineStoredFile(sequelize),
    storedFileParts: defineStoredFilePart(sequelize),
    webhookEndpoints: defineWebhookEndpoint(sequelize),
    webhookDeliveries: defineWebhookDelivery(sequelize),
    webhookAttempts: defineWebhookAttempt(sequelize),
    keyNotices: defineKeyNotice(sequelize),
    queuedMails: defineQueuedMail(sequelize),
  };
  models.members.belongsTo(models.organisations, { as: "organisation", foreignKey: "organisationId" });
  models.sessions.belongsTo(models.members, { as: "member", foreignKey: "memberId" });
  models.invitations.belongsTo(models.members, { as: "member", foreignKey: "memberId" });
  models.apiKeys.belongsTo(models.organisations, { as: "organisation", foreignKey: "organisationId" });
  models.apiKeys.belongsTo(models.members, { as: "maker", foreignKey: "createdBy" });
  models.jobs.belongsTo(models.machines, { as: "machine", foreignKey: "machineId" });
  return models;
}
