import { useState } from "react";
import { readDraft, writeDraft } from "../../../lib/drafts.ts";

/** The text of a call, begun from an example and kept for this tab as soon as it differs from it. */
export function useCallText(name: string, exampleText: string) {
  const [edited, setEdited] = useState<{ name: string; text: string | null }>(() => ({
    name,
    text: readDraft(name),
  }));
  // Another endpoint or example has a draft of its own.
  const current = edited.name === name ? edited : { name, text: readDraft(name) };
  if (current !== edited) setEdited(current);
  const change = (text: string | null): void => {
    const kept = text === exampleText ? null : text;
    writeDraft(name, kept);
    setEdited({ name, text: kept });
  };
  return {
    text: current.text ?? exampleText,
    isEdited: current.text !== null,
    change: (text: string): void => change(text),
    restore: (): void => change(null),
  };
}
