export interface PlacedWarning {
  /** The bore, station or support it belongs to; null for the whole. */
  readonly where: string | null;
  readonly code: string;
  readonly detail: string;
}

/** What a person must know before using the numbers. */
export function Warnings({ warnings }: { warnings: readonly PlacedWarning[] }) {
  if (warnings.length === 0) return null;
  return (
    <section aria-label="Warnings" className="keep-together border-l-4 border-signal pl-4">
      <h3 className="font-semibold text-signal">
        {warnings.length} {warnings.length === 1 ? "warning" : "warnings"}
      </h3>
      <ul className="mt-1 grid gap-1">
        {warnings.map((warning, index) => (
          <li key={index} className="max-w-prose">
            {warning.where !== null && <span className="font-semibold">{warning.where}: </span>}
            {warning.detail} <span className="text-xs text-muted">{warning.code}</span>
          </li>
        ))}
      </ul>
    </section>
  );
}
