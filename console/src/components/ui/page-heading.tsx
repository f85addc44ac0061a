import type { ReactNode } from "react";

/** The page's name, what it is for, and what can be done on it. */
export function PageHeading({
  title,
  lead,
  children,
}: {
  title: string;
  lead?: ReactNode;
  children?: ReactNode;
}) {
  return (
    <div className="mb-6 flex flex-wrap items-end justify-between gap-x-8 gap-y-4">
      <title>{`${title} · Borewright`}</title>
      <div className="max-w-prose min-w-0">
        {/* Focus comes here when the address changes, so that the new page is heard from its top. */}
        <h1 tabIndex={-1} className="text-xl leading-snug font-semibold">
          {title}
        </h1>
        {lead !== undefined && <p className="mt-1 text-pretty text-muted">{lead}</p>}
      </div>
      {children !== undefined && <div className="flex flex-wrap gap-2">{children}</div>}
    </div>
  );
}
