import { Outlet } from "react-router-dom";
import { useSilentSignIn } from "./require-session.tsx";

/** Pages that need no sign-in: shown at once, while the session of an earlier visit is asked for beside them. */
export function SessionIfAny() {
  useSilentSignIn();
  return <Outlet />;
}
