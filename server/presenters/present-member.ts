import type { Member as MemberBody } from "../../shared/schemas/members.ts";
import type { Member } from "../models/member.ts";
import { isoTime, isoTimeOrNull } from "./time.ts";

export function presentMember(member: Member): MemberBody {
  return {
    id: member.id,
    email: member.email,
    name: member.name,
    role: member.role,
    status: member.disabledAt ? "disabled" : member.passwordHash ? "active" : "invited",
    createdAt: isoTime(member.createdAt),
    lastSignedInAt: isoTimeOrNull(member.lastSignedInAt),
    version: member.version,
  };
}
