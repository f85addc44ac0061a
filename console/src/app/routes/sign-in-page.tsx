import { Navigate, useSearchParams } from "react-router-dom";
import { Failure } from "../../components/ui/failure.tsx";
import { PageHeading } from "../../components/ui/page-heading.tsx";
import { Skeleton } from "../../components/ui/skeleton.tsx";
import { paths } from "../../config/paths.ts";
import { useSilentSignIn } from "../../features/session/components/require-session.tsx";
import { SignInForm } from "../../features/session/components/sign-in-form.tsx";
import { useSession } from "../../lib/use-session.ts";

/** Signs a member in and leads on to where they wanted to go. */
export function SignInPage() {
  const [search] = useSearchParams();
  const session = useSession();
  const silent = useSilentSignIn();
  if (session.status === "open") return <Navigate to={ownAddress(search.get("next"))} replace />;
  const asking = session.status === "starting" && silent.error === null;
  return (
    <div className="mx-auto max-w-md py-4 md:py-12">
      <PageHeading
        title="Sign in"
        lead="Bore centres, deviations from a reference axis and shim moves, each kept as a record that can be defended."
      />
      {silent.error !== null && (
        <div className="mb-6">
          <Failure error={silent.error} what="The service does not answer." onRetry={silent.retry} />
        </div>
      )}
      {asking ? (
        <Skeleton what="your session" lines={4} />
      ) : (
        <>
          <SignInForm onSignedIn={() => undefined} />
          <p className="mt-6 text-xs text-muted">
            No sign-in yet? An administrator of your organisation makes an invitation link for you.
          </p>
        </>
      )}
    </div>
  );
}

/** An address of the console itself: a link made elsewhere must not lead a member away after signing in. */
export function ownAddress(next: string | null): string {
  if (next === null || !URL.canParse(next, location.origin)) return paths.calculations;
  const { origin, pathname, search } = new URL(next, location.origin);
  return origin === location.origin && pathname !== paths.signIn ? pathname + search : paths.calculations;
}
