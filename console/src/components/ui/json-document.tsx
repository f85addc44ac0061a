import { useDeferredValue, useEffect, useId, useMemo, useRef, type ReactNode, type SubmitEvent } from "react";
import type { Problem } from "../../../../shared/schemas/problem.ts";
import { lineAndColumn, parseJsonText, placeOfPointer, type Place } from "../../lib/json-text.ts";
import { FaultList } from "./fault-list.tsx";
import { JsonEditor } from "./json-editor.tsx";

interface JsonDocumentProps {
  label: string;
  text: string;
  onChange: (text: string) => void;
  busy: boolean;
  /** The service's refusal of a text, shown while that text still stands. Pointers are into the text. */
  refusal: { readonly problem: Pick<Problem, "errors" | "more">; readonly text: string } | null;
  /** With a text that is JSON; another one is shown its fault. */
  onSend: (text: string, value: unknown) => void;
  /** What stands under the text: the button that submits, and others. */
  children: ReactNode;
}

/** A JSON text to write, with the faults of form and those of the service at their places in it. */
export function JsonDocument({ label, text, onChange, busy, refusal, onSend, children }: JsonDocumentProps) {
  const editor = useRef<HTMLTextAreaElement>(null);
  const faultsId = useId();
  const deferredText = useDeferredValue(text);
  const parsed = useMemo(() => parseJsonText(deferredText), [deferredText]);
  const faults = useMemo(() => {
    const standing = refusal !== null && refusal.text === deferredText ? (refusal.problem.errors ?? []) : [];
    return parsed.ok
      ? standing.map((fault) => ({ fault, place: placeOfPointer(parsed.places, fault.pointer ?? "") }))
      : [];
  }, [refusal, deferredText, parsed]);
  const marks = parsed.ok
    ? faults.flatMap(({ place }) => (place === null ? [] : [narrowed(deferredText, place)]))
    : [{ from: parsed.fault.at, to: parsed.fault.at + 1 }];
  useEffect(() => {
    // A refusal brings its first fault into view; focus stays where the writer has it.
    const first = faults[0]?.place;
    if (first) scrollTo(editor.current, lineAndColumn(deferredText, first.from).line);
  }, [faults, deferredText]);
  const go = (place: Place): void => {
    editor.current?.focus();
    editor.current?.setSelectionRange(place.from, place.to);
    scrollTo(editor.current, lineAndColumn(text, place.from).line);
  };
  const send = (): void => {
    const now = parseJsonText(text);
    if (busy) return;
    if (now.ok) onSend(text, now.value);
    else go({ from: now.fault.at, to: now.fault.at + 1 });
  };
  const submit = (event: SubmitEvent<HTMLFormElement>): void => {
    event.preventDefault();
    send();
  };
  return (
    <form onSubmit={submit} noValidate className="grid gap-4">
      <JsonEditor
        label={label}
        text={text}
        faults={marks}
        describedBy={faultsId}
        onChange={onChange}
        onSend={send}
        editor={editor}
      />
      <div id={faultsId} role="status" className="text-sm">
        {!parsed.ok && (
          <SyntaxFault text={deferredText} at={parsed.fault.at} detail={parsed.fault.detail} go={go} />
        )}
        {faults.length > 0 && (
          <FaultList
            faults={faults.map(({ fault }) => fault)}
            more={refusal?.problem.more}
            placeOf={(fault) => {
              const place = faults.find((known) => known.fault === fault)?.place ?? null;
              if (place === null) return null;
              return { words: `line ${lineAndColumn(deferredText, place.from).line}`, go: () => go(place) };
            }}
          />
        )}
      </div>
      {children}
    </form>
  );
}

function SyntaxFault({
  text,
  at,
  detail,
  go,
}: {
  text: string;
  at: number;
  detail: string;
  go: (place: Place) => void;
}) {
  const { line, column } = lineAndColumn(text, at);
  return (
    <p className="text-signal">
      <button type="button" className="link cursor-pointer" onClick={() => go({ from: at, to: at + 1 })}>
        Line {line}, column {column}
      </button>
      : {detail}.
    </p>
  );
}

/** A fault in a whole object is marked on its first line only: what is wrong is what it is or lacks, not all it holds. */
function narrowed(text: string, place: Place): Place {
  const lineEnd = text.indexOf("\n", place.from);
  return { from: place.from, to: lineEnd === -1 ? place.to : Math.min(place.to, lineEnd) };
}

function scrollTo(area: HTMLTextAreaElement | null, line: number): void {
  if (!area) return;
  const lineHeight = area.scrollHeight / area.value.split("\n").length;
  area.scrollTop = Math.max(0, (line - 5) * lineHeight);
}
