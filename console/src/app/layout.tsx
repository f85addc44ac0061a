import { Link, Outlet, ScrollRestoration } from "react-router-dom";
import { SheetZones } from "../components/ui/sheet-zones.tsx";
import { SkipLink } from "../components/ui/skip-link.tsx";
import { Wordmark } from "../components/ui/wordmark.tsx";
import { paths } from "../config/paths.ts";
import { Cautions } from "../features/meta/components/cautions.tsx";
import { ServiceLine } from "../features/meta/components/service-line.tsx";
import { SessionStrip } from "../features/session/components/session-strip.tsx";
import { Navigation } from "./navigation.tsx";
import { useFocusOnArrival } from "./use-focus-on-arrival.ts";

const mainId = "main";

/** The sheet that every page is drawn on: who is signed in and where one can go above, the cautions below. */
export function Layout() {
  useFocusOnArrival();
  return (
    <div className="sheet-margin">
      <SkipLink to={mainId} />
      <SheetZones />
      <div className="sheet-frame">
        <header className="sheet-header no-print">
          <Link to={paths.calculations} className="py-1">
            <Wordmark />
          </Link>
          <Navigation />
          <SessionStrip />
        </header>
        <main id={mainId} tabIndex={-1} className="min-w-0 flex-1 px-4 py-6 outline-none md:px-8 md:py-8">
          <Outlet />
        </main>
        <footer className="grid gap-4 border-t border-ink px-4 py-4 md:px-8">
          <Cautions />
          <ServiceLine />
        </footer>
      </div>
      <ScrollRestoration />
    </div>
  );
}
