import { ThemeChoice } from "../../../components/ui/theme-choice.tsx";
import { serverPaths } from "../../../config/paths.ts";
import { useMeta } from "../api/get-meta.ts";

/** Which engine answers here, where it is documented, and how the page looks. */
export function ServiceLine() {
  const meta = useMeta();
  return (
    <div className="no-print flex flex-wrap items-center gap-x-6 gap-y-2 border-t border-hair pt-3 text-xs text-muted">
      <a className="link" href={serverPaths.docs}>
        API documents
      </a>
      <a className="link" href={serverPaths.document}>
        openapi.json
      </a>
      {meta.isSuccess && <span>engine {meta.data.engineVersion}</span>}
      <span className="ml-auto">
        <ThemeChoice />
      </span>
    </div>
  );
}
