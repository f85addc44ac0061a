import { describe, expect, it } from "vitest";
import { describeRule, sample } from "./describe-rule.ts";
import { filesByGit, projectFiles, readIgnores } from "./project-files.ts";

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
const drawer = /(^|\/)(utils?|helpers?|misc|common-functions|[a-z-]+-[2-9])\.[a-z]+$/;

const named = (...paths: string[]) => paths.map((path) => sample("", path));

describe("the list of the project's files", () => {
  it("has this one in it, and nothing that was installed", () => {
    expect(projectFiles).toContain("tests/house/file-names.test.ts");
    expect(projectFiles.filter((path) => path.startsWith("node_modules/"))).toEqual([]);
  });

  it("is git's: what is committed and what could be", () => {
    const byGit = filesByGit();
    expect(projectFiles).toEqual(byGit ?? projectFiles);
  });

  it("leaves out what .gitignore names, and nothing else", () => {
    const ignores = readIgnores("# made\nnode_modules/\nconsole/dist/\n*.log\n");
    expect(ignores("node_modules", true) && ignores("a/node_modules", true)).toBe(true);
    expect(ignores("node_modules", false)).toBe(false);
    expect(ignores("console/dist", true) && ignores("a/b.log", false)).toBe(true);
    expect(ignores("server/console/dist", true)).toBe(false);
    expect(() => readIgnores("a/**/b")).toThrow("cannot read");
    expect(() => readIgnores("!kept")).toThrow("cannot read");
  });
});

describe("the root", () => {
  it("holds the folders of the house and nothing else", () => {
    const found = [...new Set(projectFiles.map((path) => path.split("/")[0]))];
    expect(found.sort()).toEqual([...topLevel].sort());
  });
});

describeRule("names in kebab-case, of folders too", {
  files: projectFiles,
  breaches: ({ path }) =>
    path
      .split("/")
      .filter((name) => !kebab.test(name) && !capitals.test(name))
      .map((name) => `${path}: ${name}`),
  caught: named("server/fitCircle.ts", "server/Compute/a.ts", "tests/fit_circle.test.ts", "server/README"),
  spared: named(
    ".ci/run",
    "server/compute/CHANGELOG.md",
    "tests/api/keys.test.ts",
    "2026-12-01-first-tables.ts",
  ),
});

describeRule("files split by meaning, none a second part or a drawer for what has no name", {
  files: projectFiles,
  breaches: ({ path }) => (drawer.test(path) ? [path] : []),
  caught: named("server/utils.ts", "tests/helpers.ts", "server/compute/bore/fit-bore-2.ts"),
  spared: named("server/compute/bore/fit-bore.ts", "shared/units.ts"),
});
