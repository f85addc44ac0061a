import { useEffect, useRef } from "react";
import { useLocation } from "react-router-dom";

/** Puts focus on the new page's heading when the page changes, unless the page has put it somewhere itself. */
export function useFocusOnArrival(): void {
  const { pathname } = useLocation();
  const last = useRef(pathname);
  useEffect(() => {
    if (last.current === pathname) return;
    last.current = pathname;
    const heading = document.querySelector<HTMLElement>("main h1");
    if (heading && !heading.closest("main")?.contains(document.activeElement)) {
      heading.focus({ preventScroll: true });
    }
  }, [pathname]);
}
