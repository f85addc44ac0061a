import {
  existsSync,
  mkdirSync,
  mkdtempSync,
  readdirSync,
  readFileSync,
  rmSync,
  writeFileSync,
} from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { afterEach, beforeEach, describe, expect, it } from "vitest";
import { awaitEnd, spawnTied } from "../../server/bootstrap/tied-process.mjs";
import { until } from "./service-process.ts";

const bootstrap = fileURLToPath(new URL("../../server/bootstrap/", import.meta.url));

/** Stands in for the registry's side: notes how it was called, half-makes a package, and finishes only when it is let. */
const npm = `
import { existsSync, mkdirSync, writeFileSync, appendFileSync } from "node:fs";
const notes = process.env.NOTES;
appendFileSync(notes, JSON.stringify({ args: process.argv.slice(2), environment: process.env }) + "\\n");
mkdirSync("node_modules/a", { recursive: true });
const timer = setInterval(() => {
  if (!existsSync(notes + ".finish")) return;
  writeFileSync("node_modules/a/package.json", "{}");
  clearInterval(timer);
}, 20);
`;
const program = `
import { ensurePackages } from ${JSON.stringify(`${bootstrap}packages.mjs`)};
import { supervise } from ${JSON.stringify(`${bootstrap}supervise.mjs`)};
const life = supervise();
await ensurePackages(life, process.cwd());
await life.end(0);
`;

interface NpmCall {
  readonly args: readonly string[];
  readonly environment: Readonly<Record<string, string>>;
}

describe("ensurePackages", () => {
  let root: string;
  let notes: string;
  beforeEach(() => {
    root = mkdtempSync(join(tmpdir(), "borewright-packages-"));
    notes = join(root, "npm-notes");
    mkdirSync(join(root, "tool"));
    writeFileSync(join(root, "tool/npm-cli.js"), npm);
    writeFileSync(join(root, "package.json"), `{"type":"module"}`);
    writeFileSync(join(root, ".npmrc"), "");
    writeFileSync(join(root, "package-lock.json"), `{"packages":{"":{},"node_modules/a":{}}}`);
  });
  afterEach(() => rmSync(root, { recursive: true }));

  const calls = () =>
    existsSync(notes)
      ? readFileSync(notes, "utf8")
          .trim()
          .split("\n")
          .map((line) => JSON.parse(line) as NpmCall)
      : [];
  const letFinish = () => writeFileSync(`${notes}.finish`, "");
  const launch = (environment: Record<string, string> = {}) => {
    const env = {
      PATH: process.env["PATH"],
      npm_execpath: join(root, "tool/npm-cli.js"),
      NOTES: notes,
      ...environment,
    };
    return spawnTied(process.execPath, ["--input-type=module", "--eval", program], { cwd: root, env });
  };
  const installed = () => readdirSync(root).includes("node_modules");

  it("installs what the lock file names, and not again until it or Node changes", async () => {
    letFinish();
    expect((await awaitEnd(launch())).code).toBe(0);
    expect(existsSync(join(root, "node_modules/a/package.json"))).toBe(true);
    expect((await awaitEnd(launch())).code).toBe(0);
    expect(calls()).toHaveLength(1);

    writeFileSync(join(root, "package.json"), `{"type":"module","scripts":{}}`);
    expect((await awaitEnd(launch())).code).toBe(0);
    expect(calls()).toHaveLength(1);

    writeFileSync(
      join(root, "package-lock.json"),
      `{"packages":{"":{},"node_modules/a":{"version":"2.0.0"}}}`,
    );
    expect((await awaitEnd(launch())).code).toBe(0);
    expect(calls()).toHaveLength(2);
    expect(readdirSync(join(root, ".data"))).toEqual([]);
  });

  it("installs everything, without running the packages' scripts, whatever the start was called with", async () => {
    letFinish();
    const called = launch({
      NODE_ENV: "production",
      npm_config_omit: "dev",
      npm_config_registry: "http://localhost:1",
    });
    expect((await awaitEnd(called)).code).toBe(0);
    const [call] = calls();
    expect(call?.args).toEqual(expect.arrayContaining(["ci", "--include=dev", "--ignore-scripts"]));
    expect(Object.keys(call?.environment ?? {})).not.toEqual(expect.arrayContaining(["NODE_ENV"]));
    expect(Object.keys(call?.environment ?? {})).not.toEqual(expect.arrayContaining(["npm_config_omit"]));
    expect(call?.environment["npm_config_registry"]).toBe("http://localhost:1");
  });

  it.each(["SIGINT", "SIGTERM", "SIGHUP"] as const)(
    "leaves nothing half-made when %s interrupts it",
    async (signal) => {
      const child = launch();
      const ended = awaitEnd(child);
      await until("npm runs", () => calls().length === 1, 10_000);
      child.kill(signal);
      expect((await ended).code).toBeGreaterThan(128);
      expect(installed()).toBe(false);
      expect(readdirSync(join(root, ".data"))).toEqual([]);
    },
  );

  it("starts over after kill -9, over what that left", async () => {
    const child = launch();
    const ended = awaitEnd(child);
    await until("npm runs", () => calls().length === 1, 10_000);
    child.kill("SIGKILL");
    await ended;
    expect(installed()).toBe(false);
    letFinish();
    expect((await awaitEnd(launch())).code).toBe(0);
    expect(existsSync(join(root, "node_modules/a/package.json"))).toBe(true);
    expect(readdirSync(join(root, ".data"))).toEqual([]);
  });

  it("keeps the packages that are there until the new ones are complete", async () => {
    mkdirSync(join(root, "node_modules/old"), { recursive: true });
    const child = launch();
    const ended = awaitEnd(child);
    await until("npm runs", () => calls().length === 1, 10_000);
    expect(readdirSync(join(root, "node_modules"))).toEqual(["old"]);
    letFinish();
    expect((await ended).code).toBe(0);
    expect(readdirSync(join(root, "node_modules"))).not.toContain("old");
  });

  it("lets two starts at once install once", async () => {
    const both = [awaitEnd(launch()), awaitEnd(launch())];
    await until("npm runs", () => calls().length === 1, 10_000);
    letFinish();
    expect((await Promise.all(both)).map(({ code }) => code)).toEqual([0, 0]);
    expect(calls()).toHaveLength(1);
  });
});
