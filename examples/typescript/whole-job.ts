// A whole job, from the machine to the signed reports: npx tsx examples/typescript/whole-job.ts [folder for the reports]
// Signs as the member of BOREWRIGHT_EMAIL and BOREWRIGHT_PASSWORD: a key cannot sign.
import { randomUUID } from "node:crypto";
import { mkdirSync, readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";

const { BOREWRIGHT_URL = "http://127.0.0.1:4100", BOREWRIGHT_EMAIL, BOREWRIGHT_PASSWORD } = process.env;
if (!BOREWRIGHT_EMAIL || !BOREWRIGHT_PASSWORD) {
  throw new Error("Set BOREWRIGHT_EMAIL and BOREWRIGHT_PASSWORD to those of an engineer.");
}
const folder = process.argv[2] ?? "reports";
const read = (file: string): unknown =>
  JSON.parse(readFileSync(new URL(`../${file}`, import.meta.url), "utf8"));

interface Added {
  readonly ids: readonly string[];
  readonly flags: readonly { readonly code: string; readonly detail: string }[];
}

const { accessToken } = await post<{ accessToken: string }>("/v1/sessions", {
  email: BOREWRIGHT_EMAIL,
  password: BOREWRIGHT_PASSWORD,
});

// The machine, and a job on it as it stands today.
const machine = await post<{ id: string; revision: number }>(
  "/v1/machines",
  read("machines/fellgate-gas-turbine.json"),
);
console.log(`Machine ${machine.id}, revision ${machine.revision}`);
const job = await post<{ id: string }>("/v1/jobs", {
  machineId: machine.id,
  details: read("jobs/details.json"),
});
console.log(`Job ${job.id}`);

// Set-up checks before the first reading: a survey without them is marked on every report.
for (const check of read("jobs/checks.json") as object[]) await add("/checks", check);

const asFound = await survey("as-found");
const [plan] = (await add("/plans", { survey: asFound })).ids;
console.log(`Plan ${plan}`);

// The millwrights move in the plan's order: casings first, bearings after, each locked before the next.
for (const move of read("jobs/moves.json") as { component: string }[]) {
  const { flags } = await add("/moves", move);
  console.log(`Moved ${move.component}${flags.map(({ detail }) => `; ${detail}`).join("")}`);
}

const asLeft = await survey("as-left");
await add("/confirmations", { before: asFound, after: asLeft });

const record = await get<{ signOff: { ready: boolean; obstacles: { detail: string }[] } }>(
  `/v1/jobs/${job.id}`,
);
for (const { detail } of record.signOff.obstacles) console.log(`In the way: ${detail}`);
const signed = await post<{ signature: { recordHash: string } }>(`/v1/jobs/${job.id}/signature`, {
  password: BOREWRIGHT_PASSWORD,
  meaning: "As-left condition reviewed and accepted.",
});
console.log(`Signed ${signed.signature.recordHash}`);

mkdirSync(folder, { recursive: true });
for (const format of ["pdf", "xlsx", "dxf", "json"]) {
  const response = await send("GET", `/v1/jobs/${job.id}/report.${format}`);
  const file = join(folder, `report.${format}`);
  writeFileSync(file, Buffer.from(await response.arrayBuffer()));
  console.log(`Report ${file}`);
}

/** A survey under its conditions, with its readings, computed. */
async function survey(name: string): Promise<string> {
  const [id = ""] = (await add("/surveys", read(`jobs/${name}-survey.json`))).ids;
  await add(`/surveys/${id}/readings`, { readings: read(`jobs/${name}-readings.json`) });
  await add(`/surveys/${id}/results`);
  const { surveys } = await get<{
    surveys: { id: string; result: { summary: Record<string, number> }; flags: { detail: string }[] }[];
  }>(`/v1/jobs/${job.id}`);
  const computed = surveys.find((one) => one.id === id);
  const { conforms, undecided, exceeds } = computed?.result.summary ?? {};
  console.log(`Survey ${name}: ${conforms} conform, ${undecided} undecided, ${exceeds} exceed`);
  for (const { detail } of computed?.flags ?? []) console.log(`  ${detail}`);
  return id;
}

function add(path: string, body?: unknown): Promise<Added> {
  return post<Added>(`/v1/jobs/${job.id}${path}`, body);
}

async function post<Answer>(path: string, body?: unknown): Promise<Answer> {
  return (await (await send("POST", path, body)).json()) as Answer;
}

async function get<Answer>(path: string): Promise<Answer> {
  return (await (await send("GET", path)).json()) as Answer;
}

async function send(method: string, path: string, body?: unknown): Promise<Response> {
  const response = await fetch(`${BOREWRIGHT_URL}${path}`, {
    method,
    headers: {
      ...(path === "/v1/sessions" ? {} : { Authorization: `Bearer ${accessToken}` }),
      ...(body === undefined ? {} : { "Content-Type": "application/json" }),
      // One key for this call, however often it has to be sent: it is done once.
      ...(method === "POST" ? { "Idempotency-Key": randomUUID() } : {}),
    },
    ...(body === undefined ? {} : { body: JSON.stringify(body) }),
  });
  if (response.ok) return response;
  throw new Error(`${method} ${path}: ${response.status} ${await response.text()}`);
}
