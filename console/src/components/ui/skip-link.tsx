/** The first stop of the Tab key: past the header, into the page. */
export function SkipLink({ to }: { to: string }) {
  return (
    <a
      href={`#${to}`}
      className="no-print sr-only z-10 bg-ink px-3 py-2 text-sheet focus:not-sr-only focus:absolute focus:top-2 focus:left-2"
      onClick={(event) => {
        // The address keeps the page's own state; only focus moves.
        event.preventDefault();
        const target = document.getElementById(to);
        target?.focus();
        target?.scrollIntoView();
      }}
    >
      Skip to the page
    </a>
  );
}
