import type { Migration } from "../database.ts";
import { hash, id, name, statedHash, time, word } from "./column-types.ts";

/**
 * A machine's revisions never change. A job is a log: its entries are only ever added, and what it says is read from
 * them in order; a revision of a job has a log of its own, which starts as a copy. Entries and indications together are
 * its events, numbered while its row is locked, so that their numbers rise as they are committed; a copied entry is no
 * event. A file is kept in parts, since a packet to the database holds less than a file may.
 */
const tables = {
  machines: `id ${id} PRIMARY KEY, organisationId ${id} NOT NULL, name ${name} NOT NULL, plantTag ${name} NULL,
    revision INT UNSIGNED NOT NULL, archivedAt ${time} NULL, createdAt ${time} NOT NULL, version INT UNSIGNED NOT NULL,
    KEY machines_list (organisationId, createdAt, id),
    CONSTRAINT machines_organisation FOREIGN KEY (organisationId) REFERENCES organisations (id)`,

  machine_revisions: `id ${id} PRIMARY KEY, organisationId ${id} NOT NULL, machineId ${id} NOT NULL,
    revision INT UNSIGNED NOT NULL, documentText LONGTEXT NOT NULL, documentHash ${statedHash} NOT NULL,
    reason TEXT NOT NULL, memberId ${id} NULL, keyId ${id} NULL, createdAt ${time} NOT NULL,
    UNIQUE KEY machine_revisions_number (machineId, revision),
    CONSTRAINT machine_revisions_machine FOREIGN KEY (machineId) REFERENCES machines (id)`,

  jobs: `id ${id} PRIMARY KEY, organisationId ${id} NOT NULL, machineId ${id} NOT NULL,
    machineRevision INT UNSIGNED NOT NULL, title ${name} NOT NULL, revision INT UNSIGNED NOT NULL,
    state ${word} NOT NULL, signedAt ${time} NULL, createdAt ${time} NOT NULL, version INT UNSIGNED NOT NULL,
    events INT UNSIGNED NOT NULL, KEY jobs_list (organisationId, createdAt, id), KEY jobs_machine (organisationId, machineId, createdAt, id),
    CONSTRAINT jobs_machine_owner FOREIGN KEY (machineId) REFERENCES machines (id)`,

  job_entries: `jobId ${id} NOT NULL, revision INT UNSIGNED NOT NULL, sequence INT UNSIGNED NOT NULL, id ${id} NOT NULL,
    organisationId ${id} NOT NULL, kind ${word} NOT NULL, documentText LONGTEXT NOT NULL, createdAt ${time} NOT NULL,
    memberId ${id} NULL, keyId ${id} NULL, authorName ${name} NOT NULL, event INT UNSIGNED NULL,
    PRIMARY KEY (jobId, revision, sequence), UNIQUE KEY job_entries_id (jobId, revision, id),
    UNIQUE KEY job_entries_event (jobId, event),
    CONSTRAINT job_entries_job FOREIGN KEY (jobId) REFERENCES jobs (id)`,

  job_indications: `jobId ${id} NOT NULL, id ${id} NOT NULL, organisationId ${id} NOT NULL, answerText LONGTEXT NOT NULL,
    requestText LONGTEXT NOT NULL, createdAt ${time} NOT NULL, memberId ${id} NULL, keyId ${id} NULL,
    event INT UNSIGNED NOT NULL, PRIMARY KEY (jobId, id), UNIQUE KEY job_indications_event (jobId, event),
    CONSTRAINT job_indications_job FOREIGN KEY (jobId) REFERENCES jobs (id)`,

  stored_files: `id ${id} PRIMARY KEY, organisationId ${id} NOT NULL, name ${name} NOT NULL, mediaType VARCHAR(127) NOT NULL,
    bytes INT UNSIGNED NOT NULL, sha256 ${hash} NOT NULL, createdAt ${time} NOT NULL,
    CONSTRAINT stored_files_organisation FOREIGN KEY (organisationId) REFERENCES organisations (id)`,

  stored_file_parts: `fileId ${id} NOT NULL, sequence INT UNSIGNED NOT NULL, content MEDIUMBLOB NOT NULL,
    PRIMARY KEY (fileId, sequence), CONSTRAINT stored_file_parts_file FOREIGN KEY (fileId) REFERENCES stored_files (id)`,
};

export const up: Migration["up"] = async (database) => {
  for (const [table, columns] of Object.entries(tables)) {
    await database.query(`CREATE TABLE IF NOT EXISTS ${table} (${columns}) ENGINE=InnoDB`);
  }
};

export const down: Migration["down"] = async (database) => {
  for (const table of Object.keys(tables).reverse()) await database.query(`DROP TABLE IF EXISTS ${table}`);
};
