import { Link } from "react-router-dom";

interface PagerProps {
  /** Addresses; null where there is no such page. */
  newest: string | null;
  older: string | null;
}

/** Keyset pages lead onward and back to the start; the browser's own back button leads to the page before. */
export function Pager({ newest, older }: PagerProps) {
  if (newest === null && older === null) return null;
  return (
    <nav aria-label="Pages" className="no-print mt-4 flex justify-between gap-4">
      {newest === null ? (
        <span />
      ) : (
        <Link className="link py-2" to={newest}>
          Newest
        </Link>
      )}
      {older !== null && (
        <Link className="link py-2" to={older}>
          Older
        </Link>
      )}
    </nav>
  );
}
