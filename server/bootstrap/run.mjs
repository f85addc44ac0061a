import { readFileSync } from "node:fs";
import { fileURLToPath } from "node:url";
import { ensureConsole } from "./console-build.mjs";
import { databaseNeeds, ensurePrograms } from "./debian-packages.mjs";
import { dev } from "./dev.mjs";
import { ensurePackages } from "./packages.mjs";
import { Refusal } from "./say.mjs";
import { serve } from "./serve.mjs";
import { start } from "./start.mjs";
import { supervise } from "./supervise.mjs";
import { test } from "./test.mjs";

/** @typedef {import("./supervise.mjs").Life} Life */

const root = fileURLToPath(new URL("../..", import.meta.url));

/** @type {Record<string, (life: Life, root: string, args: readonly string[]) => Promise<void>>} */
const commands = {
  start,
  dev,
  test,
  serve,
  /** All that a first start makes ready, without the start. */
  async prepare(life) {
    await ensurePackages(life, root);
    await ensurePrograms(life, databaseNeeds);
    await ensureConsole(life, root);
    await life.end(0);
  },
  async packages(life) {
    await ensurePackages(life, root);
    await life.end(0);
  },
};

function checkNodeVersion() {
  const { engines } = JSON.parse(readFileSync(new URL("../../package.json", import.meta.url), "utf8"));
  const [, major, minor] = /^>=(\d+)\.(\d+) /.exec(engines.node) ?? [];
  const [runningMajor, runningMinor] = process.versions.node.split(".").map(Number);
  if (runningMajor !== Number(major) || Number(runningMinor) < Number(minor))
    throw new Refusal(`This needs Node ${major}, ${major}.${minor} or later; here runs ${process.version}.`);
}

const life = supervise();
try {
  process.chdir(root);
  checkNodeVersion();
  const [name = "", ...args] = process.argv.slice(2);
  const command = commands[name];
  if (command === undefined) throw new Refusal(`Say one of: ${Object.keys(commands).join(", ")}.`);
  await command(life, root, args);
} catch (error) {
  life.fail(error);
}
