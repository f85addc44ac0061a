import ts from "typescript";
import { describe, expect, it } from "vitest";
import { buildDocument } from "../../openapi/build-document.ts";
import { operations } from "../../server/routes/index.ts";
import { problemCodes, problemKinds } from "../../shared/error-codes.ts";
import { codeFiles, nodesOf, parseCode } from "./project-files.ts";

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

/** Texts in code, without those of a plain list: a list of codes states what may come and raises nothing. */
function textsRaised(path: string): string[] {
  return nodesOf(parseCode(path))
    .filter(ts.isStringLiteral)
    .filter(({ parent }) => !ts.isArrayLiteralExpression(parent))
    .map(({ text }) => text);
}

/** The members of the engine's closed union. */
const computeErrorCodes = nodesOf(parseCode(engineCodes))
  .filter(ts.isTypeAliasDeclaration)
  .filter(({ name }) => name.text === "ComputeErrorCode")
  .flatMap(nodesOf)
  .filter(ts.isStringLiteral)
  .map(({ text }) => text);

describe("the error catalogue", () => {
  it("holds every code of the engine", () => {
    expect(computeErrorCodes).toContain("too_few_points");
    expect(computeErrorCodes.filter((code) => !(code in problemKinds))).toEqual([]);
  });

  it("holds no code that nothing raises", () => {
    const raised = new Set(
      codeFiles
        .filter((path) => /^(server|shared)\//.test(path) && !/\.test\.tsx?$/.test(path))
        .filter((path) => path !== catalogue && path !== engineCodes)
        .flatMap(textsRaised),
    );
    expect(problemCodes.filter((code) => !raised.has(code))).toEqual([]);
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
    const protocol = Object.keys(ofTheProtocol);
    expect(problemCodes.filter((code) => !documented(code)).sort()).toEqual([...protocol].sort());
  });
});
