import { spawn } from "node:child_process";
import { findProgram } from "./find-program.mjs";
import { Refusal } from "./say.mjs";

/** @typedef {import("node:child_process").ChildProcess} ChildProcess */
/** @typedef {{ code: number | null, signal: NodeJS.Signals | null, output: string }} Ended */

const OUTPUT_KEPT = 20_000;

/**
 * Starts a program that cannot outlive this process: the kernel sends it `deathSignal` when we are gone, `kill -9` included.
 * It has a session of its own, so that Ctrl-C reaches us first and we end things in order.
 * @param {string} command
 * @param {readonly string[]} args
 * @param {import("node:child_process").SpawnOptions & { deathSignal?: "TERM" | "INT" | "KILL" }} [options]
 * @returns {ChildProcess}
 */
export function spawnTied(command, args, { deathSignal = "TERM", ...options } = {}) {
  const setpriv = findProgram("setpriv");
  const tie = setpriv === null ? [] : [setpriv, "--pdeathsig", deathSignal];
  const [program = command, ...rest] = [...tie, command, ...args];
  return spawn(program, rest, { stdio: ["ignore", "pipe", "pipe"], detached: true, ...options });
}

/**
 * Waits for a program's end, keeping the last of what it printed.
 * @param {ChildProcess} child
 * @returns {Promise<Ended>}
 */
export function awaitEnd(child) {
  let output = "";
  for (const stream of [child.stdout, child.stderr])
    stream?.setEncoding("utf8").on("data", (chunk) => {
      output = (output + chunk).slice(-OUTPUT_KEPT);
    });
  return new Promise((resolve, reject) => {
    child.once("error", reject);
    child.once("close", (code, signal) => resolve({ code, signal, output: output.trim() }));
  });
}

/**
 * How a program is ended: `alone` leaves its children to it, as apt's dpkg must not be cut short.
 * @typedef {{ signal?: NodeJS.Signals, patienceMs?: number, alone?: boolean }} Ending
 */

/**
 * Asks a program and its own children to end, waits, and insists when patience is over.
 * @param {ChildProcess} child
 * @param {Ending} [ending]
 * @returns {Promise<void>}
 */
export async function endTied(child, { signal = "SIGTERM", patienceMs = 10_000, alone = false } = {}) {
  if (child.pid === undefined || child.exitCode !== null || child.signalCode !== null) return;
  const target = alone ? child.pid : -child.pid;
  const gone = new Promise((resolve) => child.once("exit", resolve));
  sendSignal(target, signal);
  const insist = setTimeout(() => sendSignal(target, "SIGKILL"), patienceMs);
  await gone;
  clearTimeout(insist);
}

/** @param {number} target @param {NodeJS.Signals} signal */
function sendSignal(target, signal) {
  try {
    process.kill(target, signal);
  } catch {
    // It ended by itself meanwhile, which is what was asked for.
  }
}

/**
 * Runs a program to its end. When this process is to end first the program is ended, and nothing that was to follow it happens.
 * @param {import("./supervise.mjs").Life} life
 * @param {string} command
 * @param {readonly string[]} args
 * @param {import("node:child_process").SpawnOptions & { deathSignal?: "TERM" | "INT" }} [options]
 * @param {Ending} [ending]
 * @returns {Promise<Ended>}
 */
export async function runTied(life, command, args, options, ending) {
  const child = spawnTied(command, args, options);
  const ended = awaitEnd(child);
  const forget = life.onEnd(() => endTied(child, ending));
  try {
    const result = await ended;
    return life.ending ? await new Promise(() => undefined) : result;
  } finally {
    forget();
  }
}

/**
 * Stops with the program's last words and a sentence when it failed.
 * @param {Ended} ended
 * @param {string} sentence
 */
export function requireSuccess({ code, output }, sentence) {
  if (code !== 0) throw new Refusal(`${output}\n\n${sentence}`);
}
