import ts from "typescript";
import type { ProjectFile } from "./describe-rule.ts";

const parsed = new Map<string, ts.SourceFile>();

/** What a file's code is, as TypeScript reads it: text in strings and comments cannot pass for code. */
export function parseCode({ path, text }: ProjectFile): ts.SourceFile {
  const known = parsed.get(path);
  if (known?.text === text) return known;
  const source = ts.createSourceFile(path, text, ts.ScriptTarget.ES2023, true);
  parsed.set(path, source);
  return source;
}

/** A node and all below it. */
export function nodesOf(node: ts.Node): ts.Node[] {
  const nodes: ts.Node[] = [];
  const gather = (one: ts.Node): void => {
    nodes.push(one);
    ts.forEachChild(one, gather);
  };
  gather(node);
  return nodes;
}

/** `path:line` of a node, to be found at once. */
export function placeOf(node: ts.Node): string {
  const file = node.getSourceFile();
  return `${file.fileName}:${file.getLineAndCharacterOfPosition(node.getStart()).line + 1}`;
}

/** The places of one file where `holds` does. */
export const placesWhere =
  (holds: (node: ts.Node) => boolean) =>
  (file: ProjectFile): string[] =>
    nodesOf(parseCode(file)).filter(holds).map(placeOf);

export function hasModifier(node: ts.Node, kind: ts.SyntaxKind): boolean {
  return (
    ts.canHaveModifiers(node) && (ts.getModifiers(node) ?? []).some((modifier) => modifier.kind === kind)
  );
}
