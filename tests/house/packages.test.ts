import { describe, expect, it } from "vitest";
import { describeRule, sample, type ProjectFile } from "./describe-rule.ts";
import { readFile } from "./project-files.ts";

interface Package {
  readonly license: string;
  readonly dependencies: Readonly<Record<string, string>>;
  readonly devDependencies: Readonly<Record<string, string>>;
}

const written = ({ text }: ProjectFile) => JSON.parse(text) as Partial<Package>;

describeRule("every package in one exact version, in one list, in order", {
  files: ["package.json"],
  breaches: (file) => {
    const { dependencies = {}, devDependencies = {} } = written(file);
    const all = [...Object.entries(dependencies), ...Object.entries(devDependencies)];
    const disordered = [dependencies, devDependencies].filter((list) => {
      const names = Object.keys(list);
      return names.join() !== [...names].sort().join();
    });
    return [
      ...all
        .filter(([, version]) => !/^\d+\.\d+\.\d+$/.test(version))
        .map(([name, version]) => `${name} ${version}`),
      ...Object.keys(dependencies).filter((name) => name in devDependencies),
      ...disordered.map((list) => Object.keys(list).join()),
    ];
  },
  caught: [
    sample('{ "dependencies": { "zod": "^4.6.7" } }', "package.json"),
    sample('{ "devDependencies": { "zod": "latest" } }', "package.json"),
    sample('{ "dependencies": { "zod": "4.6.7" }, "devDependencies": { "zod": "4.6.7" } }', "package.json"),
    sample('{ "dependencies": { "zod": "4.6.7", "express": "5.3.0" } }', "package.json"),
  ],
});

describe("package-lock.json", () => {
  it("locks what package.json asks for", () => {
    const { dependencies, devDependencies } = JSON.parse(readFile("package.json")) as Package;
    const lock = JSON.parse(readFile("package-lock.json")) as {
      packages: Record<string, Package & { version: string; integrity?: string }>;
    };
    expect(lock.packages[""]).toMatchObject({ dependencies, devDependencies });
    const asked = { ...dependencies, ...devDependencies };
    const installed = Object.keys(asked).map((name) => [
      name,
      lock.packages[`node_modules/${name}`]?.version,
    ]);
    expect(Object.fromEntries(installed)).toEqual(asked);
  });

  it("holds the fingerprint of every package", () => {
    const { packages } = JSON.parse(readFile("package-lock.json")) as {
      packages: Record<string, { integrity?: string; inBundle?: boolean }>;
    };
    const bare = Object.entries(packages).filter(
      ([path, { integrity, inBundle }]) => path !== "" && !inBundle && !/^sha512-/.test(integrity ?? ""),
    );
    expect(bare.map(([path]) => path)).toEqual([]);
  });
});

describe("the licence", () => {
  it("is MIT in package.json and in LICENSE", () => {
    expect((JSON.parse(readFile("package.json")) as Package).license).toBe("MIT");
    expect(readFile("LICENSE")).toMatch(/^MIT License\n\nCopyright \(c\) 2026 Borewright contributors\n/);
  });
});
