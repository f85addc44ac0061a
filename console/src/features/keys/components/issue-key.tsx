import { useState } from "react";
import type { CreatedKey as Created } from "../../../../../shared/schemas/keys.ts";
import { Button } from "../../../components/ui/button.tsx";
import { Dialog } from "../../../components/ui/dialog.tsx";
import type { Member } from "../../../lib/session-store.ts";
import { CreatedKey } from "./created-key.tsx";
import { IssueKeyForm } from "./issue-key-form.tsx";

type Stage = { name: "closed" } | { name: "form" } | { name: "shown"; created: Created };

export function IssueKey({ role }: { role: Member["role"] }) {
  const [stage, setStage] = useState<Stage>({ name: "closed" });
  const close = (): void => setStage({ name: "closed" });
  return (
    <>
      <Button look="main" onClick={() => setStage({ name: "form" })}>
        Issue key
      </Button>
      {stage.name === "form" && (
        <Dialog title="Issue key" onDismiss={close}>
          <IssueKeyForm
            role={role}
            onCancel={close}
            onIssued={(created) => setStage({ name: "shown", created })}
          />
        </Dialog>
      )}
      {stage.name === "shown" && (
        // Escape does not close it: what is in it cannot be shown again.
        <Dialog title="Key issued">
          <CreatedKey created={stage.created} onDone={close} />
        </Dialog>
      )}
    </>
  );
}
