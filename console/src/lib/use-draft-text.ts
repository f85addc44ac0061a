import { useState } from "react";
import { readDraft, writeDraft } from "./drafts.ts";

/** A text begun from another and kept for this tab as soon as it differs from it. */
export function useDraftText(name: string, beginning: string) {
  const [edited, setEdited] = useState<{ name: string; text: string | null }>(() => ({
    name,
    text: readDraft(name),
  }));
  // Another name has a draft of its own.
  const current = edited.name === name ? edited : { name, text: readDraft(name) };
  if (current !== edited) setEdited(current);
  const change = (text: string | null): void => {
    const kept = text === beginning ? null : text;
    writeDraft(name, kept);
    setEdited({ name, text: kept });
  };
  return {
    text: current.text ?? beginning,
    isEdited: current.text !== null,
    change: (text: string): void => change(text),
    restore: (): void => change(null),
  };
}
