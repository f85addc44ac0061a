import { useMutation, useQueryClient } from "@tanstack/react-query";
import { Link, useLocation, useNavigate } from "react-router-dom";
import { Failure } from "../../../components/ui/failure.tsx";
import { paths } from "../../../config/paths.ts";
import { useMember, useSession } from "../../../lib/use-session.ts";
import { signOut } from "../api/sign-out.ts";
import { signInAddress } from "./require-session.tsx";

/** Who is signed in, for whom, as what; and the way out. */
export function SessionStrip() {
  const member = useMember();
  const queryClient = useQueryClient();
  const navigate = useNavigate();
  const mutation = useMutation({
    mutationFn: signOut,
    onSuccess: async () => {
      queryClient.clear();
      await navigate(paths.signIn);
    },
  });
  if (!member) return <WayIn />;
  const who = `${member.name}, ${member.role}`;
  return (
    <div className="header-session">
      <p className="min-w-0">
        <span className="field-name block truncate" title={member.organisation.name}>
          {member.organisation.name}
        </span>
        <span className="block truncate" title={who}>
          {who}
        </span>
      </p>
      <button
        type="button"
        className="link flex-none cursor-pointer py-1 disabled:opacity-50"
        disabled={mutation.isPending}
        onClick={() => mutation.mutate()}
      >
        Sign out
      </button>
      {mutation.isError && <Failure error={mutation.error} what="You are still signed in." />}
    </div>
  );
}

/** To the sign-in from a page that can be read without it, and back. */
function WayIn() {
  const session = useSession();
  const { pathname } = useLocation();
  if (session.status !== "closed" || !pathname.startsWith(paths.guide)) return null;
  return (
    <Link className="link ml-auto" to={signInAddress(pathname)}>
      Sign in
    </Link>
  );
}
