import { sessionSchema, type Session } from "../../../shared/schemas/sessions.ts";
import { apiPaths } from "../config/paths.ts";
import { sendRequest } from "./send-request.ts";
import { ProblemError } from "./service-error.ts";
import { inOneTabAtATime, tellOtherTabs } from "./tabs.ts";

export type Member = Session["member"];

export type SessionState =
  /** Not asked yet whether the browser holds a session. */
  | { readonly status: "starting" }
  | { readonly status: "open"; readonly session: Session }
  /** It ran out under an open page: what was typed there is kept until the member signs in again. */
  | { readonly status: "lapsed"; readonly member: Member }
  | { readonly status: "closed" };

/** The access token lives in this variable and nowhere else: no storage, no other tab. */
let state: SessionState = { status: "starting" };
const listeners = new Set<() => void>();

export function readSession(): SessionState {
  return state;
}

export function watchSession(listener: () => void): () => void {
  listeners.add(listener);
  return () => listeners.delete(listener);
}

export function openSession(session: Session, tell = true): void {
  setState({ status: "open", session });
  if (tell) tellOtherTabs({ type: "opened", memberId: session.member.id });
}

export function closeSession(tell = true): void {
  setState({ status: "closed" });
  if (tell) tellOtherTabs({ type: "closed" });
}

/** Back to the state before the first question. */
export function restartSession(): void {
  setState({ status: "starting" });
}

let renewal: Promise<boolean> | null = null;

/**
 * Asks for a new access token through the httpOnly cookie; callers at the same moment share one question, in this tab
 * and across tabs. Answers whether a session is open after it.
 * @throws NoAnswerError or ProblemError when the service could not say
 */
export function renewSession(): Promise<boolean> {
  renewal ??= inOneTabAtATime(askForSession).finally(() => {
    renewal = null;
  });
  return renewal;
}

async function askForSession(): Promise<boolean> {
  try {
    const answer = await sendRequest({ method: "POST", path: apiPaths.refresh });
    openSession(sessionSchema.parse(answer.body), false);
    return true;
  } catch (error) {
    if (!(error instanceof ProblemError) || error.problem.status !== 401) throw error;
    lapse();
    return false;
  }
}

function lapse(): void {
  if (state.status === "open") setState({ status: "lapsed", member: state.session.member });
  else if (state.status === "starting") setState({ status: "closed" });
}

function setState(next: SessionState): void {
  state = next;
  for (const listener of listeners) listener();
}
