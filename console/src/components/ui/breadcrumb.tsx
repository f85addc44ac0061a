import { Link } from "react-router-dom";

/** Where the page stands, from the list down. */
export function Breadcrumb({ steps }: { steps: readonly { readonly to: string; readonly words: string }[] }) {
  return (
    <nav aria-label="Breadcrumb" className="no-print mb-2 flex flex-wrap gap-x-2 text-xs text-muted">
      {steps.map(({ to, words }, index) => (
        <span key={to}>
          {index > 0 && <span aria-hidden="true">/ </span>}
          <Link className="link" to={to}>
            {words}
          </Link>
        </span>
      ))}
    </nav>
  );
}
