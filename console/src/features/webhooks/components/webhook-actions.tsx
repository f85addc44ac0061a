import { useNavigate } from "react-router-dom";
import type { Delivery, Webhook } from "../../../../../shared/schemas/webhooks.ts";
import { AskFirst } from "../../../components/ui/ask-first.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { Dialog } from "../../../components/ui/dialog.tsx";
import { Failure } from "../../../components/ui/failure.tsx";
import { paths } from "../../../config/paths.ts";
import { useRemoveWebhook, useReplaceSecret, useSendTest, useSwitchWebhook } from "../api/change-webhooks.ts";
import { ShownSecret } from "./shown-secret.tsx";

/** How long a replaced secret still signs, unless the service is asked otherwise. */
const overlapHours = 24;

/** What may be done with one webhook. */
export function WebhookActions({ webhook }: { webhook: Webhook }) {
  const test = useSendTest(webhook.id);
  const turn = useSwitchWebhook();
  return (
    <div className="grid gap-3">
      <div className="flex flex-wrap gap-2">
        <Button look="main" busy={test.isPending} onClick={() => test.mutate(undefined)}>
          Send a test
        </Button>
        <Button busy={turn.isPending} onClick={() => turn.mutate(webhook)}>
          {webhook.active ? "Switch off" : "Switch on"}
        </Button>
        <ReplaceSecret webhook={webhook} />
        <RemoveWebhook webhook={webhook} />
      </div>
      {test.isSuccess && <p role="status">{testWords(test.data)}</p>}
      {test.isError && <Failure error={test.error} what="The test was not sent." />}
      {turn.isError && <Failure error={turn.error} what="The webhook is as it was." />}
    </div>
  );
}

function testWords({ attempts }: Delivery): string {
  const attempt = attempts.at(-1);
  if (!attempt) return "The webhook was removed meanwhile.";
  const time = `${Math.round(attempt.durationMs)} ms`;
  if (attempt.status === null)
    return `The test did not arrive: ${attempt.detail ?? "no connection"} (${time}).`;
  const arrived = attempt.status >= 200 && attempt.status <= 299;
  return `${arrived ? "The test arrived" : "The test was refused"}: answered ${attempt.status} in ${time}.`;
}

function ReplaceSecret({ webhook }: { webhook: Webhook }) {
  const replace = useReplaceSecret(webhook.id);
  if (replace.isSuccess) {
    return (
      <Dialog title="Secret replaced">
        <ShownSecret name={webhook.name} secret={replace.data.secret} onDone={replace.reset} />
      </Dialog>
    );
  }
  return (
    <AskFirst
      action="Replace secret"
      keep="Keep secret"
      look="main"
      title="Replace the signing secret?"
      change={replace}
      failed="The secret is as it was."
      onConfirm={() => replace.mutate(overlapHours)}
    >
      <p>Messages carry both signatures for {overlapHours} hours, then the new one alone.</p>
    </AskFirst>
  );
}

function RemoveWebhook({ webhook }: { webhook: Webhook }) {
  const remove = useRemoveWebhook();
  const navigate = useNavigate();
  return (
    <AskFirst
      action="Remove webhook"
      keep="Keep webhook"
      look="grave"
      title={`Remove webhook “${webhook.name}”?`}
      change={remove}
      failed="The webhook is not removed."
      onConfirm={() => remove.mutate(webhook.id, { onSuccess: () => void navigate(paths.webhooks) })}
    >
      <p>It hears nothing from this moment on, and its log goes with it. This cannot be undone.</p>
    </AskFirst>
  );
}
