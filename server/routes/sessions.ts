import {
  acceptInvitationRequest,
  callerSchema,
  createSessionRequest,
  sessionSchema,
} from "../../shared/schemas/sessions.ts";
import { scopesOfRole } from "../../shared/access.ts";
import { memberSchema } from "../../shared/schemas/members.ts";
import { HttpProblem } from "../http/http-problem.ts";
import { callerOf, defineOperation, reply } from "../http/operation.ts";
import { readRefreshCookie, refreshCookie } from "../http/refresh-cookie.ts";
import { callText, idempotencyKeyOf } from "../http/run-operation.ts";
import { presentMember } from "../presenters/present-member.ts";
import { presentSession } from "../presenters/present-session.ts";
import { Claim, openClaim } from "../services/idempotency.ts";
import { acceptInvitation } from "../services/members.ts";
import { checkPassword, endSession, refreshSession, startSession } from "../services/sessions.ts";

const createSession = defineOperation({
  operationId: "createSession",
  method: "post",
  path: "/v1/sessions",
  tag: "Sign-in",
  summary: "Sign in",
  description: "Answers an access token good for minutes and sets the cookie that renews it.",
  body: createSessionRequest,
  requestExamples: () => ({
    signIn: {
      summary: "Sign in",
      value: { email: "ines.alder@example.com", password: "a long and private sentence" },
    },
  }),
  response: { status: 201, description: "Signed in.", schema: sessionSchema },
  errors: ["sign_in_refused", "secret_already_shown"],
  answersSecret: true,
  limit: "sign-in",
  handle: async (call) => {
    const { deps, requestId } = call;
    const member = await checkPassword(deps, call.body.email, call.body.password, requestId);
    // Only now is it known whose Idempotency-Key this is.
    const key = idempotencyKeyOf(call.request);
    const scope = { organisationId: member.organisationId, credentialId: member.id };
    const claim = key === null ? null : await openClaim(deps, { ...scope, key, call: callText(call) });
    if (claim && !(claim instanceof Claim)) return claim;
    const open = await startSession(deps, member, requestId, async (sessionId, transaction) => {
      await claim?.settle({ status: 201, resourceId: sessionId }, transaction);
    });
    return reply(201, presentSession(open), { "Set-Cookie": refreshCookie(deps.config, open.refresh ?? "") });
  },
});

const refreshSessionOperation = defineOperation({
  operationId: "refreshSession",
  method: "post",
  path: "/v1/sessions/refresh",
  tag: "Sign-in",
  summary: "Renew the access token",
  description:
    "Takes the cookie of the sign-in and sets a new one. Two tabs that renew at the same moment both stay signed in.",
  response: { status: 200, description: "A fresh access token.", schema: sessionSchema },
  errors: ["session_expired", "origin_refused"],
  handle: async (call) => {
    const { config } = call.deps;
    const refresh = readRefreshCookie(config, call.request);
    if (refresh === null) throw new HttpProblem("session_expired", "You are not signed in.");
    const open = await refreshSession(call.deps, refresh, call.requestId);
    const cookie: Record<string, string> =
      open.refresh === null ? {} : { "Set-Cookie": refreshCookie(config, open.refresh) };
    return reply(200, presentSession(open), cookie);
  },
});

const endSessionOperation = defineOperation({
  operationId: "endSession",
  method: "delete",
  path: "/v1/sessions/current",
  tag: "Sign-in",
  summary: "Sign out",
  description: "Ends this session: its tokens are refused from now on.",
  response: { status: 204, description: "Signed out." },
  errors: [],
  handle: async (call) => {
    const caller = callerOf(call);
    if (caller.by === "member") await endSession(call.deps, caller.sessionId, call.requestId);
    return reply(204, undefined, {
      "Set-Cookie": refreshCookie(call.deps.config, ""),
      "Clear-Site-Data": '"cache"',
    });
  },
});

const readCaller = defineOperation({
  operationId: "readCaller",
  method: "get",
  path: "/v1/me",
  tag: "Sign-in",
  summary: "Read who you are",
  description: "The member or key that the credential speaks for, and what it may do.",
  response: { status: 200, description: "The caller.", schema: callerSchema },
  errors: [],
  handle: (call) => {
    const caller = callerOf(call);
    const { organisation } = caller;
    if (caller.by === "key")
      return reply(200, { member: null, key: caller.key, organisation, scopes: caller.scopes });
    const scopes = scopesOfRole(caller.member.role);
    return reply(200, { member: { ...caller.member, organisation }, key: null, organisation, scopes });
  },
});

const acceptInvitationOperation = defineOperation({
  operationId: "acceptInvitation",
  method: "post",
  path: "/v1/invitations/accept",
  tag: "Sign-in",
  summary: "Accept an invitation",
  description:
    "Uses a one-time link: sets the password. Sign in afterwards. Opening the link alone uses nothing up.",
  body: acceptInvitationRequest,
  requestExamples: () => ({
    accept: {
      summary: "Set a password",
      value: { token: "the text after #token= in the link", password: "a long and private sentence" },
    },
  }),
  response: { status: 200, description: "The member can sign in.", schema: memberSchema },
  errors: ["invitation_invalid", "password_weak"],
  limit: "sign-in",
  handle: async (call) =>
    reply(200, presentMember(await acceptInvitation(call.deps, call.body, call.requestId))),
});

export const sessionOperations = [
  createSession,
  refreshSessionOperation,
  endSessionOperation,
  readCaller,
  acceptInvitationOperation,
];
