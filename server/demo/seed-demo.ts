import { appendFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { scopes, type Role } from "../../shared/access.ts";
import type { Deps } from "../deps.ts";
import type { Caller } from "../services/caller.ts";
import { createMembers } from "../services/first-admin.ts";
import { issueKey } from "../services/issue-key.ts";
import { randomText } from "../services/key-format.ts";
import { recordJob } from "./record-job.ts";
import { recordOutage } from "./record-outage.ts";

/** Invented people of an invented works. */
const ORGANISATION = "Fellgate Works (demo)";
const PEOPLE: readonly { name: string; email: string; role: Role }[] = [
  { name: "Maren Oake", email: "admin@fellgate.example", role: "admin" },
  { name: "Ines Alder", email: "engineer@fellgate.example", role: "engineer" },
  { name: "Tomas Reed", email: "developer@fellgate.example", role: "developer" },
  { name: "Sol Winter", email: "viewer@fellgate.example", role: "viewer" },
];

/**
 * Makes the demo: an organisation with a member of each role, a key, the records of an outage, and a machine with a
 * signed job. What is there already
 * stays, so that a start that was cut short is completed by the next. Passwords are made up anew for each installation,
 * told at the first start and kept in DATA_DIR for its owner alone.
 */
export async function seedDemo(deps: Deps, url: string, announce: (line: string) => void): Promise<void> {
  const { organisations, members, apiKeys } = deps.database.models;
  const signIns = (await organisations.findOne({ where: { name: ORGANISATION } }))
    ? []
    : await makePeople(deps);
  const organisation = await organisations.findOne({ where: { name: ORGANISATION }, rejectOnEmpty: true });
  const memberOf = (role: Role) =>
    members.findOne({ where: { organisationId: organisation.id, role }, order: ["createdAt", "id"] });

  const admin = await memberOf("admin");
  const hasKey = (await apiKeys.count({ where: { organisationId: organisation.id } })) > 0;
  const call = hasKey || !admin ? [] : await makeKey(deps, memberCaller(admin, organisation), url);
  const engineer = await memberOf("engineer");
  if (engineer) {
    const caller = memberCaller(engineer, organisation);
    await recordOutage(deps, caller);
    await recordJob(deps, { caller, claim: null, requestId: "demo" });
  }

  if (signIns.length === 0) announce(`The demo's sign-ins are in ${signInsFile(deps)}.`);
  for (const line of [...signIns, ...call]) announce(line);
}

/** The sign-ins are on disk before anybody can use them: a password that was told to nobody would be lost. */
async function makePeople(deps: Deps): Promise<string[]> {
  const people = PEOPLE.map((person) => ({ ...person, password: randomText(16) }));
  const lines = [
    "Demo sign-ins:",
    ...people.map(({ role, email, password }) => `  ${role.padEnd(9)}  ${email}  ${password}`),
  ];
  writeFileSync(signInsFile(deps), `${lines.join("\n")}\n`, { mode: 0o600 });
  await createMembers(deps, { name: ORGANISATION }, people);
  return lines;
}

async function makeKey(deps: Deps, caller: Caller, url: string): Promise<string[]> {
  const order = {
    name: "Demo",
    scopes: scopes.filter((scope) => scope.startsWith("calculations:") || scope === "usage:read"),
  };
  const { secret } = await issueKey(deps, order, { caller, claim: null, requestId: "demo" });
  const lines = ["", "One bore, fitted (the key is the demo's):", `  ${curl(url, secret)}`];
  appendFileSync(signInsFile(deps), `${lines.join("\n")}\n`, { mode: 0o600 });
  return lines;
}

function signInsFile({ config }: Deps): string {
  return join(config.dataDir, "demo-sign-ins.txt");
}

function memberCaller(
  { id, name, email, role }: { id: string; name: string; email: string; role: Role },
  organisation: { id: string; name: string },
): Caller {
  return {
    by: "member",
    organisation: { id: organisation.id, name: organisation.name },
    member: { id, name, email, role },
    sessionId: "",
  };
}

function curl(url: string, secret: string): string {
  const body = JSON.stringify({
    units: { axial: "mm", bore: "mm", offset: "mm" },
    seen: "downstream",
    bores: [
      {
        id: "brg-1",
        form: "points",
        points: [
          { h: 0.1, v: 180.04 },
          { h: 180.11, v: 0.03 },
          { h: 0.09, v: -179.97 },
          { h: -179.9, v: 0.02 },
        ],
      },
    ],
  });
  return `curl -s ${url}/v1/bore-fits -H 'Authorization: Bearer ${secret}' -H 'Content-Type: application/json' -d '${body}'`;
}
