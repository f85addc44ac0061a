import type { CalculationSummary } from "../../../../../shared/schemas/calculations.ts";

/** A refusal is a person's to look at, so it has the signal tone and a cross; success is the quiet case. */
export function RecordStatus({ status }: { status: CalculationSummary["status"] }) {
  if (status === "succeeded") return "succeeded";
  return (
    <span className="font-semibold text-signal">
      <span aria-hidden="true">× </span>failed
    </span>
  );
}
