import { existsSync, readFileSync } from "node:fs";
import { join } from "node:path";
import { parseEnv } from "node:util";

/**
 * The environment, completed from the file `.env` of the project's folder; ENV_FILE names another.
 * @param {string} root
 * @returns {Record<string, string | undefined>}
 */
export function readEnvironment(root) {
  const file = process.env["ENV_FILE"] ?? join(root, ".env");
  const written = existsSync(file) ? parseEnv(readFileSync(file, "utf8")) : {};
  return { ...written, ...process.env };
}

/** Whether the owner brings a database; then none is made. @param {Record<string, string | undefined>} environment */
export const hasOutsideDatabase = (environment) =>
  Boolean(environment["DATABASE_URL"] || environment["DATABASE_URL_FILE"]);
