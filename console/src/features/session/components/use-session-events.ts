import type { QueryClient } from "@tanstack/react-query";
import { useEffect } from "react";
import { claimDrafts } from "../../../lib/drafts.ts";
import {
  closeSession,
  readSession,
  renewSession,
  restartSession,
  watchSession,
  type SessionState,
} from "../../../lib/session-store.ts";
import { hearOtherTabs, type TabMessage } from "../../../lib/tabs.ts";

/** Answers and drafts of one member are never shown to the next, and this tab follows what the others do. */
export function useSessionEvents(queryClient: QueryClient): void {
  useEffect(() => {
    let last = memberIdOf(readSession());
    const stopWatching = watchSession(() => {
      const memberId = memberIdOf(readSession());
      if (memberId === last) return;
      if (last !== null) queryClient.clear();
      if (memberId !== null) claimDrafts(memberId);
      last = memberId;
    });
    const stopHearing = hearOtherTabs(follow);
    return () => {
      stopWatching();
      stopHearing();
    };
  }, [queryClient]);
}

function memberIdOf(session: SessionState): string | null {
  if (session.status === "open") return session.session.member.id;
  return session.status === "lapsed" ? session.member.id : null;
}

function follow(message: TabMessage): void {
  const session = readSession();
  if (message.type === "closed") {
    if (session.status !== "closed") closeSession(false);
    return;
  }
  if (memberIdOf(session) !== message.memberId) restartSession();
  // The cookie is good again; when it cannot be asked for, the sign-in over the page stays.
  else if (session.status === "lapsed") renewSession().catch(() => undefined);
}
