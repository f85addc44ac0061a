/** A bore, its shaft and its centre lines, and the name. */
export function Wordmark() {
  return (
    <span className="inline-flex items-center gap-2.5 text-base font-semibold">
      <svg viewBox="0 0 32 32" width="26" height="26" fill="none" aria-hidden="true">
        <circle cx="16" cy="16" r="10.5" stroke="currentColor" strokeWidth="2" />
        <circle cx="16" cy="16" r="4.5" stroke="currentColor" strokeWidth="2" />
        <path
          d="M16 1v30M1 16h30"
          stroke="var(--color-signal)"
          strokeWidth="1.5"
          strokeDasharray="7 2 2 2"
          strokeDashoffset="-1"
        />
      </svg>
      Borewright
    </span>
  );
}
