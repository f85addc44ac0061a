import ts from "typescript";
import { describe, expect, it } from "vitest";
import { codeFiles, hasModifier, parseCode, placeOf, projectFiles, readFile } from "./project-files.ts";
import { engineVersion } from "../../server/compute/version.ts";

const engine = codeFiles.filter(
  (path) => path.startsWith("server/compute/") && path.endsWith(".ts") && !/\.(test|d)\.ts$/.test(path),
);

interface ExportedFunction {
  readonly name: string;
  readonly place: string;
  readonly docblock: string;
}

/** Exported functions, declared or held by a constant. An overload is documented where it begins. */
function exportedFunctions(path: string): ExportedFunction[] {
  const seen = new Set<string>();
  return parseCode(path).statements.flatMap((statement) => {
    if (!hasModifier(statement, ts.SyntaxKind.ExportKeyword)) return [];
    const names = functionNames(statement).filter((name) => !seen.has(name));
    names.forEach((name) => seen.add(name));
    const docblock = ts
      .getJSDocCommentsAndTags(statement)
      .map((comment) => comment.getText())
      .join("\n");
    return names.map((name) => ({ name, place: placeOf(statement), docblock }));
  });
}

function functionNames(statement: ts.Statement): string[] {
  if (ts.isFunctionDeclaration(statement)) return [statement.name?.text ?? ""];
  if (!ts.isVariableStatement(statement)) return [];
  return statement.declarationList.declarations
    .filter(({ initializer }) => initializer && (ts.isArrowFunction(initializer) || ts.isFunctionExpression(initializer)))
    .map(({ name }) => name.getText());
}

describe("the engine", () => {
  it("has a docblock on every exported function", () => {
    const functions = engine.flatMap(exportedFunctions);
    expect(functions.length).toBeGreaterThan(50);
    const bare = functions.filter(({ docblock }) => docblock === "");
    expect(bare.map(({ name, place }) => `${place} ${name}`)).toEqual([]);
  });

  it("imports itself and numeric libraries only", () => {
    const allowed = ["ml-matrix", "jstat"];
    const foreign = engine.flatMap((path) =>
      parseCode(path).statements.flatMap((statement) => {
        if (!ts.isImportDeclaration(statement) || !ts.isStringLiteral(statement.moduleSpecifier)) return [];
        const from = statement.moduleSpecifier.text;
        const target = new URL(from, `file:///${path}`).pathname;
        const inside = from.startsWith(".") && target.startsWith("/server/compute/");
        return inside || allowed.includes(from) ? [] : [`${placeOf(statement)} ${from}`];
      }),
    );
    expect(foreign).toEqual([]);
  });

  it("has its version told at the top of its changelog", () => {
    const changelog = "server/compute/CHANGELOG.md";
    expect(projectFiles).toContain(changelog);
    expect(/^## (\S+)/m.exec(readFile(changelog))?.[1]).toBe(engineVersion);
  });
});
