import ts from "typescript";
import { describe, expect, it } from "vitest";
import { nodesOf, parseCode } from "../house/parse-code.ts";
import { codeFiles, readFile } from "../house/project-files.ts";
import { notExpressed, notOverHttp } from "./case-list.ts";
import { describeReferences, readAllCases } from "./read-cases.ts";

/** The kinds whose every case a test file runs: those of its calls of `describeCases` that leave none out. */
function kindsRunBy(path: string, text: string): string[] {
  return nodesOf(parseCode({ path, text })).flatMap((node) => {
    if (!ts.isCallExpression(node) || node.expression.getText() !== "describeCases") return [];
    const [, kinds, , some] = node.arguments;
    if (some !== undefined || !kinds || !ts.isArrayLiteralExpression(kinds)) return [];
    return kinds.elements.filter(ts.isStringLiteral).map((kind) => kind.text);
  });
}

const tests = codeFiles
  .filter((path) => path.endsWith(".test.ts"))
  .map((path) => ({ path, kinds: kindsRunBy(path, readFile(path)) }));
const runAnywhere = new Set(tests.flatMap(({ kinds }) => kinds));
const runOverHttp = new Set(
  tests.filter(({ path }) => path.endsWith("-over-http.test.ts")).flatMap(({ kinds }) => kinds),
);

describe("the kinds a test runs", () => {
  it("are those named in its calls, but for calls that take some cases only", () => {
    const text = `
      describeCases<A, B>("one", ["a", "b"], (reference) => {});
      describeCases("some", ["c"], () => {}, () => true);
      // describeCases("said", ["d"], () => {});
      other("else", ["e"]);`;
    expect(kindsRunBy("made-up.test.ts", text)).toEqual(["a", "b"]);
  });
});

describeReferences("every case of the reference folder", "any kind", () => {
  const cases = readAllCases();
  const left = cases.filter(({ id }) => !(id in notExpressed));

  it("is run by a test, or listed with the reason why it cannot be expressed", () => {
    expect(left.length).toBeGreaterThan(60);
    expect(left.filter(({ kind }) => !runAnywhere.has(kind)).map(({ id }) => id)).toEqual([]);
  });

  it("is run over HTTP, or listed with the reason why no request states it", () => {
    const notAsked = left.filter(({ id, kind }) => !(id in notOverHttp) && !runOverHttp.has(kind));
    expect(notAsked.map(({ id }) => id)).toEqual([]);
  });

  it("is listed once, under an id that exists, and with a reason", () => {
    const ids = cases.map(({ id }) => id);
    expect(new Set(ids).size).toBe(ids.length);
    const listed = [...Object.entries(notExpressed), ...Object.entries(notOverHttp)];
    expect(listed.filter(([id]) => !ids.includes(id))).toEqual([]);
    expect(Object.keys(notOverHttp).filter((id) => id in notExpressed)).toEqual([]);
    expect(listed.filter(([, reason]) => reason.length < 30)).toEqual([]);
    // What is listed as not asked over HTTP must not be asked after all.
    const asked = left.filter(({ id, kind }) => id in notOverHttp && runOverHttp.has(kind));
    expect(asked.map(({ id }) => id)).toEqual([]);
  });
});
