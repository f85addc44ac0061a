import {
  accessSync,
  chmodSync,
  closeSync,
  constants,
  fsyncSync,
  lstatSync,
  mkdirSync,
  openSync,
  readFileSync,
  renameSync,
  writeSync,
} from "node:fs";
import { createHash } from "node:crypto";
import { tmpdir } from "node:os";
import { dirname, join, resolve } from "node:path";
import { Refusal } from "./say.mjs";

/** @param {string} folder @returns {string} its absolute path */
export function makePrivateFolder(folder) {
  mkdirSync(folder, { recursive: true, mode: 0o700 });
  return resolve(folder);
}

/** @param {string} folder @returns {boolean} */
export function isWritable(folder) {
  try {
    accessSync(folder, constants.R_OK | constants.W_OK | constants.X_OK);
    return true;
  } catch {
    return false;
  }
}

/**
 * Writes a file that only its owner can read, whole or not at all.
 * @param {string} path
 * @param {string} text
 */
export function writePrivateFile(path, text) {
  makePrivateFolder(dirname(path));
  const unfinished = `${path}.new`;
  const file = openSync(unfinished, "w", 0o600);
  try {
    writeSync(file, text);
    fsyncSync(file);
  } finally {
    closeSync(file);
  }
  chmodSync(unfinished, 0o600);
  renameSync(unfinished, path);
}

/**
 * Reads a private file, closing it to others should a copy have opened it; null when it is not there.
 * @param {string} path
 * @returns {string | null}
 */
export function readPrivateFile(path) {
  try {
    const text = readFileSync(path, "utf8").trim();
    chmodSync(path, 0o600);
    return text === "" ? null : text;
  } catch (error) {
    if (error instanceof Error && "code" in error && error.code === "ENOENT") return null;
    throw error;
  }
}

/**
 * The text kept in a private file, made when there is none.
 * @param {string} path
 * @param {() => string} make
 * @returns {string}
 */
export function keepPrivateText(path, make) {
  const kept = readPrivateFile(path);
  if (kept !== null) return kept;
  const made = make();
  writePrivateFile(path, `${made}\n`);
  return made;
}

/**
 * A name of this user's own for a folder of this machine, short whatever the folder's depth.
 * @param {string} folder
 * @returns {string}
 */
export function nameFor(folder) {
  const digest = createHash("sha256").update(resolve(folder)).digest("hex").slice(0, 16);
  return `borewright-${process.getuid?.() ?? 0}-${digest}`;
}

/**
 * A short-lived folder for sockets, whose paths may hold 107 bytes only. Anyone can write to the folder for temporary files,
 * so what stands there under our name is used only when it is ours and closed to others.
 * @param {string} folder the data folder it belongs to
 * @returns {string}
 */
export function makeSocketFolder(folder) {
  const path = join(tmpdir(), nameFor(folder));
  mkdirSync(path, { recursive: true, mode: 0o700 });
  const found = lstatSync(path);
  const ours = found.isDirectory() && found.uid === process.getuid?.() && (found.mode & 0o077) === 0;
  if (!ours)
    throw new Refusal(
      `${path} belongs to someone else or is open to others. Remove it, or set TMPDIR to a folder of your own.`,
    );
  return path;
}
