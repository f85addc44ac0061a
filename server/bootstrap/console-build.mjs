import { createHash } from "node:crypto";
import { existsSync, readFileSync, readdirSync, renameSync, rmSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { claimPreparation } from "./folder-claim.mjs";
import { step } from "./say.mjs";
import { requireSuccess, runTied } from "./tied-process.mjs";

const BUILT = "console/dist";
const STAMP = ".built-from";
/** Beside the packages, where it is on the same disk and no watcher looks. */
const UNFINISHED = "node_modules/.cache/console.new";
const REPLACED = "node_modules/.cache/console.old";

/**
 * Builds the console when its sources are not the ones it was built from.
 * @param {import("./supervise.mjs").Life} life
 * @param {string} root
 */
export async function ensureConsole(life, root) {
  if (isFresh(root)) return;
  const claim = await claimPreparation(root);
  try {
    if (!isFresh(root)) await buildConsole(life, root);
  } finally {
    claim.release();
  }
}

function isFresh(/** @type {string} */ root) {
  const stamp = join(root, BUILT, STAMP);
  return existsSync(stamp) && readFileSync(stamp, "utf8") === stampOf(root);
}

/** Over the content of everything that goes in; file times change with every copy of the project. */
function stampOf(/** @type {string} */ root) {
  const hash = createHash("sha256");
  for (const path of ["package-lock.json", ...sourcesIn(root, "console"), ...sourcesIn(root, "shared")])
    hash
      .update(path)
      .update("\0")
      .update(readFileSync(join(root, path)))
      .update("\0");
  return hash.digest("hex");
}

/** @param {string} root @param {string} folder @returns {string[]} in an order of their own, not the disk's */
function sourcesIn(root, folder) {
  const entries = readdirSync(join(root, folder), { withFileTypes: true });
  return entries
    .map((entry) => ({ entry, path: join(folder, entry.name) }))
    .filter(({ path }) => path !== BUILT && !/\.test\.tsx?$/.test(path))
    .flatMap(({ entry, path }) => (entry.isDirectory() ? sourcesIn(root, path) : [path]))
    .sort();
}

/**
 * In a process of its own: the bundler's memory and the mode it sets must not stay in the service.
 * @param {import("./supervise.mjs").Life} life
 * @param {string} root
 */
async function buildConsole(life, root) {
  const unfinished = join(root, UNFINISHED);
  const replaced = join(root, REPLACED);
  const built = join(root, BUILT);
  const stamp = stampOf(root);
  const vite = join(root, "node_modules/vite/bin/vite.js");
  const config = join(root, "console/vite.config.ts");
  const args = [
    vite,
    "build",
    join(root, "console"),
    "--config",
    config,
    "--outDir",
    unfinished,
    "--emptyOutDir",
  ];
  await step("Building the console", async () => {
    const environment = { ...process.env, NODE_ENV: "production" };
    const ended = await runTied(life, process.execPath, args, { cwd: root, env: environment });
    requireSuccess(ended, "The console could not be built, for the reason above.");
  });
  writeFileSync(join(unfinished, STAMP), stamp);
  rmSync(replaced, { recursive: true, force: true });
  if (existsSync(built)) renameSync(built, replaced);
  renameSync(unfinished, built);
  rmSync(replaced, { recursive: true, force: true });
}
