import { describe, expect, it } from "vitest";
import { projectFiles } from "./project-files.ts";

/** What stands at the root: a tool's own demand, or the first thing a reader opens. Everything else has a home. */
const topLevel = [
  ".ci",
  ".config",
  ".env.example",
  ".gitignore",
  ".npmrc",
  "DEVELOPERS.md",
  "LICENSE",
  "README.md",
  "console",
  "examples",
  "openapi",
  "package-lock.json",
  "package.json",
  "server",
  "shared",
  "tests",
  "tsconfig.json",
];

const capitals = /^(README|DEVELOPERS|CHANGELOG)\.md$|^LICENSE$/;
const kebab = /^\.?[a-z0-9]+(-[a-z0-9]+)*(\.[a-z0-9]+(-[a-z0-9]+)*)*$/;

describe("the project's files", () => {
  it("are found", () => {
    expect(projectFiles).toContain("tests/house/file-names.test.ts");
    expect(projectFiles.filter((path) => path.startsWith("node_modules/"))).toEqual([]);
  });

  it("have kebab-case names, their folders too", () => {
    const names = projectFiles.flatMap((path) => path.split("/"));
    const wrong = [...new Set(names)].filter((name) => !kebab.test(name) && !capitals.test(name));
    expect(wrong).toEqual([]);
  });

  it("stand in one of the folders of the house, with nothing else at the root", () => {
    const found = [...new Set(projectFiles.map((path) => path.split("/")[0]))];
    expect(found.sort()).toEqual([...topLevel].sort());
  });

  it("are split by meaning: none is a second part, or a drawer for what has no name", () => {
    const drawer = /(^|\/)(utils?|helpers?|misc|common-functions|[a-z-]+-[2-9])\.[a-z]+$/;
    expect(projectFiles.filter((path) => drawer.test(path))).toEqual([]);
  });
});
