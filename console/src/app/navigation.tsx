import { NavLink } from "react-router-dom";
import { joinClasses } from "../components/ui/join-classes.ts";
import { paths, serverPaths } from "../config/paths.ts";
import { useMay, useMember } from "../lib/use-session.ts";

const look = "block border-b-2 py-1";

/** The pages that the member's role can use, the guide, and the documents, which the server serves itself. */
export function Navigation() {
  const member = useMember();
  const mayCompute = useMay("calculations:write");
  const mayReadKeys = useMay("keys:read");
  const mayReadWebhooks = useMay("webhooks:read");
  const mayReadOutbox = useMay("outbox:read");
  return (
    <nav aria-label="Main" className="header-pages">
      <ul>
        {member && <PageLink to={paths.jobs}>Jobs</PageLink>}
        {member && <PageLink to={paths.machines}>Machines</PageLink>}
        {member && <PageLink to={paths.calculations}>Calculations</PageLink>}
        {mayCompute && <PageLink to={paths.tryCall}>Try a call</PageLink>}
        {mayReadKeys && <PageLink to={paths.keys}>Keys</PageLink>}
        {mayReadWebhooks && <PageLink to={paths.webhooks}>Webhooks</PageLink>}
        {mayReadOutbox && <PageLink to={paths.outbox}>Outbox</PageLink>}
        <PageLink to={paths.guide}>Guide</PageLink>
        {/* On a narrow screen the footer's link has to do. */}
        <li className="max-sm:hidden">
          <a href={serverPaths.docs} className={joinClasses(look, "border-transparent hover:border-rule")}>
            Documents
          </a>
        </li>
      </ul>
    </nav>
  );
}

function PageLink({ to, children }: { to: string; children: string }) {
  return (
    <li>
      <NavLink
        to={to}
        className={({ isActive }) =>
          joinClasses(look, isActive ? "border-ink font-semibold" : "border-transparent hover:border-rule")
        }
      >
        {children}
      </NavLink>
    </li>
  );
}
