import { createHash } from "node:crypto";
import { cpSync, existsSync, readFileSync, renameSync, rmSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { claimPreparation } from "./folder-claim.mjs";
import { makePrivateFolder } from "./private-files.mjs";
import { step } from "./say.mjs";
import { requireSuccess, runTied } from "./tied-process.mjs";

const STAMP = "node_modules/.installed-for";

/** Of npm's own variables, those that say where packages come from; the rest would carry `npm start`'s flags into `npm ci`. */
const KEPT = /^npm_config_(registry|cache|userconfig|globalconfig|cafile|proxy|https_proxy|noproxy)$/;

/**
 * Installs the packages of package-lock.json when those in node_modules are not the ones it names.
 * @param {import("./supervise.mjs").Life} life
 * @param {string} root
 */
export async function ensurePackages(life, root) {
  if (isFresh(root)) return;
  const claim = await claimPreparation(root);
  try {
    if (!isFresh(root)) await installPackages(life, root);
  } finally {
    claim.release();
  }
}

/** The lock file and the Node version alone: neither a changed script nor a changed clock is a reason to install again. */
function stampOf(/** @type {string} */ root) {
  const lock = readFileSync(join(root, "package-lock.json"));
  return `${createHash("sha256").update(lock).digest("hex")} node ${process.version} ${process.arch}\n`;
}

function isFresh(/** @type {string} */ root) {
  const stamp = join(root, STAMP);
  return existsSync(stamp) && readFileSync(stamp, "utf8") === stampOf(root);
}

/**
 * Installs beside what is there and changes places when all is complete, so that an interrupted installation leaves nothing.
 * @param {import("./supervise.mjs").Life} life
 * @param {string} root
 */
async function installPackages(life, root) {
  const staging = makePrivateFolder(join(root, ".data/packages.new"));
  const clear = () => rmSync(staging, { recursive: true, force: true, maxRetries: 10, retryDelay: 100 });
  clear();
  makePrivateFolder(staging);
  for (const name of ["package.json", "package-lock.json", ".npmrc"])
    cpSync(join(root, name), join(staging, name));
  const forget = life.onEnd(clear);
  const paths = packagePaths(root);
  const done = () => paths.filter((path) => existsSync(join(staging, path, "package.json"))).length;
  try {
    const flags = ["--include=dev", "--ignore-scripts", "--loglevel=error", "--no-progress"];
    const install = async () => {
      const ended = await runNpm(life, staging, ["ci", ...flags]);
      requireSuccess(ended, "npm could not install the packages. Mend what it says above, then start again.");
    };
    await step("Installing packages", install, () => `${done()} of ${paths.length}`);
    writeFileSync(join(staging, STAMP), stampOf(root));
    const old = join(staging, "replaced");
    if (existsSync(join(root, "node_modules"))) renameSync(join(root, "node_modules"), old);
    renameSync(join(staging, "node_modules"), join(root, "node_modules"));
  } finally {
    clear();
    forget();
  }
}

/**
 * npm as it was started with, in an environment that none of our own start's settings leak into.
 * @param {import("./supervise.mjs").Life} life
 * @param {string} folder
 * @param {readonly string[]} args
 */
function runNpm(life, folder, args) {
  const kept = Object.entries(process.env).filter(
    ([name]) => name !== "NODE_ENV" && (!name.startsWith("npm_") || KEPT.test(name)),
  );
  const npm = process.env["npm_execpath"];
  const [command, ...before] = npm?.endsWith("npm-cli.js") ? [process.execPath, npm] : ["npm"];
  return runTied(life, command, [...before, ...args], { cwd: folder, env: Object.fromEntries(kept) });
}

/** Where the packages for this kind of machine go, for the count of how many are there. */
function packagePaths(/** @type {string} */ root) {
  /** @type {{ packages: Record<string, { os?: string[], cpu?: string[] }> }} */
  const lock = JSON.parse(readFileSync(join(root, "package-lock.json"), "utf8"));
  return Object.entries(lock.packages)
    .filter(
      ([, { os, cpu }]) => (os?.includes(process.platform) ?? true) && (cpu?.includes(process.arch) ?? true),
    )
    .map(([path]) => path)
    .filter((path) => path !== "");
}
