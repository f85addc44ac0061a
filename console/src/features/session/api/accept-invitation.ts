import type { z } from "zod";
import type { acceptInvitationRequest } from "../../../../../shared/schemas/sessions.ts";
import { apiPaths } from "../../../config/paths.ts";
import { sendRequest } from "../../../lib/send-request.ts";

export type Acceptance = z.infer<typeof acceptInvitationRequest>;

/** Uses the invitation up and sets the password. @throws ProblemError, NoAnswerError */
export async function acceptInvitation(acceptance: Acceptance, idempotencyKey: string): Promise<void> {
  await sendRequest({
    method: "POST",
    path: apiPaths.acceptInvitation,
    bodyText: JSON.stringify(acceptance),
    idempotencyKey,
  });
}
