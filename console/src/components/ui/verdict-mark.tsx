import { drawVerdictMark, type Verdict } from "../../../../shared/figures/draw-verdict-mark.ts";
import { ShapeView } from "./shape-view.tsx";

/** A verdict as word and mark: told apart without colour, and aloud. */
export function VerdictWord({ verdict }: { verdict: Verdict }) {
  return (
    <span className="inline-flex items-center gap-2 whitespace-nowrap">
      <VerdictMark verdict={verdict} />
      <span className={verdict === "exceeds" ? "font-semibold text-signal" : undefined}>{verdict}</span>
    </span>
  );
}

/** The mark alone, beside words of the caller's own. */
export function VerdictMark({ verdict }: { verdict: Verdict }) {
  return (
    <svg
      viewBox="-2.2 -2.2 4.4 4.4"
      width="16"
      height="16"
      className="figure !w-4 flex-none"
      aria-hidden="true"
    >
      {drawVerdictMark(verdict, { x: 0, y: 0 }, 1.6).map((shape, index) => (
        <ShapeView key={index} shape={shape} />
      ))}
    </svg>
  );
}
