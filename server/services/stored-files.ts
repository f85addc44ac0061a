import { createHash } from "node:crypto";
import type { Transaction } from "sequelize";
import type { Deps } from "../deps.ts";
import { HttpProblem } from "../http/http-problem.ts";
import type { StoredFile } from "../models/stored-file.ts";

/** Well under the packet that a database takes by default, escaped text included. */
const PART_BYTES = 1024 * 1024;

export interface SentFile {
  readonly name: string;
  readonly mediaType: string;
  readonly content: Buffer;
}

/** Keeps a file in the transaction that says what it is for: all of it or nothing. */
export async function storeFile(
  deps: Deps,
  transaction: Transaction,
  organisationId: string,
  { name, mediaType, content }: SentFile,
): Promise<StoredFile> {
  const { storedFiles, storedFileParts } = deps.database.models;
  const file = await storedFiles.create(
    {
      id: deps.newId(),
      organisationId,
      name,
      mediaType,
      bytes: content.length,
      sha256: createHash("sha256").update(content).digest("hex"),
      createdAt: deps.now(),
    },
    { transaction },
  );
  for (let from = 0, sequence = 0; from < content.length; from += PART_BYTES, sequence += 1) {
    const part = content.subarray(from, from + PART_BYTES);
    await storedFileParts.create({ fileId: file.id, sequence, content: part }, { transaction });
  }
  return file;
}

/**
 * Reads a file back, and proves that it is the one that was sent.
 * @throws HttpProblem not_found
 */
export async function readStoredFile(
  deps: Deps,
  organisationId: string,
  id: string,
): Promise<{ readonly file: StoredFile; readonly content: Buffer }> {
  const { storedFiles, storedFileParts } = deps.database.models;
  const file = await storedFiles.findOne({ where: { id, organisationId } });
  if (!file) throw new HttpProblem("not_found", "There is no file with this id.");
  const parts = await storedFileParts.findAll({ where: { fileId: id }, order: ["sequence"] });
  const content = Buffer.concat(parts.map((part) => part.content));
  if (createHash("sha256").update(content).digest("hex") !== file.sha256) {
    throw new Error(`File ${id} is not the one that was stored.`);
  }
  return { file, content };
}
