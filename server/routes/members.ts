import {
  createMemberRequest,
  invitedMemberSchema,
  listMembersQuery,
  memberPage,
  memberSchema,
  updateMemberRequest,
} from "../../shared/schemas/members.ts";
import { matchedVersion, versionTag } from "../http/entity-tag.ts";
import { HttpProblem } from "../http/http-problem.ts";
import { callerOf, defineOperation, reply, type Call, type Reply } from "../http/operation.ts";
import { presentMember } from "../presenters/present-member.ts";
import { inviteMember, renewInvitation, updateMember, type Invited } from "../services/members.ts";
import { readPage } from "../services/read-page.ts";

const listMembers = defineOperation({
  operationId: "listMembers",
  method: "get",
  path: "/v1/members",
  tag: "Members",
  summary: "List members",
  description: "People of the organisation, newest first.",
  query: listMembersQuery,
  response: { status: 200, description: "One page.", schema: memberPage },
  errors: ["invalid_cursor"],
  handle: async (call) => {
    const { deps, query } = call;
    const scope = { list: "members", organisationId: callerOf(call).organisation.id, filters: {} };
    const { rows, nextCursor, limit } = await readPage(deps, deps.database.models.members, scope, query);
    return reply(200, { data: rows.map(presentMember), nextCursor, limit });
  },
});

const createMember = defineOperation({
  operationId: "createMember",
  method: "post",
  path: "/v1/members",
  tag: "Members",
  summary: "Invite a member",
  description:
    "Answers a link, good once and for seven days, by which the member sets a password. It is shown this once.",
  body: createMemberRequest,
  requestExamples: () => ({
    engineer: {
      summary: "Invite an engineer",
      value: { email: "ines.alder@example.com", name: "Ines Alder", role: "engineer" },
    },
  }),
  response: { status: 201, description: "The member and the link.", schema: invitedMemberSchema },
  errors: ["email_taken", "secret_already_shown"],
  answersSecret: true,
  handle: async (call) => replyInvited(call, await inviteMember(call.deps, call.body, by(call))),
});

const renewInvitationOperation = defineOperation({
  operationId: "renewInvitation",
  method: "post",
  path: "/v1/members/{id}/invitation",
  tag: "Members",
  summary: "Make a new link for a member",
  description: "For a link that was lost, or a password that was forgotten. Links made before stop working.",
  response: { status: 201, description: "The member and the link.", schema: invitedMemberSchema },
  errors: ["secret_already_shown"],
  answersSecret: true,
  handle: async (call) =>
    replyInvited(call, await renewInvitation(call.deps, call.params.id ?? "", by(call))),
});

const readMember = defineOperation({
  operationId: "readMember",
  method: "get",
  path: "/v1/members/{id}",
  tag: "Members",
  summary: "Read a member",
  description: "Role, state and version.",
  response: { status: 200, description: "The member.", schema: memberSchema },
  errors: [],
  handle: async (call) => {
    const organisationId = callerOf(call).organisation.id;
    const row = await call.deps.database.models.members.findOne({
      where: { id: call.params.id ?? "", organisationId },
    });
    if (!row) throw new HttpProblem("not_found", "There is no member with this id.");
    return reply(200, presentMember(row), { ETag: versionTag(row.version) });
  },
});

const updateMemberOperation = defineOperation({
  operationId: "updateMember",
  method: "patch",
  path: "/v1/members/{id}",
  tag: "Members",
  summary: "Change a member",
  description: "Name, role, or whether the member may sign in. Takes effect at the member's next request.",
  body: updateMemberRequest,
  requestExamples: () => ({ role: { summary: "Make a member an administrator", value: { role: "admin" } } }),
  response: { status: 200, description: "The member, changed.", schema: memberSchema },
  errors: ["last_admin"],
  conditional: true,
  handle: async (call) => {
    const version = matchedVersion(call.request);
    const { caller, requestId } = by(call);
    const row = await updateMember(call.deps, call.params.id ?? "", version, call.body, {
      caller,
      requestId,
    });
    return reply(200, presentMember(row), { ETag: versionTag(row.version) });
  },
});

function by(call: Pick<Call, "caller" | "claim" | "requestId">) {
  return { caller: callerOf(call), claim: call.claim, requestId: call.requestId };
}

function replyInvited(
  { deps, request }: Pick<Call, "deps" | "request">,
  { member, token, expiresAt }: Invited,
): Reply {
  // The configured address where there is one: a forged Host must not lead a new member elsewhere.
  const origin = deps.config.publicUrl ?? `${request.protocol}://${request.get("Host") ?? ""}`;
  const invitation = { link: `${origin}/invitation#token=${token}`, expiresAt: expiresAt.toISOString() };
  return reply(201, { ...presentMember(member), invitation }, { Location: `/v1/members/${member.id}` });
}

export const memberOperations = [
  listMembers,
  createMember,
  renewInvitationOperation,
  readMember,
  updateMemberOperation,
];
