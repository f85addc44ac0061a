import { randomUUID } from "node:crypto";
import { roles, type Role, type Scope } from "../../shared/access.ts";
import type { Deps } from "../../server/deps.ts";
import type { Member } from "../../server/models/member.ts";
import type { Organisation } from "../../server/models/organisation.ts";
import type { Caller } from "../../server/services/caller.ts";
import { issueKey } from "../../server/services/issue-key.ts";
import { startSession } from "../../server/services/sessions.ts";

export interface TestOrganisation {
  readonly id: string;
  readonly members: Readonly<Record<Role, Member>>;
  /** An access token of the member of each role. */
  readonly tokens: Readonly<Record<Role, string>>;
  key(...scopes: Scope[]): Promise<{ id: string; secret: string }>;
  /** A new access token, for a test that has moved the clock past the first. */
  session(role: Role): Promise<string>;
}

/** A fresh organisation with a signed-in member of each role: every test brings its own. */
export async function makeOrganisation(deps: Deps): Promise<TestOrganisation> {
  const { models } = deps.database;
  const id = deps.newId();
  const name = `Works ${id.slice(-6)}`;
  await models.organisations.create({ id, name, createdAt: deps.now() });
  const members = {} as Record<Role, Member>;
  const tokens = {} as Record<Role, string>;
  for (const role of roles) {
    const made = await models.members.create({
      id: deps.newId(),
      organisationId: id,
      email: `${role}-${randomUUID()}@example.com`,
      name: `The ${role}`,
      role,
      createdAt: deps.now(),
    });
    const member = (await models.members.findByPk(made.id, { include: "organisation" })) as Member & {
      organisation: Organisation;
    };
    members[role] = member;
    tokens[role] = (await startSession(deps, member, "test")).accessToken.text;
  }
  const { admin } = members;
  const caller: Caller = {
    by: "member",
    organisation: { id, name },
    member: { id: admin.id, name: admin.name, email: admin.email, role: "admin" },
    sessionId: "",
  };
  return {
    id,
    members,
    tokens,
    session: async (role) => {
      const member = members[role] as Member & { organisation: Organisation };
      return (await startSession(deps, member, "test")).accessToken.text;
    },
    key: async (...scopes) => {
      const { row, secret } = await issueKey(
        deps,
        { name: "Test", scopes },
        { caller, claim: null, requestId: "test" },
      );
      return { id: row.id, secret };
    },
  };
}

/** Four wall points of a bore, 180 mm in radius, whose centre lies at (0.1, 0.05). */
export const smallBoreFit = {
  units: { axial: "mm", bore: "mm", offset: "mm" },
  seen: "downstream",
  bores: [
    {
      id: "brg-1",
      form: "points",
      points: [
        { h: 0.1, v: 180.05 },
        { h: 180.1, v: 0.05 },
        { h: 0.1, v: -179.95 },
        { h: -179.9, v: 0.05 },
      ],
    },
  ],
} as const;
