import { readFileSync } from "node:fs";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { makeOrganisation } from "../support/factories.ts";
import { openListeningApp, type ListeningApp } from "../support/listening-app.ts";
import { runProgram } from "../support/run-program.ts";

const readme = readFileSync(new URL("../../README.md", import.meta.url), "utf8");
const block = (language: string, start: string): string => {
  const blocks = [...readme.matchAll(/^```(\w+)\n([\s\S]*?)^```$/gm)];
  return blocks.find(([, name, text = ""]) => name === language && text.startsWith(start))?.[2] ?? "";
};
const call = block("sh", "curl ");
const answer = block("json", "{");

/** Where `got` is not what was printed: shortened, and each number rounded to the digits that stand there. */
function partings(printed: unknown, got: unknown, place = ""): string[] {
  if (typeof printed === "number" && typeof got === "number") {
    const digits = String(printed).split(".")[1]?.length ?? 0;
    return Math.abs(printed - got) <= 0.5 * 10 ** -digits * (1 + 1e-9) ? [] : [`${place}: ${got}`];
  }
  if (Array.isArray(printed) && Array.isArray(got) && printed.length !== got.length)
    return [`${place}: length`];
  if (typeof printed === "object" && printed !== null && typeof got === "object" && got !== null) {
    return Object.entries(printed).flatMap(([name, value]) =>
      partings(value, (got as Record<string, unknown>)[name], `${place}/${name}`),
    );
  }
  return printed === got ? [] : [`${place}: ${JSON.stringify(got)}`];
}

describe("the comparison with what is printed", () => {
  it("takes shortened answers and rounded numbers, and nothing else", () => {
    expect(partings({ a: 0.0988, b: [1] }, { a: 0.09875, b: [1.4], c: 2 })).toEqual([]);
    expect(partings({ a: 0.0988 }, { a: 0.0987 })).toEqual(["/a: 0.0987"]);
    expect(partings({ a: null, b: [] }, { a: 1, b: [2] })).toEqual(["/a: 1", "/b: length"]);
    expect(partings({ a: { b: 1 } }, {})).toEqual(["/a: undefined"]);
  });
});

describe("the call in README.md", () => {
  let app: ListeningApp;
  beforeAll(async () => {
    app = await openListeningApp();
  });
  afterAll(() => app.close());

  it("works as it stands, and gets the answer printed below it", async () => {
    expect(call).toContain("http://127.0.0.1:4100/v1/bore-fits");
    const { secret } = await (await makeOrganisation(app.deps)).key("calculations:write");
    const here = call.replace("http://127.0.0.1:4100", app.url);
    const { code, stdout } = await runProgram(["sh", "-c", here], { BOREWRIGHT_KEY: secret });
    expect(code).toBe(0);
    expect(partings(JSON.parse(answer), JSON.parse(stdout))).toEqual([]);
  });
});
