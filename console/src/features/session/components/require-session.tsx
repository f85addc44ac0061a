import { Fragment, useEffect, useState } from "react";
import { Navigate, Outlet, useLocation } from "react-router-dom";
import { Dialog } from "../../../components/ui/dialog.tsx";
import { Failure } from "../../../components/ui/failure.tsx";
import { Skeleton } from "../../../components/ui/skeleton.tsx";
import { paths } from "../../../config/paths.ts";
import { renewSession, type Member, type SessionState } from "../../../lib/session-store.ts";
import { useSession } from "../../../lib/use-session.ts";
import { SignInForm } from "./sign-in-form.tsx";

/** The pages behind the sign-in. A session that runs out is renewed over the page, which keeps what was typed. */
export function RequireSession() {
  const session = useSession();
  const location = useLocation();
  const failure = useSilentSignIn();
  switch (session.status) {
    case "starting":
      return failure.error === null ? (
        <Skeleton what="your session" />
      ) : (
        <Failure error={failure.error} what="Your session could not be read." onRetry={failure.retry} />
      );
    case "closed":
      return <Navigate to={signInAddress(location.pathname + location.search)} replace />;
    case "lapsed":
    case "open":
      return (
        <>
          {/* Another member who signs in over the page gets it anew. */}
          <Fragment key={memberOf(session).id}>
            <Outlet />
          </Fragment>
          {session.status === "lapsed" && (
            <Dialog title="Your session has ended">
              <p className="mb-4 text-muted">Sign in to go on. This page keeps what you typed.</p>
              <SignInForm email={session.member.email} onSignedIn={() => undefined} />
            </Dialog>
          )}
        </>
      );
  }
}

function memberOf(session: Extract<SessionState, { status: "open" | "lapsed" }>): Member {
  return session.status === "open" ? session.session.member : session.member;
}

export function signInAddress(next: string): string {
  return next === "/" ? paths.signIn : `${paths.signIn}?next=${encodeURIComponent(next)}`;
}

/** At the first page of a visit the cookie may still hold a session. */
export function useSilentSignIn(): { error: unknown; retry: () => void } {
  const session = useSession();
  const [error, setError] = useState<unknown>(null);
  const [tries, setTries] = useState(0);
  const starting = session.status === "starting";
  useEffect(() => {
    if (!starting) return;
    renewSession().catch(setError);
  }, [starting, tries]);
  const retry = (): void => {
    setError(null);
    setTries((count) => count + 1);
  };
  return { error, retry };
}
