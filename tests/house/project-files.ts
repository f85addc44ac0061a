import { readdirSync, readFileSync } from "node:fs";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import ts from "typescript";

export const root = fileURLToPath(new URL("../..", import.meta.url));

/** A line of .gitignore, as far as ours go: `name/` anywhere, `a/b/` from the root, `name`, `*.ending`. */
type Ignores = (path: string, isFolder: boolean) => boolean;

/** @throws when .gitignore holds a line of another form: better no answer than a wrong one */
function readIgnores(): Ignores {
  const lines = readFileSync(join(root, ".gitignore"), "utf8")
    .split("\n")
    .filter((line) => line.trim() !== "" && !line.startsWith("#"));
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
  return readdirSync(join(root, folder), { withFileTypes: true })
    .sort((a, b) => a.name.localeCompare(b.name))
    .flatMap((entry) => {
      const path = folder === "" ? entry.name : `${folder}/${entry.name}`;
      if (ignores(path, entry.isDirectory())) return [];
      return entry.isDirectory() ? walk(path, ignores) : [path];
    });
}

/** Every file of the project by its path from the root, without what .gitignore names: it needs no git. */
export const projectFiles: readonly string[] = walk("", readIgnores());

export const readFile = (path: string): string => readFileSync(join(root, path), "utf8");

const isCode = (path: string) => /\.(ts|tsx|mjs|js)$/.test(path);

/** Every file of code. */
export const codeFiles = projectFiles.filter(isCode);

/** What a file's code is, as TypeScript reads it: text in strings and comments cannot pass for code. */
export function parseCode(path: string): ts.SourceFile {
  return ts.createSourceFile(path, readFile(path), ts.ScriptTarget.ES2023, true);
}

/** A node and all below it. */
export function nodesOf(node: ts.Node): ts.Node[] {
  const nodes: ts.Node[] = [node];
  ts.forEachChild(node, (child) => {
    nodes.push(...nodesOf(child));
  });
  return nodes;
}

/** `path:line` of a node, to be found at once. */
export function placeOf(node: ts.Node): string {
  const file = node.getSourceFile();
  return `${file.fileName}:${file.getLineAndCharacterOfPosition(node.getStart()).line + 1}`;
}

export function hasModifier(node: ts.Node, kind: ts.SyntaxKind): boolean {
  return ts.canHaveModifiers(node) && (ts.getModifiers(node) ?? []).some((modifier) => modifier.kind === kind);
}
