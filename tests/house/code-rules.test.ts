import ts from "typescript";
import { describe, expect, it } from "vitest";
import { describeRule, sample, type ProjectFile } from "./describe-rule.ts";
import { hasModifier, nodesOf, parseCode, placesWhere } from "./parse-code.ts";
import { codeFiles, engineFiles, projectFiles } from "./project-files.ts";

/** Written apart, so that this file does not break the rules that it states. */
const joined = (...parts: string[]) => parts.join("");

/** The lines of a text that match, by number. */
const linesMatching =
  (pattern: RegExp) =>
  ({ path, text }: ProjectFile): string[] =>
    text.split("\n").flatMap((line, index) => (pattern.test(line) ? [`${path}:${index + 1}`] : []));

describe("the rules for code", () => {
  it("read the whole of it", () => {
    expect(codeFiles).toContain("server/app.ts");
    expect(codeFiles).toContain("console/src/lib/query-client.ts");
    expect(codeFiles).toContain("server/bootstrap/run.mjs");
    expect(engineFiles.length).toBeGreaterThan(50);
  });
});

/** Tools that read their configuration from a default export; a package's own types are as the package is. */
const mayExportDefault = (path: string) => /^\.config\/|(^|\/)(vite|vitest)\.config\.ts$|\.d\.ts$/.test(path);

describeRule("exports by name", {
  files: codeFiles.filter((path) => !mayExportDefault(path)),
  breaches: placesWhere(
    (node) => ts.isExportAssignment(node) || hasModifier(node, ts.SyntaxKind.DefaultKeyword),
  ),
  caught: [sample("export default function fit() {}"), sample("const a = 1;\nexport default a;")],
  spared: [sample('export const text = "export default";'), sample("switch (a) { default: }")],
});

describeRule("no `any`", {
  files: codeFiles,
  breaches: placesWhere((node) => node.kind === ts.SyntaxKind.AnyKeyword),
  caught: [sample("const a: any = 1;"), sample("f(b as any);"), sample("type A = Record<string, any>;")],
  spared: [sample('const any = "any";'), sample("// any")],
});

describeRule("nothing that silences the compiler, the linter or the formatter", {
  files: codeFiles,
  breaches: linesMatching(
    /@ts-(?:ignore|nocheck|expect-error)|eslint[-]disable|prettier[-]ignore|v8[ ]ignore/,
  ),
  caught: [
    sample(joined("// @ts", "-ignore")),
    sample(joined("// @ts", "-expect-error: later")),
    sample(joined("/* eslint", "-disable no-console */")),
    sample(joined("// prettier", "-ignore")),
  ],
});

describeRule("nothing left to do later", {
  files: projectFiles.filter((path) => path !== "package-lock.json"),
  breaches: linesMatching(/\b(?:TO[D]O|FIX[M]E|X[X]X|HAC[K])\b/),
  caught: [sample(joined("// TO", "DO: the rest")), sample(joined("# FIX", "ME"), "examples/curl/a.sh")],
  spared: [sample("const todos = [];")],
});

describeRule("own files imported with their extension", {
  files: codeFiles,
  breaches: placesWhere(
    (node) =>
      (ts.isImportDeclaration(node) || ts.isExportDeclaration(node)) &&
      node.moduleSpecifier !== undefined &&
      ts.isStringLiteral(node.moduleSpecifier) &&
      /^\.{1,2}\//.test(node.moduleSpecifier.text) &&
      !/\.(ts|tsx|mjs|js|css|json|svg)$/.test(node.moduleSpecifier.text),
  ),
  caught: [sample('import { a } from "./a";'), sample('export { b } from "../b";')],
  spared: [sample('import { a } from "./a.ts";'), sample('import z from "zod";')],
});

const mostLines = 300;
describeRule(`at most ${mostLines} lines a file`, {
  files: projectFiles.filter((path) => /\.(ts|tsx|mjs|js|css|sh|py|md)$/.test(path)),
  breaches: ({ path, text }) => {
    const lines = text.split("\n").length - (text.endsWith("\n") ? 1 : 0);
    return lines > mostLines ? [`${path}: ${lines}`] : [];
  },
  caught: [sample("a;\n".repeat(mostLines + 1)), sample(`${"a;\n".repeat(mostLines)}b;`)],
  spared: [sample("a;\n".repeat(mostLines))],
});

const tests = codeFiles.filter((path) => /\.test\.tsx?$/.test(path));

/** The name at the root of `describe.each(a)`, `it.skip` and the like. */
function nameAtRoot(node: ts.Expression): string {
  if (ts.isIdentifier(node)) return node.text;
  if (ts.isPropertyAccessExpression(node) || ts.isCallExpression(node)) return nameAtRoot(node.expression);
  return "";
}

const usesOfTest = (...words: string[]) =>
  placesWhere(
    (node) =>
      ts.isPropertyAccessExpression(node) &&
      words.includes(node.name.text) &&
      /^(it|test|describe|suite)$/.test(nameAtRoot(node.expression)),
  );

describeRule("no test singled out", {
  files: codeFiles,
  breaches: usesOfTest("only"),
  caught: [sample('it.only("a", () => {});'), sample('describe.only.each([1])("b", () => {});')],
  spared: [sample("const a = options.only;")],
});

describeRule("no test skipped", {
  // Says that the reference folder is absent, and fails instead where CI is set.
  files: codeFiles.filter((path) => path !== "tests/reference/read-cases.ts"),
  breaches: usesOfTest("skip", "skipIf", "runIf", "todo", "fails"),
  caught: [
    sample('it.skip("a", () => {});'),
    sample('describe.skipIf(slow)("b", () => {});'),
    sample('it.todo("c");'),
  ],
  spared: [sample("response.skip();")],
});

/** What fails a test: an expectation, a property, or one of the two that hold expectations for many files. */
const judges = ["expect", "fc.assert", "describeCases", "describeRule"];

/** The names called below a node: `expect`, `fc.assert`, `check`. */
const namesCalled = (node: ts.Node): string[] =>
  nodesOf(node)
    .filter(ts.isCallExpression)
    .map(({ expression }) => expression.getText().split(/[(<]/)[0] ?? "");

/** Tests whose body, and what of the same file it calls, holds nothing that could fail. */
function idleTests(file: ProjectFile): string[] {
  const nodes = nodesOf(parseCode(file));
  const judging = new Set(judges);
  const judgesAmong = (names: readonly string[]) =>
    names.some((name) => judging.has(name) || judging.has(name.split(".")[0] ?? ""));
  const declared = nodes
    .filter((node) => ts.isFunctionDeclaration(node) || ts.isVariableDeclaration(node))
    .map((node) => ({ name: node.name?.getText() ?? "", calls: namesCalled(node) }));
  // A function of the file that judges, judges wherever it is called, also through two others.
  for (let depth = 0; depth < 3; depth++)
    for (const { name, calls } of declared) if (judgesAmong(calls)) judging.add(name);
  return nodes
    .filter(ts.isCallExpression)
    .filter(
      ({ expression, arguments: { length } }) => length > 1 && /^(it|test)$/.test(nameAtRoot(expression)),
    )
    .filter(
      ({ arguments: [, ...rest] }) =>
        !rest.some((one) => judging.has(one.getText()) || judgesAmong(namesCalled(one))),
    )
    .map((call) => `${file.path}: ${call.arguments[0]?.getText() ?? ""}`);
}

describeRule("tests that can fail", {
  files: tests,
  breaches: idleTests,
  caught: [
    sample('it("answers", async () => { await call(); });', "tests/a.test.ts"),
    sample('it.each([1])("n %i", (n) => { fit(n); });', "tests/a.test.ts"),
  ],
  spared: [
    sample('it("answers", () => { expect(fit()).toBe(1); });', "tests/a.test.ts"),
    sample(
      'const check = (n: number) => expect(n).toBe(1);\nit("answers", () => check(1));\nit("too", check);',
      "tests/a.test.ts",
    ),
    sample('it("shifts", () => { fc.assert(property); });', "tests/a.test.ts"),
  ],
});
