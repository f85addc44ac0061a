import { Link } from "react-router-dom";
import { ThemeChoice } from "../../../components/ui/theme-choice.tsx";
import { paths, serverPaths } from "../../../config/paths.ts";
import { useMember } from "../../../lib/use-session.ts";
import { useMeta } from "../api/get-meta.ts";

/** Which engine answers here, where it is documented, and how the page looks. */
export function ServiceLine() {
  const meta = useMeta();
  const member = useMember();
  return (
    <div className="no-print flex flex-wrap items-center gap-x-6 gap-y-2 border-t border-hair pt-3 text-xs text-muted">
      <Link className="link" to={paths.guide}>
        Guide
      </Link>
      <a className="link" href={serverPaths.docs}>
        API documents
      </a>
      <a className="link" href={serverPaths.document}>
        openapi.json
      </a>
      {meta.isSuccess && (
        <span>
          engine {meta.data.engineVersion}
          {member && (
            <>
              {", "}
              <Link className="link" to={paths.selfTest}>
                self-test
              </Link>
            </>
          )}
        </span>
      )}
      <span className="ml-auto">
        <ThemeChoice />
      </span>
    </div>
  );
}
