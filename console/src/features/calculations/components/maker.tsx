import type { CalculationSummary } from "../../../../../shared/schemas/calculations.ts";

/** Who had it computed: a member by name, or a key by name and prefix. */
export function Maker({ record }: { record: Pick<CalculationSummary, "member" | "key"> }) {
  if (record.key) {
    return (
      <span className="break-words">
        key {record.key.name}
        <span className="block text-xs break-all text-muted">{record.key.prefix}…</span>
      </span>
    );
  }
  return <span className="break-words">{record.member?.name ?? "not known"}</span>;
}
