import { writeFileSync } from "node:fs";
import { join } from "node:path";
import { scopes, type Role } from "../../shared/access.ts";
import type { Deps } from "../deps.ts";
import type { Caller } from "../services/caller.ts";
import { createMembers } from "../services/first-admin.ts";
import { issueKey } from "../services/issue-key.ts";
import { randomText } from "../services/key-format.ts";
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
 * Makes the demo once: an organisation with a member of each role, a key, and the records of an outage. Passwords are
 * made up anew for each installation, told at this start and kept in DATA_DIR for its owner alone.
 */
export async function seedDemo(deps: Deps, url: string, announce: (line: string) => void): Promise<void> {
  const { organisations, members } = deps.database.models;
  const existing = await organisations.findOne({ where: { name: ORGANISATION } });
  if (existing) {
    const engineer = await members.findOne({
      where: { organisationId: existing.id, role: "engineer" },
      order: ["createdAt"],
    });
    if (engineer) await recordOutage(deps, memberCaller(engineer, existing));
    announce(`The demo's sign-ins are in ${signInsFile(deps)}.`);
    return;
  }
  const people = PEOPLE.map((person) => ({ ...person, password: randomText(16) }));
  const made = await createMembers(deps, { name: ORGANISATION }, people);
  const organisation = { id: made.organisationId, name: ORGANISATION };
  const [admin, engineer] = made.members;
  if (!admin || !engineer) throw new Error("The demo has an administrator and an engineer.");
  const { secret } = await issueKey(
    deps,
    {
      name: "Demo",
      scopes: scopes.filter((scope) => scope.startsWith("calculations:") || scope === "usage:read"),
    },
    { caller: memberCaller(admin, organisation), claim: null, requestId: "demo" },
  );
  await recordOutage(deps, memberCaller(engineer, organisation));
  const lines = [
    "Demo sign-ins:",
    ...people.map(({ role, email, password }) => `  ${role.padEnd(9)}  ${email}  ${password}`),
    "",
    "One bore, fitted (the key is the demo's):",
    ...curl(url, secret).map((line) => `  ${line}`),
  ];
  writeFileSync(signInsFile(deps), `${lines.join("\n")}\n`, { mode: 0o600 });
  for (const line of lines) announce(line);
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

function curl(url: string, secret: string): string[] {
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
  return [
    `curl -s ${url}/v1/bore-fits -H 'Authorization: Bearer ${secret}' -H 'Content-Type: application/json' -d '${body}'`,
  ];
}
