import type { FigureTable } from "../../../../../shared/figures/figure-table.ts";
import { NumberTable } from "../../../components/ui/number-table.tsx";

/** Short tables side by side, in order; those that are null are left out. */
export function Tables({ tables }: { tables: readonly (FigureTable | null)[] }) {
  const shown = tables.filter((table) => table !== null);
  if (shown.length === 0) return null;
  return (
    <div className="sheet-flow">
      {shown.map((table) => (
        <NumberTable key={table.caption} table={table} />
      ))}
    </div>
  );
}
