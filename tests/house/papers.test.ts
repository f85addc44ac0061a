import { existsSync } from "node:fs";
import { join } from "node:path";
import { describe, expect, it } from "vitest";
import { projectFiles, readFile, root } from "./project-files.ts";

const papers = ["README.md", "DEVELOPERS.md"];
const scripts = (JSON.parse(readFile("package.json")) as { scripts: Record<string, string> }).scripts;

describe.each(papers)("%s", (paper) => {
  const text = readFile(paper);

  it("names no path that is not there", () => {
    const inCode = [...text.matchAll(/`([^`\s]+)`/g)].map(([, name = ""]) => name);
    const linked = [...text.matchAll(/\]\(([^)#:]+)\)/g)].map(([, name = ""]) => name);
    const folders = /^(\.ci|\.config|console|examples|openapi|server|shared|tests)\//;
    const named = [...inCode.filter((name) => folders.test(name) && !/[<*{]/.test(name)), ...linked];
    expect(named.length).toBeGreaterThan(3);
    expect(named.filter((name) => !existsSync(join(root, name)))).toEqual([]);
  });

  it("names no script that is not in package.json", () => {
    const named = [...text.matchAll(/npm run ([\w:]+)/g)].map(([, name = ""]) => name);
    expect(named.filter((name) => !(name in scripts))).toEqual([]);
  });
});

describe("DEVELOPERS.md", () => {
  it("stays under 200 lines", () => {
    expect(readFile("DEVELOPERS.md").split("\n").length).toBeLessThan(200);
  });

  it("shows every folder of server/ in its tree", () => {
    const folders = projectFiles
      .map((path) => /^server\/([^/]+)\//.exec(path)?.[1])
      .filter((name) => name !== undefined);
    const tree = readFile("DEVELOPERS.md");
    expect([...new Set(folders)].filter((name) => !tree.includes(`${name}/`))).toEqual([]);
  });
});
