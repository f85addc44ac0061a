import { randomBytes } from "node:crypto";
import { join } from "node:path";
import { ensureConsole } from "./console-build.mjs";
import { databaseNeeds, ensurePrograms } from "./debian-packages.mjs";
import { hasOutsideDatabase, readEnvironment } from "./environment.mjs";
import { askHolder, claimFolder } from "./folder-claim.mjs";
import { ensurePackages } from "./packages.mjs";
import { checkAddress } from "./ports.mjs";
import { openPrivateDatabase } from "./private-database.mjs";
import { isWritable, keepPrivateText, makePrivateFolder } from "./private-files.mjs";
import { Refusal, say, step } from "./say.mjs";
import { loadTypeScript, serveIn } from "./serve.mjs";

/** @typedef {import("./supervise.mjs").Life} Life */
/** @typedef {import("./serve.mjs").Environment} Environment */

const newSecret = () => randomBytes(32).toString("hex");

/**
 * Everything from a fresh copy to a service that answers.
 * @param {Life} life
 * @param {string} root
 */
export async function start(life, root) {
  const started = Date.now();
  const environment = readEnvironment(root);
  await ensurePackages(life, root);
  await loadTypeScript();
  const settings = await readSettings(environment);
  const claim = hasOutsideDatabase(environment) ? null : await claimData(life, settings.dataDir);
  if (settings.port !== 0) await checkAddress(settings.host, settings.port);
  await ensureConsole(life, root);
  const ready = claim === null ? environment : await withPrivateDatabase(life, environment, settings.dataDir);
  say("Starting the service");
  const url = await serveIn(life, ready);
  claim?.announce(url);
  say(`\nConsole  ${url}/\nDocs     ${url}/docs\n`);
  say(`Ready after ${((Date.now() - started) / 1000).toFixed(1)} s. Ctrl-C stops everything.`);
}

/**
 * The settings, with all their faults told before anything is started for them. What the private database brings later
 * is stood in for.
 * @param {Environment} environment
 */
export async function readSettings(environment) {
  const { readConfig } = await import("../config.ts");
  if (hasOutsideDatabase(environment)) return readConfig(environment);
  const brought = {
    PRIVATE_DATABASE: "1",
    DATABASE_URL: "mariadb://127.0.0.1/private",
    ...(environment["APP_SECRET"] || environment["APP_SECRET_FILE"] ? {} : { APP_SECRET: newSecret() }),
  };
  return readConfig({ ...environment, ...brought });
}

/**
 * @param {Life} life
 * @param {string} dataDir
 */
export async function claimData(life, dataDir) {
  makePrivateFolder(dataDir);
  if (!isWritable(dataDir))
    throw new Refusal(
      `${dataDir} belongs to another user. Start as that user, or with DATA_DIR set to a folder of your own.`,
    );
  const claim = await claimFolder(dataDir, "data");
  if (claim !== null) {
    life.onEnd(claim.release);
    return claim;
  }
  const holder = await askHolder(dataDir, "data");
  const where = holder?.url ? ` at ${holder.url}` : "";
  const how = holder ? `Stop it with: kill ${holder.pid}. Or start` : "Start";
  throw new Refusal(
    `The service already runs on ${dataDir}${where}${holder ? ` (process ${holder.pid})` : ""}.\n` +
      `${how} a second one beside it with a folder and a port of its own:\n\n  DATA_DIR=.data/second PORT=4101 npm start`,
  );
}

/**
 * @param {Life} life
 * @param {Environment} environment
 * @param {string} dataDir
 * @returns {Promise<Environment>} with the database and the secret in it
 */
export async function withPrivateDatabase(life, environment, dataDir) {
  await ensurePrograms(life, databaseNeeds);
  const database = await step("Starting the private database", () => openPrivateDatabase(dataDir));
  life.onEnd(database.close);
  database.died.catch(life.fail);
  const secretGiven = environment["APP_SECRET"] || environment["APP_SECRET_FILE"];
  return {
    ...environment,
    PRIVATE_DATABASE: "1",
    DATABASE_URL: database.url,
    ...(secretGiven ? {} : { APP_SECRET: keepPrivateText(join(dataDir, "app-secret"), newSecret) }),
  };
}
