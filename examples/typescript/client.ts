import { randomUUID } from "node:crypto";
import { readFileSync } from "node:fs";
import { setTimeout as wait } from "node:timers/promises";

interface Problem {
  readonly code: string;
  readonly detail: string;
  readonly errors?: readonly { readonly pointer?: string; readonly code: string; readonly detail: string }[];
}

const { BOREWRIGHT_URL = "http://127.0.0.1:4100", BOREWRIGHT_KEY } = process.env;
const attempts = 3;

/** The request file named on the command line, or the example beside this folder. */
export function readRequest(example: string): unknown {
  const file = process.argv[2] ?? new URL(`../requests/${example}.json`, import.meta.url);
  return JSON.parse(readFileSync(file, "utf8"));
}

/** Posts a request and returns its answer; ends the program with the problem told when it is refused. */
export async function postCalculation<Answer>(path: string, request: unknown): Promise<Answer> {
  if (!BOREWRIGHT_KEY) return fail("Set BOREWRIGHT_KEY to an API key with the scope calculations:write.");
  const headers = {
    Authorization: `Bearer ${BOREWRIGHT_KEY}`,
    "Content-Type": "application/json",
    // One key for this call, however often it has to be sent: it is computed and kept once.
    "Idempotency-Key": randomUUID(),
  };
  const response = await sendPatiently(path, { method: "POST", headers, body: JSON.stringify(request) });
  if (response.status !== 201)
    return fail(describeProblem(response.status, (await response.json()) as Problem));
  return (await response.json()) as Answer;
}

/** Sends again what got no answer, or one that says that the service cannot answer just now. */
async function sendPatiently(path: string, init: RequestInit): Promise<Response> {
  for (let attempt = 1; ; attempt++) {
    const outcome = await fetch(`${BOREWRIGHT_URL}${path}`, init).catch((error: Error) => error);
    const answered = outcome instanceof Response && outcome.status !== 503;
    if (answered) return outcome;
    if (attempt === attempts)
      return outcome instanceof Response
        ? outcome
        : fail(`${BOREWRIGHT_URL} does not answer: ${outcome.message}`);
    await wait(1000 * attempt);
  }
}

function describeProblem(status: number, { code, detail, errors = [] }: Problem): string {
  const places = errors.map((error) => `  ${error.pointer ?? ""} ${error.code}: ${error.detail}`);
  return [`${status} ${code}: ${detail}`, ...places].join("\n");
}

function fail(message: string): never {
  console.error(message);
  process.exit(1);
}
