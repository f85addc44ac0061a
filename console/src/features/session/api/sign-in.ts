import type { z } from "zod";
import { sessionSchema, type createSessionRequest } from "../../../../../shared/schemas/sessions.ts";
import { apiPaths } from "../../../config/paths.ts";
import { readAnswer } from "../../../lib/call-api.ts";
import { sendRequest } from "../../../lib/send-request.ts";
import { openSession, type Member } from "../../../lib/session-store.ts";

export type Credentials = z.infer<typeof createSessionRequest>;

/** Opens a session. @throws ProblemError, NoAnswerError */
export async function signIn(credentials: Credentials, idempotencyKey: string): Promise<Member> {
  const answer = await sendRequest({
    method: "POST",
    path: apiPaths.sessions,
    bodyText: JSON.stringify(credentials),
    idempotencyKey,
  });
  const session = readAnswer(sessionSchema, answer);
  openSession(session);
  return session.member;
}
