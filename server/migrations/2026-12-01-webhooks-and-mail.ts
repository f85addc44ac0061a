import type { Migration } from "../database.ts";
import { id, name, time, word } from "./column-types.ts";

/**
 * A delivery is written in the transaction of what it tells of and sent afterwards: `nextAttemptAt` is when it is due,
 * and while a process sends it, when its lease ends. No foreign key to the endpoint: it would lock the endpoint's row
 * for every calculation. Mails wait in the same way.
 */
const tables = {
  webhook_endpoints: `id ${id} PRIMARY KEY, organisationId ${id} NOT NULL, name ${name} NOT NULL,
    url VARCHAR(2000) NOT NULL, events TEXT NOT NULL, active BOOLEAN NOT NULL, stopReason ${word} NULL,
    stoppedAt ${time} NULL, failingSince ${time} NULL, secretSealed TEXT NOT NULL, previousSecretSealed TEXT NULL,
    previousSecretUntil ${time} NULL, createdAt ${time} NOT NULL, version INT UNSIGNED NOT NULL,
    KEY webhook_endpoints_list (organisationId, createdAt, id),
    CONSTRAINT webhook_endpoints_organisation FOREIGN KEY (organisationId) REFERENCES organisations (id)`,

  webhook_deliveries: `id ${id} PRIMARY KEY, organisationId ${id} NOT NULL, endpointId ${id} NOT NULL,
    type ${word} NOT NULL, payloadText TEXT NOT NULL, state ${word} NOT NULL, attempts INT UNSIGNED NOT NULL,
    tries INT UNSIGNED NOT NULL, nextAttemptAt ${time} NULL, leaseToken ${id} NULL, createdAt ${time} NOT NULL,
    KEY webhook_deliveries_list (organisationId, endpointId, createdAt, id),
    KEY webhook_deliveries_due (state, nextAttemptAt), KEY webhook_deliveries_age (createdAt)`,

  webhook_attempts: `deliveryId ${id} NOT NULL, attempt INT UNSIGNED NOT NULL, organisationId ${id} NOT NULL,
    at ${time} NOT NULL, status SMALLINT UNSIGNED NULL, durationMs DOUBLE NOT NULL, error ${word} NULL,
    detail VARCHAR(255) NULL, replyText VARCHAR(1024) NULL, PRIMARY KEY (deliveryId, attempt),
    CONSTRAINT webhook_attempts_delivery FOREIGN KEY (deliveryId) REFERENCES webhook_deliveries (id) ON DELETE CASCADE`,

  key_notices: `keyId ${id} NOT NULL, days SMALLINT UNSIGNED NOT NULL, organisationId ${id} NOT NULL,
    createdAt ${time} NOT NULL, PRIMARY KEY (keyId, days)`,

  queued_mails: `id ${id} PRIMARY KEY, organisationId ${id} NOT NULL, recipients TEXT NOT NULL,
    subject VARCHAR(255) NOT NULL, text TEXT NOT NULL, state ${word} NOT NULL, tries INT UNSIGNED NOT NULL,
    nextAttemptAt ${time} NULL, leaseToken ${id} NULL, createdAt ${time} NOT NULL,
    KEY queued_mails_due (state, nextAttemptAt), KEY queued_mails_age (createdAt)`,
};

export const up: Migration["up"] = async (database) => {
  for (const [table, columns] of Object.entries(tables)) {
    await database.query(`CREATE TABLE IF NOT EXISTS ${table} (${columns}) ENGINE=InnoDB`);
  }
  await database.query("ALTER TABLE api_keys ADD KEY IF NOT EXISTS api_keys_expiry (expiresAt)");
};

export const down: Migration["down"] = async (database) => {
  await database.query("ALTER TABLE IF EXISTS api_keys DROP KEY IF EXISTS api_keys_expiry");
  for (const table of Object.keys(tables).reverse()) await database.query(`DROP TABLE IF EXISTS ${table}`);
};
