import { useState } from "react";
import { useNavigate } from "react-router-dom";
import { Button } from "../../../components/ui/button.tsx";
import { Failure } from "../../../components/ui/failure.tsx";
import { Field } from "../../../components/ui/field.tsx";
import { JsonDocument } from "../../../components/ui/json-document.tsx";
import { apiPaths, paths } from "../../../config/paths.ts";
import { ProblemError } from "../../../lib/service-error.ts";
import { useDraftText } from "../../../lib/use-draft-text.ts";
import { useChangeMachine } from "../api/change-machine.ts";
import { useMachineExamples } from "../api/get-machine-examples.ts";

/** A machine from a JSON file, from the example, or typed. Kept for this tab until the service has taken it. */
export function NewMachineForm() {
  const navigate = useNavigate();
  const examples = useMachineExamples();
  const draft = useDraftText("machine.new", "");
  const [unreadable, setUnreadable] = useState<string>();
  const [sent, setSent] = useState("");
  const change = useChangeMachine();
  const problem = change.error instanceof ProblemError ? change.error.problem : null;
  const load = async (file: File | undefined): Promise<void> => {
    if (!file) return;
    try {
      draft.change(await file.text());
      setUnreadable(undefined);
    } catch {
      setUnreadable("The file could not be read.");
    }
  };
  const example = examples.data?.[0];
  return (
    <div className="grid gap-5">
      <div className="flex flex-wrap items-end gap-4">
        <Field label="JSON file" error={unreadable}>
          {(attributes) => (
            <input
              {...attributes}
              type="file"
              accept=".json,application/json"
              className="control"
              onChange={(event) => void load(event.target.files?.[0])}
            />
          )}
        </Field>
        {example && (
          <Button className="min-h-10" onClick={() => draft.change(example.text)}>
            Put in the example
          </Button>
        )}
      </div>
      <JsonDocument
        label="Machine, JSON"
        text={draft.text}
        onChange={draft.change}
        busy={change.isPending}
        refusal={problem && { problem, text: sent }}
        onSend={(text) => {
          setSent(text);
          change.mutate(
            { path: apiPaths.machines, bodyText: text },
            {
              onSuccess: ({ id }) => {
                draft.restore();
                void navigate(paths.machine(id));
              },
            },
          );
        }}
      >
        {change.isError && <Failure error={change.error} what="The machine was not stored." />}
        <div className="flex flex-wrap gap-2">
          <Button look="main" busy={change.isPending} type="submit">
            Store machine
          </Button>
          {draft.isEdited && <Button onClick={draft.restore}>Clear</Button>}
        </div>
      </JsonDocument>
    </div>
  );
}
