import { randomBytes } from "node:crypto";
import { existsSync, renameSync, rmSync } from "node:fs";
import { join } from "node:path";
import { asRoot, endLeftOver, programPath, startServer } from "./database-server.mjs";
import { findFreePort, isPortFree } from "./ports.mjs";
import { makePrivateFolder, readPrivateFile, writePrivateFile } from "./private-files.mjs";
import { Refusal } from "./say.mjs";
import { awaitEnd, requireSuccess, spawnTied } from "./tied-process.mjs";

/** @typedef {import("./database-server.mjs").Access} Access */
/** @typedef {import("./database-server.mjs").PrivateDatabase} PrivateDatabase */

const PORT_ATTEMPTS = 3;

/**
 * Starts a MariaDB server of this folder's own, making it the first time: on loopback, its own port, one account.
 * @param {string} dataFolder
 * @param {import("./database-server.mjs").ServerOptions} [options]
 * @returns {Promise<PrivateDatabase>}
 */
export async function openPrivateDatabase(dataFolder, options = {}) {
  const folder = makePrivateFolder(dataFolder);
  await endLeftOver(folder);
  if (!existsSync(join(folder, "database"))) await makeDataFolder(folder);
  for (let attempt = 1; ; attempt += 1) {
    const access = await chooseAccess(folder);
    const opened = await startServer(folder, access, options);
    if (opened !== "port taken") return opened;
    if (attempt === PORT_ATTEMPTS) throw new Refusal("No free port was found for the private database.");
  }
}

/** The port and password of last time, with another port when someone else has taken that one. */
async function chooseAccess(/** @type {string} */ folder) {
  const file = join(folder, "database-access.json");
  /** @type {Partial<Access>} */
  const kept = JSON.parse(readPrivateFile(file) ?? "{}");
  const free = kept.port !== undefined && (await isPortFree("127.0.0.1", kept.port));
  const access = {
    port: free && kept.port !== undefined ? kept.port : await findFreePort(),
    password: kept.password ?? randomBytes(24).toString("base64url"),
  };
  if (access.port !== kept.port || access.password !== kept.password)
    writePrivateFile(file, `${JSON.stringify(access)}\n`);
  return access;
}

/** Made under another name and renamed, so that a half-made folder never counts. */
async function makeDataFolder(/** @type {string} */ folder) {
  const unfinished = join(folder, "database.new");
  rmSync(unfinished, { recursive: true, force: true });
  const ended = await awaitEnd(
    spawnTied(programPath("mariadb-install-db"), [
      "--no-defaults",
      `--datadir=${unfinished}`,
      "--skip-test-db",
      "--auth-root-authentication-method=normal",
      ...asRoot(),
    ]),
  );
  requireSuccess(ended, `MariaDB could not make its data folder in ${folder}.`);
  renameSync(unfinished, join(folder, "database"));
}
