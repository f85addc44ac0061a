import type { ReactNode } from "react";

export function SectionHeading({ children, aside }: { children: ReactNode; aside?: ReactNode }) {
  return (
    <div className="mb-3 flex flex-wrap items-center justify-between gap-x-6 gap-y-2 border-b border-ink pb-1">
      <h2 className="font-semibold">{children}</h2>
      {aside}
    </div>
  );
}
