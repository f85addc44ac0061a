import ts from "typescript";
import { describe, expect, it } from "vitest";
import { buildDocument } from "../../openapi/build-document.ts";
import { operations } from "../../server/routes/index.ts";
import { problemCodes, problemKinds } from "../../shared/error-codes.ts";
import { sample, type ProjectFile } from "./describe-rule.ts";
import { nodesOf, parseCode } from "./parse-code.ts";
import { codeFiles, readFile } from "./project-files.ts";

const catalogue = "shared/error-codes.ts";
const engineCodes = "server/compute/compute-error.ts";

/** Codes that no operation can answer with, since they are met before an operation is found or outside of it. */
const ofTheProtocol: Readonly<Record<string, string>> = {
  malformed_request: "not HTTP: there is no path yet",
  headers_too_large: "refused while the headers are read",
  request_timeout: "the request never came to its end",
  method_not_allowed: "the path is known, the method is not",
  credential_in_url: "refused before the route is looked up",
};

/**
 * Texts in code, without those of a plain list and of types: a list of codes states what may come, a type what may be
 * said, and neither raises anything.
 */
function textsRaised(file: ProjectFile): string[] {
  return nodesOf(parseCode(file))
    .filter(ts.isStringLiteral)
    .filter(({ parent }) => !ts.isArrayLiteralExpression(parent) && !ts.isLiteralTypeNode(parent))
    .map(({ text }) => text);
}

/** The members of a closed union of texts. */
function membersOfUnion(file: ProjectFile, name: string): string[] {
  return nodesOf(parseCode(file))
    .filter(ts.isTypeAliasDeclaration)
    .filter((alias) => alias.name.text === name)
    .flatMap(nodesOf)
    .filter(ts.isStringLiteral)
    .map(({ text }) => text);
}

describe("the error catalogue", () => {
  const computeErrorCodes = membersOfUnion(
    { path: engineCodes, text: readFile(engineCodes) },
    "ComputeErrorCode",
  );
  const server = codeFiles
    .filter((path) => /^(server|shared)\//.test(path) && !/\.test\.tsx?$/.test(path))
    .filter((path) => path !== catalogue && path !== engineCodes)
    .map((path) => ({ path, text: readFile(path) }));

  it("is read from code, not from lists and types", () => {
    expect(membersOfUnion(sample('type A = "one" | "two"; type B = "three";'), "A")).toEqual(["one", "two"]);
    const code =
      'throw new HttpProblem("not_found", ""); const errors = ["last_admin"]; type C = "wrong_type";';
    expect(textsRaised(sample(code))).toEqual(["not_found", ""]);
  });

  it("holds every code of the engine", () => {
    expect(computeErrorCodes).toContain("too_few_points");
    expect(computeErrorCodes.filter((code) => !(code in problemKinds))).toEqual([]);
  });

  it("holds no code that nothing raises", () => {
    const raised = new Set(server.flatMap(textsRaised));
    expect(problemCodes.filter((code) => !raised.has(code))).toEqual([]);
  });

  it("has an engine that raises all of its own codes", () => {
    const engine = server.filter(({ path }) => /^server\/(compute|calculations)\//.test(path));
    const raised = new Set(engine.flatMap(textsRaised));
    expect(computeErrorCodes.filter((code) => !raised.has(code))).toEqual([]);
  });

  it("writes codes in lower snake case, titles as sentences without a stop, fixes with one", () => {
    const wrong = Object.entries(problemKinds).filter(
      ([code, { status, title, fix }]) =>
        !/^[a-z]+(_[a-z]+)*$/.test(code) ||
        status < 400 ||
        status > 599 ||
        !/^[A-Z].*[^.]$/.test(title) ||
        !/^[A-Z].*\.$/.test(fix),
    );
    expect(wrong.map(([code]) => code)).toEqual([]);
  });

  it("is documented at an operation, except for what the protocol meets before one", () => {
    const document = JSON.stringify(buildDocument(operations));
    const documented = (code: string) => document.includes(`"code":"${code}"`);
    expect(problemCodes.filter((code) => !documented(code)).sort()).toEqual(
      Object.keys(ofTheProtocol).sort(),
    );
  });

  it("documents at every computing operation what its own part of the engine refuses", () => {
    const parts: Readonly<Record<string, RegExp>> = {
      createBoreFit: /^server\/(compute\/bore|calculations\/bore-)/,
      createAxisDeviation: /^server\/(compute\/(axis|conformity)|calculations\/axis-)/,
      createConfirmation: /^server\/(compute\/(confirmation|conformity)|calculations\/confirmation)/,
      createRepeatabilityStudy:
        /^server\/(compute\/(repeatability|conformity|statistics)|calculations\/repeatability-)/,
      createMeasurementPlan: /^server\/(compute\/planning|calculations\/measurement-plan)/,
      createColdTarget: /^server\/(compute\/(beam|targets)|calculations\/cold-target)/,
      createFewestMoves: /^server\/(compute\/(fewest-moves|conformity)|calculations\/(fewest-|component-))/,
      createShimMove: /^server\/(compute\/(moves|conformity)|calculations\/(shim-|component-))/,
    };
    const untold = Object.entries(parts).flatMap(([operationId, part]) => {
      const operation = operations.find((one) => one.operationId === operationId);
      const document = operation ? JSON.stringify(buildDocument([operation])) : "";
      const raised = new Set(server.filter(({ path }) => part.test(path)).flatMap(textsRaised));
      const codes = problemCodes.filter((code) => raised.has(code));
      expect(codes.length).toBeGreaterThan(3);
      return codes
        .filter((code) => !document.includes(`"code":"${code}"`))
        .map((code) => `${operationId} ${code}`);
    });
    expect(untold).toEqual([]);
  });
});

describe("the error table of DEVELOPERS.md", () => {
  it("lists every code with its title under its status, in the order of shared/error-codes.ts", () => {
    const rows = [...readFile("DEVELOPERS.md").matchAll(/^\| (\d{3}) \| (.+) \|$/gm)];
    const table = rows.flatMap(([, status, codes = ""]) =>
      codes.split(" · ").map((code) => `${status} ${code}`),
    );
    const held = Object.entries(problemKinds)
      .map(([code, { status, title }]) => ({ status, text: `${status} \`${code}\` ${title}` }))
      .sort((one, other) => one.status - other.status)
      .map(({ text }) => text);
    expect(table).toEqual(held);
  });
});
