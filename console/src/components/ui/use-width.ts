import { useLayoutEffect, useRef, useState, type RefObject } from "react";

/** The width an element is laid out at, in pixels; null until it is known. */
export function useWidth<E extends HTMLElement>(): [RefObject<E | null>, number | null] {
  const ref = useRef<E>(null);
  const [width, setWidth] = useState<number | null>(null);
  useLayoutEffect(() => {
    const element = ref.current;
    if (!element || typeof ResizeObserver === "undefined") return;
    setWidth(element.clientWidth || null);
    const observer = new ResizeObserver(() => setWidth(element.clientWidth || null));
    observer.observe(element);
    return () => observer.disconnect();
  }, []);
  return [ref, width];
}
