import type { z } from "zod";
import {
  openEventStream,
  requestFile,
  sendRequest,
  type ServiceAnswer,
  type ServiceRequest,
} from "./send-request.ts";
import { readSession, renewSession } from "./session-store.ts";
import { NoAnswerError, ProblemError } from "./service-error.ts";

/** Renewed this long before its end, so that a call does not die on the way. */
const renewAheadMs = 15_000;

type Call = Omit<ServiceRequest, "accessToken">;

/**
 * A call in the member's name. A token about to end is renewed first; a 401 is tried once more with a new token.
 * @throws ProblemError, NoAnswerError
 */
export function callAsMember(call: Call): Promise<ServiceAnswer> {
  return asMember(call, sendRequest);
}

/**
 * A file, asked for in the member's name: a link could not carry the token.
 * @throws ProblemError, NoAnswerError
 */
export function fetchFileAsMember(call: Call): Promise<Blob> {
  return asMember(call, requestFile);
}

/**
 * A stream of events, opened in the member's name: the browser's own EventSource could not carry the token.
 * @throws ProblemError, NoAnswerError
 */
export function openStreamAsMember(call: Call): Promise<ReadableStream<Uint8Array>> {
  return asMember(call, openEventStream);
}

async function asMember<Result>(
  call: Call,
  send: (request: ServiceRequest) => Promise<Result>,
): Promise<Result> {
  const session = readSession();
  if (session.status === "open" && Date.parse(session.session.expiresAt) - Date.now() < renewAheadMs) {
    await renewSession();
  }
  try {
    return await send(withToken(call));
  } catch (error) {
    if (!(error instanceof ProblemError) || error.problem.status !== 401) throw error;
    if (!(await renewSession())) throw error;
    return send(withToken(call));
  }
}

function withToken(call: Call): ServiceRequest {
  const session = readSession();
  return session.status === "open" ? { ...call, accessToken: session.session.accessToken } : call;
}

/** The answer's body as `schema` describes it. The schema is the server's own: what does not fit is said at once. */
export function readAnswer<Schema extends z.ZodType>(schema: Schema, answer: ServiceAnswer): z.infer<Schema> {
  const parsed = schema.safeParse(answer.body);
  if (parsed.success) return parsed.data;
  throw new NoAnswerError(
    "The service answered in a form this console does not know. Reload the page to get the console of its version.",
    answer.requestId,
  );
}
