import { spawnSync } from "node:child_process";
import { existsSync, readdirSync, readFileSync } from "node:fs";
import { join } from "node:path";
import { fileURLToPath } from "node:url";

export const root = fileURLToPath(new URL("../..", import.meta.url));

/** Whether .gitignore keeps a path out. */
export type Ignores = (path: string, isFolder: boolean) => boolean;

/**
 * Reads the lines of a .gitignore, as far as ours go: `name/` anywhere, `a/b/` from the root, `name`, `*.ending`.
 * @throws when a line has another form: better no answer than a wrong one
 */
export function readIgnores(text: string): Ignores {
  const lines = text.split("\n").filter((line) => line.trim() !== "" && !line.startsWith("#"));
  const rules = lines.map((line): Ignores => {
    const [, name = "", slash = ""] = /^\/?((?:\*\.)?[\w.-]+(?:\/[\w.-]+)*)(\/?)$/.exec(line) ?? [];
    if (name === "") throw new Error(`.gitignore: cannot read "${line}".`);
    const matches = (path: string) => {
      if (name.startsWith("*")) return path.endsWith(name.slice(1));
      return name.includes("/") || line.startsWith("/") ? path === name : path.split("/").at(-1) === name;
    };
    return (path, isFolder) => (slash === "" || isFolder) && matches(path);
  });
  return (path, isFolder) => path === ".git" || rules.some((rule) => rule(path, isFolder));
}

function walk(folder: string, ignores: Ignores): string[] {
  return readdirSync(join(root, folder), { withFileTypes: true }).flatMap((entry) => {
    const path = folder === "" ? entry.name : `${folder}/${entry.name}`;
    if (ignores(path, entry.isDirectory())) return [];
    return entry.isDirectory() ? walk(path, ignores) : [path];
  });
}

export const readFile = (path: string): string => readFileSync(join(root, path), "utf8");

/** Every file of the project by its path from the root, committed or not, without what .gitignore names: it needs no git. */
export const projectFiles: readonly string[] = walk("", readIgnores(readFile(".gitignore"))).sort();

/** The same list as git has it; null in a copy without git. */
export function filesByGit(): string[] | null {
  const arguments_ = ["ls-files", "-z", "--cached", "--others", "--exclude-standard"];
  const { status, stdout } = spawnSync("git", arguments_, { cwd: root, encoding: "utf8" });
  if (status !== 0) return null;
  const paths = new Set(stdout.split("\0").filter((path) => path !== "" && existsSync(join(root, path))));
  return [...paths].sort();
}

const isCode = (path: string) => /\.(ts|tsx|mjs|js)$/.test(path);

/** Every file of code. */
export const codeFiles = projectFiles.filter(isCode);

/** What the engine computes with: its code without tests and without types for a package that has none. */
export const engineFiles = codeFiles.filter(
  (path) => path.startsWith("server/compute/") && !/\.(test|d)\.ts$/.test(path),
);
