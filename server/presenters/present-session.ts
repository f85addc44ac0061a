import type { Session as SessionBody } from "../../shared/schemas/sessions.ts";
import type { OpenSession } from "../services/sessions.ts";
import { isoTime } from "./time.ts";

export function presentSession({ accessToken, member }: OpenSession): SessionBody {
  const { id, email, name, role, organisation } = member;
  return {
    accessToken: accessToken.text,
    expiresAt: isoTime(accessToken.expiresAt),
    member: { id, email, name, role, organisation: { id: organisation.id, name: organisation.name } },
  };
}
