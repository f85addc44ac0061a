import { useDeferredValue, useId, useRef, type RefObject } from "react";
import { lineAndColumn, type Place } from "../../lib/json-text.ts";

interface JsonEditorProps {
  label: string;
  text: string;
  /** Stretches of the text that are at fault. */
  faults: readonly Place[];
  describedBy?: string | undefined;
  onChange: (text: string) => void;
  /** Ctrl+Enter. */
  onSend: () => void;
  editor: RefObject<HTMLTextAreaElement | null>;
}

/** Larger texts are edited without marks in them: the list of faults still leads to each. */
const markedUpTo = 200_000;

/** A text field over a copy of its text, in which faults are underlined; line numbers run beside it. */
export function JsonEditor({ label, text, faults, describedBy, onChange, onSend, editor }: JsonEditorProps) {
  const id = useId();
  const under = useRef<HTMLPreElement>(null);
  const numbers = useRef<HTMLPreElement>(null);
  const shown = useDeferredValue(text);
  const follow = (area: HTMLTextAreaElement): void => {
    if (under.current) {
      under.current.scrollTop = area.scrollTop;
      under.current.scrollLeft = area.scrollLeft;
    }
    if (numbers.current) numbers.current.scrollTop = area.scrollTop;
  };
  const faultyLines = new Set(faults.map((fault) => lineAndColumn(shown, fault.from).line));
  const lineCount = shown.split("\n").length;
  return (
    <div className="min-w-0">
      <label htmlFor={id} className="field-name mb-1 block">
        {label}
      </label>
      <div className="json-editor" data-faulty={faults.length > 0}>
        <pre ref={numbers} aria-hidden="true" className="json-editor-numbers">
          {Array.from({ length: lineCount }, (_, index) => (
            <span key={index} data-faulty={faultyLines.has(index + 1) || undefined}>
              {index + 1}
            </span>
          ))}
        </pre>
        <div className="json-editor-text">
          <pre ref={under} aria-hidden="true" className="json-editor-marks">
            {shown.length <= markedUpTo ? <Marked text={shown} faults={faults} /> : null}
          </pre>
          <textarea
            ref={editor}
            id={id}
            value={text}
            rows={22}
            spellCheck={false}
            autoCapitalize="off"
            autoComplete="off"
            wrap="off"
            aria-invalid={faults.length > 0}
            aria-describedby={describedBy}
            onChange={(event) => onChange(event.target.value)}
            onScroll={(event) => follow(event.currentTarget)}
            onKeyDown={(event) => {
              if (event.key !== "Enter" || !(event.ctrlKey || event.metaKey)) return;
              event.preventDefault();
              onSend();
            }}
          />
        </div>
      </div>
    </div>
  );
}

function Marked({ text, faults }: { text: string; faults: readonly Place[] }) {
  const pieces: React.ReactNode[] = [];
  let from = 0;
  for (const fault of withoutOverlap(faults)) {
    pieces.push(
      text.slice(from, fault.from),
      <mark key={fault.from}>{text.slice(fault.from, fault.to)}</mark>,
    );
    from = fault.to;
  }
  // The line break keeps the last line as high as the field's own when it is empty.
  return [...pieces, text.slice(from), "\n"];
}

function withoutOverlap(faults: readonly Place[]): Place[] {
  const kept: Place[] = [];
  for (const fault of [...faults].sort((a, b) => a.from - b.from)) {
    if (fault.from >= (kept.at(-1)?.to ?? 0)) kept.push(fault);
  }
  return kept;
}
