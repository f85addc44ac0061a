import { connect, createServer } from "node:net";
import { realpathSync } from "node:fs";
import { nameFor } from "./private-files.mjs";
import { say } from "./say.mjs";

/** @typedef {{ pid: number, url: string | null }} Holder */
/** @typedef {"data" | "preparation"} Purpose */
/** @typedef {{ announce(url: string): void, release(): void }} Claim */

const ANSWER_MS = 1_000;
const WAIT_MS = 300;

/**
 * Claims a folder for this process. The claim is a listening socket in Linux's abstract namespace: the kernel gives it to one
 * process only and takes it back when that process is gone, however it went, so a claim is never stale. Who connects is told
 * who holds it.
 * @param {string} folder
 * @param {Purpose} purpose
 * @returns {Promise<Claim | null>} null when another process holds it
 */
export async function claimFolder(folder, purpose) {
  /** @type {Holder} */
  const holder = { pid: process.pid, url: null };
  const server = createServer((socket) => {
    socket.on("error", () => undefined);
    socket.end(JSON.stringify(holder));
  });
  const held = await new Promise((resolve, reject) => {
    server.once("error", (error) =>
      "code" in error && error.code === "EADDRINUSE" ? resolve(true) : reject(error),
    );
    server.listen(addressOf(folder, purpose), () => resolve(false));
  });
  if (held) return null;
  server.unref();
  return {
    announce(url) {
      holder.url = url;
    },
    release() {
      server.close();
    },
  };
}

/**
 * Who holds a folder; null when nobody does, or when the holder does not say.
 * @param {string} folder
 * @param {Purpose} purpose
 * @returns {Promise<Holder | null>}
 */
export function askHolder(folder, purpose) {
  return new Promise((resolve) => {
    let text = "";
    const socket = connect(addressOf(folder, purpose));
    socket.setTimeout(ANSWER_MS, () => socket.destroy());
    socket.setEncoding("utf8").on("data", (chunk) => (text += chunk));
    socket.on("error", () => undefined);
    socket.on("close", () => resolve(readHolder(text)));
  });
}

/** @param {string} folder @param {Purpose} purpose @returns {string} */
const addressOf = (folder, purpose) => `\0${nameFor(realpathSync(folder))}-${purpose}`;

/** @param {string} text @returns {Holder | null} */
function readHolder(text) {
  try {
    const { pid, url } = JSON.parse(text);
    return typeof pid === "number" ? { pid, url: typeof url === "string" ? url : null } : null;
  } catch {
    return null;
  }
}

/**
 * Waits until this process alone prepares the copy of the project in a folder.
 * @param {string} root
 * @returns {Promise<Claim>}
 */
export async function claimPreparation(root) {
  for (let told = false; ; told = true) {
    const claim = await claimFolder(root, "preparation");
    if (claim !== null) return claim;
    if (!told) say("Another process prepares this folder; waiting for it ...");
    await new Promise((resolve) => setTimeout(resolve, WAIT_MS));
  }
}
