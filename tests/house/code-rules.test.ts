import ts from "typescript";
import { describe, expect, it } from "vitest";
import { codeFiles, hasModifier, nodesOf, parseCode, placeOf, readFile } from "./project-files.ts";

const parsed = codeFiles.map((path) => ({ path, nodes: nodesOf(parseCode(path)) }));
const placesWhere = (holds: (node: ts.Node) => boolean, files = parsed): string[] =>
  files.flatMap(({ nodes }) => nodes.filter(holds).map(placeOf));

/** Tools that read their configuration from a default export. */
const isToolConfiguration = (path: string) => /^\.config\/|(^|\/)(vite|vitest)\.config\.ts$/.test(path);

/** Says that the reference folder is absent, and fails instead where CI is set. */
const maySkip = ["tests/reference/read-cases.ts"];

describe("all code", () => {
  it("is read by these rules", () => {
    expect(codeFiles).toContain("server/app.ts");
    expect(codeFiles.filter((path) => path.startsWith("server/compute/")).length).toBeGreaterThan(50);
  });

  it("exports by name, except for the configuration of tools that ask for a default", () => {
    const isDefault = (node: ts.Node) =>
      ts.isExportAssignment(node) || hasModifier(node, ts.SyntaxKind.DefaultKeyword);
    expect(
      placesWhere(
        isDefault,
        parsed.filter(({ path }) => !isToolConfiguration(path)),
      ),
    ).toEqual([]);
  });

  it("has no `any`", () => {
    expect(placesWhere((node) => node.kind === ts.SyntaxKind.AnyKeyword)).toEqual([]);
  });

  it("silences neither the compiler nor the linter", () => {
    const silencer = /@ts-(?:ignore|nocheck|expect-error)|eslint[-]disable|prettier[-]ignore|v8[ ]ignore/;
    expect(codeFiles.filter((path) => silencer.test(readFile(path)))).toEqual([]);
  });

  it("imports its own files with their extension", () => {
    const bare = (node: ts.Node) =>
      ts.isImportDeclaration(node) &&
      ts.isStringLiteral(node.moduleSpecifier) &&
      /^\.{1,2}\//.test(node.moduleSpecifier.text) &&
      !/\.(ts|tsx|mjs|js|css|json|svg)$/.test(node.moduleSpecifier.text);
    expect(placesWhere(bare)).toEqual([]);
  });
});

describe("all tests", () => {
  const isTestWord = (name: string) => /^(it|test|describe|suite)$/.test(name);
  const nameAtRoot = (node: ts.Expression): string => {
    if (ts.isIdentifier(node)) return node.text;
    if (ts.isPropertyAccessExpression(node) || ts.isCallExpression(node)) return nameAtRoot(node.expression);
    return "";
  };
  const uses = (...words: string[]) =>
    placesWhere(
      (node) =>
        ts.isPropertyAccessExpression(node) &&
        words.includes(node.name.text) &&
        isTestWord(nameAtRoot(node.expression)),
    );

  it("run all: none is singled out", () => {
    expect(uses("only")).toEqual([]);
  });

  it("run all: none is skipped, but for want of the reference folder", () => {
    const skipped = uses("skip", "skipIf", "runIf", "todo", "fails");
    expect(skipped.filter((place) => !maySkip.some((path) => place.startsWith(`${path}:`)))).toEqual([]);
  });

  it("are held by at least one expectation in each file", () => {
    const tests = codeFiles.filter((path) => /\.test\.tsx?$/.test(path));
    expect(tests.length).toBeGreaterThan(20);
    const idle = tests.filter((path) => !/\bexpect\b|\bdescribeCases\b|\bfc\.assert\b/.test(readFile(path)));
    expect(idle).toEqual([]);
  });
});
