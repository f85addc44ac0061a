import { accessSync, constants } from "node:fs";
import { delimiter, join } from "node:path";

/** An ordinary user's PATH lacks the folders where Debian keeps servers. */
const SERVER_FOLDERS = ["/usr/local/sbin", "/usr/sbin", "/sbin"];

/** @returns {string[]} */
const programFolders = () => [
  ...(process.env["PATH"] ?? "").split(delimiter).filter(Boolean),
  ...SERVER_FOLDERS,
];

/**
 * The path of a program that can be run, or null.
 * @param {string} name
 * @param {readonly string[]} [folders]
 * @returns {string | null}
 */
export function findProgram(name, folders = programFolders()) {
  for (const folder of folders) {
    const path = join(folder, name);
    try {
      accessSync(path, constants.X_OK);
      return path;
    } catch {
      // Not in this folder.
    }
  }
  return null;
}
