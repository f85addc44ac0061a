import { describe, expect, it } from "vitest";
import { problemKinds } from "../../shared/error-codes.ts";
import { readFile } from "./project-files.ts";

describe("the error table of DEVELOPERS.md", () => {
  it("lists every code with its status and title, in the order of shared/error-codes.ts", () => {
    const rows = [...readFile("DEVELOPERS.md").matchAll(/^\| `(\w+)` \| (\d{3}) \| (.+) \|$/gm)];
    const table = rows.map(([, code, status, title]) => `${code} ${status} ${title}`);
    const catalogue = Object.entries(problemKinds).map(([code, { status, title }]) => `${code} ${status} ${title}`);
    expect(table).toEqual(catalogue);
  });
});
