import { existsSync } from "node:fs";
import { join } from "node:path";
import { describe, expect, it } from "vitest";
import { describeRule, sample, type ProjectFile } from "./describe-rule.ts";
import { projectFiles, readFile, root } from "./project-files.ts";

const papers = projectFiles.filter((path) => path.endsWith(".md"));
const scripts = (JSON.parse(readFile("package.json")) as { scripts: Record<string, string> }).scripts;

/** What of `text` a pattern's first group catches. */
const caughtBy = (text: string, pattern: RegExp): string[] =>
  [...text.matchAll(pattern)].map(([, name = ""]) => name);

/** Paths in code quotes, from the root; targets of links, from the paper's folder. Patterns stand for no file. */
function pathsNamed({ path, text }: ProjectFile): string[] {
  const folder = path.includes("/") ? path.slice(0, path.lastIndexOf("/") + 1) : "";
  const homes = /^(\.ci|\.config|console|examples|openapi|server|shared|tests)\//;
  const quoted = caughtBy(text, /`([^`\s]+)`/g).filter((name) => homes.test(name) && !/[<*{…]/.test(name));
  const linked = caughtBy(text, /\]\(([^)#:]+)\)/g).map((name) => `${folder}${name}`);
  return [...quoted, ...linked];
}

describeRule("papers that name no file that is not there", {
  files: papers,
  breaches: (paper) =>
    pathsNamed(paper)
      .filter((name) => !existsSync(join(root, name)))
      .map((name) => `${paper.path}: ${name}`),
  caught: [
    sample("Read `server/nowhere.ts`.", "README.md"),
    sample("See [there](NOWHERE.md).", "README.md"),
    sample("See [there](README.md).", "server/compute/CHANGELOG.md"),
  ],
  spared: [
    sample("`server/app.ts`, `server/routes/<resource>.ts`, [guide](DEVELOPERS.md)", "README.md"),
    sample("[this](https://example.com/a)", "README.md"),
  ],
});

describeRule("papers that name no script that is not in package.json", {
  files: papers,
  breaches: ({ path, text }) =>
    caughtBy(text, /npm run ([\w:]+)/g)
      .filter((name) => !(name in scripts))
      .map((name) => `${path}: ${name}`),
  caught: [sample("npm run everything", "README.md")],
  spared: [sample("npm run check", "README.md")],
});

describe("README.md", () => {
  it("stays under 120 lines", () => {
    expect(readFile("README.md").split("\n").length).toBeLessThan(120);
  });

  it("opens with the job and has both commands", () => {
    const [title, , opening] = readFile("README.md").split("\n");
    expect(title).toBe("# Borewright");
    expect(opening).toMatch(/bore/i);
    expect(readFile("README.md")).toMatch(/^npm start\b/m);
    expect(readFile("README.md")).toMatch(/^npm test\b/m);
  });
});

describe("DEVELOPERS.md", () => {
  const tree = readFile("DEVELOPERS.md");

  it("stays under 200 lines", () => {
    expect(tree.split("\n").length).toBeLessThan(200);
  });

  it("shows every folder of server/ and tests/ in its tree", () => {
    const folders = projectFiles.flatMap((path) => caughtBy(path, /^(?:server|tests)\/([^/]+)\//g));
    expect([...new Set(folders)].filter((name) => !new RegExp(`\\b${name}/`).test(tree))).toEqual([]);
  });

  it("names every project of the tests and every script", () => {
    const projects = caughtBy(readFile("tests/vitest.config.ts"), /name: "(\w+)"/g);
    expect(projects.length).toBeGreaterThan(3);
    expect(projects.filter((name) => !tree.includes(`\`${name}\``))).toEqual([]);
    expect(
      Object.keys(scripts).filter(
        (name) => !tree.includes(`npm run ${name}`) && !tree.includes(`npm ${name}`),
      ),
    ).toEqual([]);
  });
});

describe("the changelog of the interface", () => {
  it("tells the served revision at its top", () => {
    const [served] = caughtBy(readFile("server/http/api-version.ts"), /"(\d{4}-\d\d-\d\d)"/g);
    expect(served).toBeDefined();
    expect(caughtBy(readFile("openapi/CHANGELOG.md"), /^## (\S+)/gm)[0]).toBe(served);
  });
});
