import { startServer } from "../../server/index.ts";

/** The real server as a process of its own, for tests that kill it. Its address is its first line of output. */
const lines: string[] = [];
const { url } = await startServer({ environment: process.env, announce: (line) => lines.push(line) });
process.stdout.write(`${url}\n`);
