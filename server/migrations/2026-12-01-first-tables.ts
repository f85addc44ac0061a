import type { Migration } from "../database.ts";
import { hash, id, time, word } from "./column-types.ts";

/**
 * Every table has a primary key and is InnoDB; every row belongs to one organisation. `calculations` is keyed by
 * (createdAt, id) with no foreign key and no other unique key, so that it can be partitioned by month: the id is a
 * UUIDv7, whose first 48 bits are createdAt, so that a look-up by id still goes through the primary key.
 */

const tables = {
  organisations: `id ${id} PRIMARY KEY, name VARCHAR(120) NOT NULL, createdAt ${time} NOT NULL`,

  members: `id ${id} PRIMARY KEY, organisationId ${id} NOT NULL, email VARCHAR(254) NOT NULL, name VARCHAR(120) NOT NULL,
    role ${word} NOT NULL, passwordHash VARCHAR(255) NULL, disabledAt ${time} NULL, lastSignedInAt ${time} NULL,
    version INT UNSIGNED NOT NULL, createdAt ${time} NOT NULL,
    UNIQUE KEY members_email (email), KEY members_list (organisationId, createdAt, id),
    CONSTRAINT members_organisation FOREIGN KEY (organisationId) REFERENCES organisations (id)`,

  invitations: `id ${id} PRIMARY KEY, organisationId ${id} NOT NULL, memberId ${id} NOT NULL, tokenHash ${hash} NOT NULL,
    createdAt ${time} NOT NULL, expiresAt ${time} NOT NULL, usedAt ${time} NULL,
    UNIQUE KEY invitations_token (tokenHash), KEY invitations_member (organisationId, memberId),
    CONSTRAINT invitations_owner FOREIGN KEY (memberId) REFERENCES members (id)`,

  sessions: `id ${id} PRIMARY KEY, organisationId ${id} NOT NULL, memberId ${id} NOT NULL, refreshHash ${hash} NOT NULL,
    previousHash ${hash} NULL, rotatedAt ${time} NOT NULL, createdAt ${time} NOT NULL, expiresAt ${time} NOT NULL,
    endedAt ${time} NULL, KEY sessions_member (organisationId, memberId), KEY sessions_expiry (expiresAt),
    CONSTRAINT sessions_owner FOREIGN KEY (memberId) REFERENCES members (id)`,

  api_keys: `id ${id} PRIMARY KEY, organisationId ${id} NOT NULL, name VARCHAR(120) NOT NULL, selector ${word} NOT NULL,
    secretHash ${hash} NOT NULL, scopes TEXT NOT NULL, createdBy ${id} NULL, createdAt ${time} NOT NULL,
    expiresAt ${time} NULL, lastUsedAt ${time} NULL, revokedAt ${time} NULL, version INT UNSIGNED NOT NULL,
    UNIQUE KEY api_keys_selector (selector), KEY api_keys_list (organisationId, createdAt, id),
    CONSTRAINT api_keys_organisation FOREIGN KEY (organisationId) REFERENCES organisations (id)`,

  calculations: `createdAt ${time} NOT NULL, id ${id} NOT NULL, organisationId ${id} NOT NULL, kind ${word} NOT NULL,
    status ${word} NOT NULL, engineVersion ${word} NOT NULL, durationMs DOUBLE NOT NULL,
    requestText LONGTEXT NOT NULL, requestCanonical LONGTEXT NOT NULL, inputHash CHAR(71) CHARACTER SET ascii NOT NULL,
    answerText LONGTEXT NOT NULL, resultHash CHAR(71) CHARACTER SET ascii NULL,
    memberId ${id} NULL, keyId ${id} NULL, requestId VARCHAR(128) CHARACTER SET ascii NOT NULL,
    note TEXT NULL, jobId ${id} NULL,
    PRIMARY KEY (createdAt, id), KEY calculations_list (organisationId, createdAt, id),
    KEY calculations_kind (organisationId, kind, createdAt, id), KEY calculations_key (organisationId, keyId, createdAt, id),
    KEY calculations_job (organisationId, jobId, createdAt, id)`,

  usage_events: `createdAt ${time} NOT NULL, id ${id} NOT NULL, organisationId ${id} NOT NULL, memberId ${id} NULL,
    keyId ${id} NULL, endpoint ${word} NOT NULL, status ${word} NOT NULL, durationMs DOUBLE NOT NULL,
    PRIMARY KEY (createdAt, id), KEY usage_events_list (organisationId, createdAt)`,

  idempotency_claims: `organisationId ${id} NOT NULL, credentialId ${id} NOT NULL, keyHash ${hash} NOT NULL,
    fingerprint ${hash} NOT NULL, token ${id} NOT NULL, leaseUntil ${time} NOT NULL, expiresAt ${time} NOT NULL,
    settledAt ${time} NULL, status SMALLINT UNSIGNED NULL, answerText LONGTEXT NULL, resourceId ${id} NULL,
    PRIMARY KEY (organisationId, credentialId, keyHash), KEY idempotency_claims_expiry (expiresAt)`,

  audit_events: `createdAt ${time} NOT NULL, id ${id} NOT NULL, organisationId ${id} NOT NULL, memberId ${id} NULL,
    keyId ${id} NULL, action ${word} NOT NULL, subject ${id} NOT NULL, details TEXT NOT NULL,
    requestId VARCHAR(128) CHARACTER SET ascii NULL,
    PRIMARY KEY (createdAt, id), KEY audit_events_list (organisationId, createdAt, id)`,
};

export const up: Migration["up"] = async (database) => {
  for (const [name, columns] of Object.entries(tables)) {
    await database.query(`CREATE TABLE IF NOT EXISTS ${name} (${columns}) ENGINE=InnoDB`);
  }
};

export const down: Migration["down"] = async (database) => {
  for (const name of Object.keys(tables).reverse()) await database.query(`DROP TABLE IF EXISTS ${name}`);
};
