import type { ReactNode } from "react";

/** Nothing is here yet, and what to do next. */
export function Empty({ title, children }: { title: string; children: ReactNode }) {
  return (
    <div className="border border-hair px-6 py-12 text-center">
      <EmptyMark />
      <p className="mt-4 font-semibold">{title}</p>
      <div className="mx-auto mt-1 max-w-prose text-muted">{children}</div>
    </div>
  );
}

/** A centre without a bore. */
function EmptyMark() {
  return (
    <svg viewBox="0 0 48 48" width="48" height="48" className="mx-auto" fill="none" aria-hidden="true">
      <circle cx="24" cy="24" r="14" stroke="var(--color-rule)" strokeDasharray="4 3" />
      <path d="M24 2v44M2 24h44" stroke="var(--color-rule)" strokeDasharray="10 2 2 2" />
    </svg>
  );
}
