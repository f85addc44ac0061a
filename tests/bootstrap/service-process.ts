import type { ChildProcess } from "node:child_process";
import { once } from "node:events";
import { mkdtempSync, readdirSync, readFileSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { findFreePort } from "../../server/bootstrap/ports.mjs";
import { endTied, spawnTied } from "../../server/bootstrap/tied-process.mjs";

const root = fileURLToPath(new URL("../..", import.meta.url));
const POLL_MS = 25;

export const makeDataDir = (): string => mkdtempSync(join(tmpdir(), "borewright-data-"));
export const removeDataDir = (folder: string): void => rmSync(folder, { recursive: true, force: true });

export async function until(
  what: string,
  holds: () => boolean | Promise<boolean>,
  withinMs: number,
): Promise<void> {
  for (const started = Date.now(); !(await holds());) {
    if (Date.now() - started > withinMs) throw new Error(`Not within ${withinMs} ms: ${what}`);
    await new Promise((resolve) => setTimeout(resolve, POLL_MS));
  }
}

/** Every live process that was started for a data folder, by the environment that it inherited. */
export function processesOf(dataDir: string): number[] {
  return readdirSync("/proc")
    .filter((name) => /^\d+$/.test(name))
    .filter((pid) => read(`/proc/${pid}/environ`).split("\0").includes(`DATA_DIR=${dataDir}`))
    .map(Number);
}

function read(path: string): string {
  try {
    return readFileSync(path, "utf8");
  } catch {
    return ""; // It ended between two looks, or belongs to someone else.
  }
}

const commandLineOf = (pid: number): string => read(`/proc/${pid}/cmdline`).replaceAll("\0", " ");

/** `npm start` as a person types it, on a data folder and a port of the test's own. */
export class ServiceProcess {
  output = "";
  readonly exited: Promise<number | null>;

  private constructor(
    readonly npm: ChildProcess,
    readonly dataDir: string,
    readonly url: string,
  ) {
    for (const stream of [npm.stdout, npm.stderr])
      stream?.setEncoding("utf8").on("data", (text: string) => (this.output += text));
    this.exited = once(npm, "close").then(([code]) => code as number | null);
  }

  static async launch(dataDir: string, settings: Record<string, string> = {}): Promise<ServiceProcess> {
    const port = settings["PORT"] ?? String(await findFreePort());
    const { PATH, HOME, TMPDIR } = process.env;
    const env = { PATH, HOME, TMPDIR, ENV_FILE: "/dev/null", DATA_DIR: dataDir, PORT: port, ...settings };
    const npm = spawnTied("npm", ["start"], { cwd: root, env });
    return new ServiceProcess(npm, dataDir, `http://127.0.0.1:${port}`);
  }

  static async start(dataDir: string, settings?: Record<string, string>): Promise<ServiceProcess> {
    const service = await ServiceProcess.launch(dataDir, settings);
    await Promise.race([
      until("the service is ready", () => service.output.includes("\nReady after"), 60_000),
      service.exited.then((code) => Promise.reject(new Error(`Exit ${code}:\n${service.output}`))),
    ]);
    return service;
  }

  /** The process of one part of the service. */
  pidOf(part: "npm" | "node" | "mariadbd"): number {
    const mark = { npm: /^npm /, node: /run\.mjs start/, mariadbd: /mariadbd .*--datadir=/ }[part];
    const pid = processesOf(this.dataDir).find((candidate) => mark.test(commandLineOf(candidate)));
    if (pid === undefined) throw new Error(`No ${part} runs for ${this.dataDir}.`);
    return pid;
  }

  async nothingLeft(withinMs: number): Promise<void> {
    const left = () => processesOf(this.dataDir).map((pid) => `${pid} ${commandLineOf(pid)}`);
    await until("every process of the service is gone", () => left().length === 0, withinMs).catch(
      (error: unknown) => {
        throw new Error(`Left behind:\n${left().join("\n")}`, { cause: error });
      },
    );
  }

  async stop(): Promise<void> {
    await endTied(this.npm);
    await this.nothingLeft(10_000);
  }
}
