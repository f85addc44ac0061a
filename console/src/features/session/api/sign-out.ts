import { apiPaths } from "../../../config/paths.ts";
import { callAsMember } from "../../../lib/call-api.ts";
import { forgetDrafts } from "../../../lib/drafts.ts";
import { ProblemError } from "../../../lib/service-error.ts";
import { closeSession } from "../../../lib/session-store.ts";

/**
 * Ends the session at the service, then here. When the service cannot be reached the session stays open and the
 * member is told: the cookie would otherwise sign the next reader of this browser in.
 * @throws ProblemError, NoAnswerError
 */
export async function signOut(): Promise<void> {
  try {
    await callAsMember({ method: "DELETE", path: apiPaths.currentSession });
  } catch (error) {
    // Ended already: what was asked for.
    if (!(error instanceof ProblemError) || error.problem.status !== 401) throw error;
  }
  forgetDrafts();
  closeSession();
}
