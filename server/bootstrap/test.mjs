import { mkdtempSync, readdirSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { ensureConsole } from "./console-build.mjs";
import { databaseNeeds, ensurePrograms, testNeeds } from "./debian-packages.mjs";
import { ensurePackages } from "./packages.mjs";
import { runTied } from "./tied-process.mjs";

const FOLDER = /^borewright-test-(\d+)-/;

/**
 * Runs all tests, or those whose file names hold one of the words given.
 * @param {import("./supervise.mjs").Life} life
 * @param {string} root
 * @param {readonly string[]} args passed on to vitest
 */
export async function test(life, root, args) {
  await ensurePackages(life, root);
  await ensurePrograms(life, [...databaseNeeds, ...testNeeds]);
  await ensureConsole(life, root);
  clearAfterKilledRuns();
  // Whatever the tests leave behind goes with it, their database too.
  const folder = mkdtempSync(join(tmpdir(), `borewright-test-${process.pid}-`));
  life.onEnd(() => removeFolder(folder));
  const vitest = join(root, "node_modules/vitest/vitest.mjs");
  /** @type {NodeJS.ProcessEnv} */
  const environment = { ...process.env, TMPDIR: folder };
  // In production mode React refuses to be tested.
  delete environment["NODE_ENV"];
  const { code } = await runTied(
    life,
    process.execPath,
    [vitest, "run", "--config", join(root, "tests/vitest.config.ts"), ...args],
    { cwd: root, env: environment, stdio: ["ignore", "inherit", "inherit"] },
  );
  await life.end(code ?? 1);
}

/** A database that is on its way out may write its last page between two looks. */
const removeFolder = (/** @type {string} */ folder) =>
  rmSync(folder, { recursive: true, force: true, maxRetries: 20, retryDelay: 100 });

function clearAfterKilledRuns() {
  for (const name of readdirSync(tmpdir())) {
    const [, pid] = FOLDER.exec(name) ?? [];
    if (pid !== undefined && !isAlive(Number(pid))) removeFolder(join(tmpdir(), name));
  }
}

/** @param {number} pid @returns {boolean} */
function isAlive(pid) {
  try {
    process.kill(pid, 0);
    return true;
  } catch (error) {
    return error instanceof Error && "code" in error && error.code === "EPERM";
  }
}
