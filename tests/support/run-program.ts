import { spawn } from "node:child_process";
import { once } from "node:events";
import { fileURLToPath } from "node:url";

export interface Ended {
  readonly code: number | null;
  readonly stdout: string;
  readonly stderr: string;
}

const root = fileURLToPath(new URL("../..", import.meta.url));

/** Runs a program from the project's folder to its end, with nothing of the environment but what finding programs needs. */
export async function runProgram(
  [program = "", ...args]: readonly string[],
  environment: Readonly<Record<string, string>>,
): Promise<Ended> {
  const { PATH, HOME, TMPDIR } = process.env;
  const env = { PATH, HOME, TMPDIR, ...environment };
  const child = spawn(program, args, { cwd: root, env, stdio: ["ignore", "pipe", "pipe"] });
  const said = { stdout: "", stderr: "" };
  for (const name of ["stdout", "stderr"] as const)
    child[name].setEncoding("utf8").on("data", (text: string) => (said[name] += text));
  const [code] = (await once(child, "close")) as [number | null];
  return { code, ...said };
}
