import type { Problem } from "../../../../../shared/schemas/problem.ts";
import { Button } from "../../../components/ui/button.tsx";
import { CopyButton } from "../../../components/ui/copy-button.tsx";
import { JsonDocument } from "../../../components/ui/json-document.tsx";
import { useDraftText } from "../../../lib/use-draft-text.ts";
import type { TriedCall } from "../api/send-call.ts";
import { writeCurl } from "./write-curl.ts";

interface CallFormProps {
  path: string;
  draftName: string;
  exampleText: string;
  busy: boolean;
  /** The service's refusal of the text it was sent, while that text still stands. */
  refusal: { problem: Problem; bodyText: string } | null;
  onSend: (call: TriedCall) => void;
}

export function CallForm({ path, draftName, exampleText, busy, refusal, onSend }: CallFormProps) {
  const draft = useDraftText(draftName, exampleText);
  return (
    <JsonDocument
      label="Request body, JSON"
      text={draft.text}
      onChange={draft.change}
      busy={busy}
      refusal={refusal && { problem: refusal.problem, text: refusal.bodyText }}
      onSend={(bodyText, request) => onSend({ path, bodyText, request })}
    >
      <div className="flex flex-wrap gap-2">
        <Button look="main" busy={busy} type="submit">
          Send call
        </Button>
        <CopyButton
          label="Copy as curl"
          what="the call as curl"
          text={() => writeCurl(location.origin, path, draft.text)}
        />
        {draft.isEdited && <Button onClick={draft.restore}>Restore example</Button>}
      </div>
    </JsonDocument>
  );
}
