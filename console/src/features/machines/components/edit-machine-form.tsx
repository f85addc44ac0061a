import { useState } from "react";
import { useNavigate } from "react-router-dom";
import { limits } from "../../../../../shared/limits.ts";
import type { Machine } from "../../../../../shared/schemas/machines.ts";
import { Button } from "../../../components/ui/button.tsx";
import { Failure } from "../../../components/ui/failure.tsx";
import { JsonDocument } from "../../../components/ui/json-document.tsx";
import { TextField } from "../../../components/ui/text-field.tsx";
import { apiPaths, paths } from "../../../config/paths.ts";
import { ProblemError } from "../../../lib/service-error.ts";
import { useDraftText } from "../../../lib/use-draft-text.ts";
import { writeJson } from "../../../lib/write-json.ts";
import { useChangeMachine } from "../api/change-machine.ts";
import { ChangedMeanwhile } from "./changed-meanwhile.tsx";
import { useEditBase } from "./use-edit-base.ts";

/**
 * The machine's document as text, with the reason of the change. What was typed is kept for this tab with the revision
 * it was begun from, so that somebody else's change in between is never written over unseen.
 */
export function EditMachineForm({ machine }: { machine: Machine }) {
  const navigate = useNavigate();
  const { base, adopt, forget } = useEditBase(machine);
  const draft = useDraftText(`machine.${machine.id}.document`, writeJson(base.document));
  const reason = useDraftText(`machine.${machine.id}.reason`, "");
  const [needsReason, setNeedsReason] = useState(false);
  const [sent, setSent] = useState("");
  const change = useChangeMachine();
  const problem = change.error instanceof ProblemError ? change.error.problem : null;
  const isStale = problem?.code === "version_stale" || (draft.isEdited && machine.version !== base.version);
  const save = (text: string): void => {
    setNeedsReason(reason.text.trim() === "");
    if (reason.text.trim() === "") return;
    setSent(text);
    change.mutate(
      {
        path: `${apiPaths.machine(machine.id)}/revisions`,
        // As it was typed, so that the service sees every digit and the faults stand where the text has them.
        bodyText: `{"document":${text},"reason":${JSON.stringify(reason.text.trim())}}`,
        version: base.version,
      },
      {
        onSuccess: () => {
          forget();
          draft.restore();
          reason.restore();
          void navigate(paths.machine(machine.id));
        },
      },
    );
  };
  const reasonFault = needsReason
    ? "This is needed."
    : problem?.errors?.find(({ pointer }) => pointer === "/reason")?.detail;
  return (
    <div className="grid gap-5">
      {isStale && machine.version !== base.version && (
        <ChangedMeanwhile machine={machine} base={base} onAdopt={adopt} />
      )}
      <JsonDocument
        label={`Document, begun from revision ${base.revision}, JSON`}
        text={draft.text}
        onChange={draft.change}
        busy={change.isPending}
        refusal={problem && { problem: withinDocument(problem), text: sent }}
        onSend={save}
      >
        <TextField
          label="Reason"
          value={reason.text}
          maxLength={limits.noteLength}
          hint="Why it changed: kept with the revision."
          error={reasonFault}
          onChange={(event) => {
            setNeedsReason(false);
            reason.change(event.target.value);
          }}
        />
        {change.isError && <Failure error={change.error} what="The machine was not changed." />}
        <div className="flex flex-wrap gap-2">
          <Button look="main" busy={change.isPending} type="submit">
            Store as a new revision
          </Button>
          {draft.isEdited && (
            <Button
              onClick={() => {
                draft.restore();
                adopt();
              }}
            >
              Put back the newest
            </Button>
          )}
        </div>
      </JsonDocument>
    </div>
  );
}

/** Faults of the document, by their places in it. */
function withinDocument(problem: ProblemError["problem"]): Pick<ProblemError["problem"], "errors" | "more"> {
  const errors = (problem.errors ?? []).flatMap((fault) =>
    (fault.pointer ?? "").startsWith("/document")
      ? [{ ...fault, pointer: (fault.pointer ?? "").slice("/document".length) }]
      : [],
  );
  return { errors, ...(problem.more === undefined ? {} : { more: problem.more }) };
}
