import type { IndicationAnswer } from "../../../../../shared/schemas/indications.ts";
import type { Verdict } from "../../../../../shared/figures/draw-verdict-mark.ts";
import { VerdictMark } from "../../../components/ui/verdict-mark.tsx";
import type { MoveView } from "./move-view.ts";

type Stop = IndicationAnswer["stop"][number];

/** What each reason asks for, in a word before the reason itself; told apart by mark and word, not by colour. */
const asks: Record<Stop["code"], { readonly word: string; readonly mark: Verdict }> = {
  neighbour_passed: { word: "Stop", mark: "exceeds" },
  gone_past: { word: "Stop", mark: "exceeds" },
  readings_disagree: { word: "Stop and check", mark: "undecided" },
  move_complete: { word: "Complete", mark: "conforms" },
};

/** Why to stop now. It changes seldom, and is read out when it does; the figures beside it are not. */
export function StopReasons({ view: { latest, stops, answers } }: { view: MoveView }) {
  const isGrave = stops.some(({ code }) => asks[code].mark !== "conforms");
  return (
    <div
      role="status"
      aria-label="Whether to stop"
      className={`border border-l-4 px-4 py-3 ${isGrave ? "border-signal" : "border-rule"}`}
    >
      {stops.length === 0 ? (
        <p>{answers.length === 0 ? "No reading of this component yet." : quietWords(latest)}</p>
      ) : (
        <ul className="grid gap-1">
          {stops.map(({ code, detail, station, support }) => (
            <li key={`${code} ${station} ${support}`} className="flex flex-wrap items-center gap-x-2">
              <span className="inline-flex items-center gap-2 font-semibold">
                <VerdictMark verdict={asks[code].mark} />
                {asks[code].word}:
              </span>
              <span className="min-w-0 break-words">{detail}</span>
              <span className="text-xs break-all text-muted">{code}</span>
            </li>
          ))}
        </ul>
      )}
    </div>
  );
}

function quietWords(latest: IndicationAnswer | null): string {
  if (latest === null) return "Only neighbours were read so far: none has passed its limit.";
  return latest.done === null
    ? "Nothing in these readings says stop. They do not tell all that is left."
    : "Nothing in these readings says stop.";
}
