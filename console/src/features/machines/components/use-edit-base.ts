import { useState } from "react";
import { z } from "zod";
import { machineDocument, type Machine } from "../../../../../shared/schemas/machines.ts";
import { readDraft, writeDraft } from "../../../lib/drafts.ts";

const baseSchema = z.object({ version: z.number(), revision: z.number(), document: machineDocument });
/** What an edit was begun from. */
export type EditBase = z.infer<typeof baseSchema>;

/** The revision that an edit was begun from, kept beside its draft as long as that is. */
export function useEditBase(machine: Machine) {
  const name = `machine.${machine.id}.base`;
  const newest: EditBase = {
    version: machine.version,
    revision: machine.revision,
    document: machine.document,
  };
  const [base, setBase] = useState<EditBase>(() => {
    const kept = readBase(readDraft(name));
    const begun = kept !== null && readDraft(`machine.${machine.id}.document`) !== null ? kept : newest;
    writeDraft(name, JSON.stringify(begun));
    return begun;
  });
  return {
    base,
    /** Goes on from the newest revision, knowing what it changed. */
    adopt: (): void => {
      writeDraft(name, JSON.stringify(newest));
      setBase(newest);
    },
    forget: (): void => writeDraft(name, null),
  };
}

function readBase(text: string | null): EditBase | null {
  if (text === null) return null;
  const parsed = baseSchema.safeParse(JSON.parse(text));
  return parsed.success ? parsed.data : null;
}
