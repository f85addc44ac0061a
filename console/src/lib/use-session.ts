import { useSyncExternalStore } from "react";
import { scopesOfRole, type Scope } from "../../../shared/access.ts";
import { readSession, watchSession, type Member, type SessionState } from "./session-store.ts";

export function useSession(): SessionState {
  return useSyncExternalStore(watchSession, readSession);
}

/** The signed-in member; while a lapsed session waits to be renewed, the member it belonged to. */
export function useMember(): Member | null {
  const session = useSession();
  if (session.status === "open") return session.session.member;
  return session.status === "lapsed" ? session.member : null;
}

/** Whether the member's role may do what needs `scope`. The service decides; this only spares a refusal. */
export function useMay(scope: Scope): boolean {
  const member = useMember();
  return member !== null && scopesOfRole(member.role).includes(scope);
}
