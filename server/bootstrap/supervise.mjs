import { constants } from "node:os";
import { Refusal, say } from "./say.mjs";

/** @typedef {ReturnType<typeof supervise>} Life */

// Read at once: should npm be killed while the rest still loads, it would be another process's number.
const parentAtStart = process.ppid;
const startedByNpm = process.env["npm_lifecycle_event"] !== undefined;

const PARENT_CHECK_MS = 1_000;
/** npm passes a terminal's Ctrl-C on, so that one key press arrives twice; a second one meant as such comes later. */
const SAME_PRESS_MS = 1_000;
/** Longer than any drain: what is still open then is stuck. */
const LAST_RESORT_MS = 330_000;

/**
 * The life of this process: everything opened registers how it is closed, and whatever ends the process (a signal, a closed
 * terminal, a killed npm, a crash) closes it all, last opened first.
 */
export function supervise() {
  /** @type {Set<() => unknown>} */
  const closers = new Set();
  let serving = false;
  let endedAt = 0;

  /** @param {number} code */
  async function end(code) {
    if (endedAt > 0) return;
    endedAt = Date.now();
    setTimeout(() => process.exit(1), LAST_RESORT_MS).unref();
    for (const close of [...closers].reverse()) {
      try {
        await close();
      } catch (error) {
        tell(error);
        code ||= 1;
      }
    }
    process.exit(code);
  }

  /** @param {"SIGINT" | "SIGTERM" | "SIGHUP"} signal */
  function onSignal(signal) {
    if (endedAt > 0 && Date.now() - endedAt > SAME_PRESS_MS) process.exit(1);
    if (endedAt === 0 && serving) say(`Stopping (${signal})`);
    void end(serving ? 0 : 128 + constants.signals[signal]);
  }

  /** @param {unknown} error */
  function fail(error) {
    if (endedAt > 0) return;
    tell(error);
    void end(exitCodeOf(error));
  }

  process.on("SIGINT", onSignal);
  process.on("SIGTERM", onSignal);
  process.on("SIGHUP", onSignal);
  process.on("uncaughtException", fail);
  process.on("unhandledRejection", fail);
  // A closed terminal makes every write fail; the way out must not trip over that.
  for (const stream of [process.stdout, process.stderr]) stream.on("error", () => undefined);
  if (startedByNpm)
    setInterval(() => {
      if (process.ppid !== parentAtStart) onSignal("SIGHUP");
    }, PARENT_CHECK_MS).unref();

  return {
    /**
     * Registers how something is closed; returns how to forget it.
     * @param {() => unknown} close
     */
    onEnd(close) {
      closers.add(close);
      return () => closers.delete(close);
    },
    /** From here on a signal is the ordinary way to stop, not an interruption. */
    nowServing() {
      serving = true;
    },
    end,
    fail,
    get ending() {
      return endedAt > 0;
    },
  };
}

/** @param {unknown} error @returns {number} */
const exitCodeOf = (error) =>
  error instanceof Error && "exitCode" in error && typeof error.exitCode === "number" ? error.exitCode : 1;

/** @param {unknown} error */
function tell(error) {
  const plain = error instanceof Refusal || (error instanceof Error && "exitCode" in error);
  const text =
    error instanceof Error ? (plain ? error.message : (error.stack ?? error.message)) : String(error);
  process.stderr.write(`\n${text}\n`);
}
