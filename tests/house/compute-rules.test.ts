import ts from "typescript";
import { describe, expect, it } from "vitest";
import { engineVersion } from "../../server/compute/version.ts";
import { describeRule, sample, type ProjectFile } from "./describe-rule.ts";
import { hasModifier, nodesOf, parseCode, placeOf } from "./parse-code.ts";
import { engineFiles, readFile } from "./project-files.ts";

const inEngine = (text: string) => sample(text, "server/compute/bore/sample.ts");

interface ExportedFunction {
  readonly name: string;
  readonly place: string;
  readonly docblock: string;
  readonly node: ts.Node;
}

/** Exported functions, declared or held by a constant. An overload is documented where it begins. */
function exportedFunctions(file: ProjectFile): ExportedFunction[] {
  const docblocks = new Map<string, string>();
  return parseCode(file).statements.flatMap((statement) => {
    if (!hasModifier(statement, ts.SyntaxKind.ExportKeyword)) return [];
    return functionNames(statement).map((name) => {
      const own = ts
        .getJSDocCommentsAndTags(statement)
        .map((comment) => comment.getText())
        .join("\n");
      const docblock = own || (docblocks.get(name) ?? "");
      docblocks.set(name, docblock);
      return { name, place: placeOf(statement), docblock, node: statement };
    });
  });
}

function functionNames(statement: ts.Statement): string[] {
  if (ts.isFunctionDeclaration(statement)) return [statement.name?.text ?? ""];
  if (!ts.isVariableStatement(statement)) return [];
  return statement.declarationList.declarations
    .filter(
      ({ initializer }) =>
        initializer && (ts.isArrowFunction(initializer) || ts.isFunctionExpression(initializer)),
    )
    .map(({ name }) => name.getText());
}

describeRule("a docblock on every exported function of the engine", {
  files: engineFiles,
  breaches: (file) =>
    exportedFunctions(file)
      .filter(({ docblock }) => docblock === "")
      .map(({ place, name }) => `${place} ${name}`),
  caught: [
    inEngine("export function fit() {}"),
    inEngine("// A remark.\nexport const fit = () => 1;"),
    inEngine("/** One. */\nexport function a() {}\nexport function b() {}"),
  ],
  spared: [
    inEngine("/** Fits. */\nexport function fit() {}"),
    inEngine("/** Fits. */\nexport function fit(a: A): A;\nexport function fit(a: B): B {}"),
    inEngine("function inner() {}\nexport interface A {}"),
  ],
});

/** The codes that a function throws itself: `throw new ComputeError("code", …)`. */
function codesThrown(node: ts.Node): string[] {
  return nodesOf(node)
    .filter(ts.isThrowStatement)
    .flatMap(({ expression }) => (ts.isNewExpression(expression) ? [expression] : []))
    .filter(({ expression }) => expression.getText() === "ComputeError")
    .flatMap(({ arguments: [code] = [] }) => (code && ts.isStringLiteral(code) ? [code.text] : []));
}

describeRule("every code that an exported function of the engine throws itself after its @throws", {
  files: engineFiles,
  breaches: (file) =>
    exportedFunctions(file).flatMap(({ name, place, docblock, node }) => {
      const told = docblock.split("@throws").slice(1).join(" ");
      const untold = codesThrown(node).filter((code) => !new RegExp(`\\b${code}\\b`).test(told));
      return untold.map((code) => `${place} ${name}: ${code}`);
    }),
  caught: [
    inEngine('/** Fits. */\nexport function fit() { throw new ComputeError("arc_too_flat", ""); }'),
    inEngine(
      '/** arc_too_flat. @throws ComputeError not_converged */\nexport function fit() { throw new ComputeError("arc_too_flat", ""); }',
    ),
  ],
  spared: [
    inEngine(
      '/** Fits. @throws ComputeError arc_too_flat */\nexport function fit() { throw new ComputeError("arc_too_flat", ""); }',
    ),
  ],
});

/** Words for what is measured: alone, such a number could be in anything. */
const measured =
  /(^|[a-z])(radius|diameter|thickness|length|distance|angle|clock|travel|sag|misfit|increment|height|width|gap|uncertainty)$/i;
/** Entries of (JᵀWJ)⁻¹ by the parameters they belong to: their unit is that of the weights, or none. */
const unitless = ["Cofactors"];
const isNumeric = (type: ts.TypeNode | undefined) =>
  /^number( \| (null|undefined))?$/.test(type?.getText() ?? "");

/** Numbers that an exported function takes or an exported interface holds, named after what they measure without a unit. */
function withoutUnit(file: ProjectFile): string[] {
  return parseCode(file)
    .statements.filter((statement) => hasModifier(statement, ts.SyntaxKind.ExportKeyword))
    .filter((statement) => !(ts.isInterfaceDeclaration(statement) && unitless.includes(statement.name.text)))
    .flatMap(nodesOf)
    .filter((node) => ts.isParameter(node) || ts.isPropertySignature(node))
    .filter(({ name, type }) => isNumeric(type) && measured.test(name.getText()))
    .map((node) => `${placeOf(node)} ${node.name.getText()}`);
}

describeRule("units in the names of what the engine takes and gives", {
  files: engineFiles,
  breaches: withoutUnit,
  caught: [
    inEngine("export interface Fit { readonly radius: number }"),
    inEngine("export interface Fit { readonly gaugeSag: number | null }"),
    inEngine("export const f = (halfAngle: number) => 1;"),
  ],
  spared: [
    inEngine("export interface Fit { readonly radiusMm: number; readonly halfAngleDeg: number }"),
    inEngine(
      "export interface Fit { readonly tangent: number; readonly expandedUncertainty: ExpandedUncertainty }",
    ),
  ],
});

/** Linear algebra, and linear and mixed-integer programs. */
const numericLibraries = ["ml-matrix", "highs"];

describeRule("an engine that imports itself and numeric libraries only", {
  files: engineFiles,
  breaches: (file) =>
    parseCode(file).statements.flatMap((statement) => {
      if (!ts.isImportDeclaration(statement) && !ts.isExportDeclaration(statement)) return [];
      const from = statement.moduleSpecifier;
      if (!from || !ts.isStringLiteral(from)) return [];
      const target = new URL(from.text, `file:///${file.path}`).pathname;
      const inside = from.text.startsWith(".") && target.startsWith("/server/compute/");
      return inside || numericLibraries.includes(from.text) ? [] : [`${placeOf(statement)} ${from.text}`];
    }),
  caught: [
    inEngine('import { z } from "zod";'),
    inEngine('import { limits } from "../../../shared/limits.ts";'),
    inEngine('export { readFileSync } from "node:fs";'),
  ],
  spared: [
    inEngine('import { SVD } from "ml-matrix";'),
    inEngine('import loadHighs from "highs";'),
    inEngine('import { ComputeError } from "../compute-error.ts";'),
  ],
});

/** What makes the same input give another answer, or leaves a trace. */
const impure = ["Date", "process", "performance", "console", "fetch", "setTimeout", "crypto", "globalThis"];

describeRule("an engine without clock, chance or platform", {
  files: engineFiles,
  breaches: (file) =>
    nodesOf(parseCode(file))
      .filter(
        (node) =>
          (ts.isPropertyAccessExpression(node) && node.getText() === "Math.random") ||
          (ts.isIdentifier(node) &&
            impure.includes(node.text) &&
            !(ts.isPropertyAccessExpression(node.parent) && node.parent.name === node)),
      )
      .map((node) => `${placeOf(node)} ${node.getText()}`),
  caught: [
    inEngine("const at = Date.now();"),
    inEngine("const u = Math.random();"),
    inEngine("console.log(1);"),
    inEngine('const dir = process.env["HOME"];'),
  ],
  spared: [inEngine('const a = "Date"; // process'), inEngine("const b = Math.hypot(1, 2);")],
});

describe("the engine's version", () => {
  const newest = (changelog: string) => /^## (\S+)/m.exec(changelog)?.[1];

  it("is told at the top of its changelog", () => {
    expect(newest("# Changes\n\n## 1.1.0\n\n## 1.0.0\n")).toBe("1.1.0");
    expect(newest(readFile("server/compute/CHANGELOG.md"))).toBe(engineVersion);
  });
});
