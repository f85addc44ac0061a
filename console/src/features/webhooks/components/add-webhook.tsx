import { useState } from "react";
import type { WebhookWithSecret } from "../../../../../shared/schemas/webhooks.ts";
import { Button } from "../../../components/ui/button.tsx";
import { Dialog } from "../../../components/ui/dialog.tsx";
import { AddWebhookForm } from "./add-webhook-form.tsx";
import { ShownSecret } from "./shown-secret.tsx";

type Stage = { name: "closed" } | { name: "form" } | { name: "shown"; made: WebhookWithSecret };

export function AddWebhook() {
  const [stage, setStage] = useState<Stage>({ name: "closed" });
  const close = (): void => setStage({ name: "closed" });
  return (
    <>
      <Button look="main" onClick={() => setStage({ name: "form" })}>
        Add webhook
      </Button>
      {stage.name === "form" && (
        <Dialog title="Add webhook" onDismiss={close}>
          <AddWebhookForm onCancel={close} onAdded={(made) => setStage({ name: "shown", made })} />
        </Dialog>
      )}
      {stage.name === "shown" && (
        // Escape does not close it: what is in it cannot be shown again.
        <Dialog title="Webhook added">
          <ShownSecret name={stage.made.name} secret={stage.made.secret} onDone={close} />
        </Dialog>
      )}
    </>
  );
}
