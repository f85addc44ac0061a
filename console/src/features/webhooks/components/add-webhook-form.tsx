import { limits } from "../../../../../shared/limits.ts";
import {
  createWebhookRequest,
  webhookEvents,
  type WebhookWithSecret,
} from "../../../../../shared/schemas/webhooks.ts";
import { Button } from "../../../components/ui/button.tsx";
import { ChoiceList } from "../../../components/ui/choice-list.tsx";
import { Failure } from "../../../components/ui/failure.tsx";
import { TextField } from "../../../components/ui/text-field.tsx";
import { textOf, type FieldFaults } from "../../../lib/read-form.ts";
import { useOrderForm } from "../../../lib/use-order-form.ts";
import { useCreateWebhook } from "../api/change-webhooks.ts";
import { eventWords } from "./event-words.ts";

interface AddWebhookFormProps {
  onAdded: (made: WebhookWithSecret) => void;
  onCancel: () => void;
}

export function AddWebhookForm({ onAdded, onCancel }: AddWebhookFormProps) {
  const create = useCreateWebhook();
  const { faults, submit } = useOrderForm({
    schema: createWebhookRequest,
    read: (data) => ({
      name: textOf(data, "name"),
      url: textOf(data, "url"),
      events: data.getAll("events"),
    }),
    wordsFor,
    create,
    onMade: onAdded,
  });
  return (
    <form onSubmit={submit} noValidate className="grid gap-5">
      <TextField
        label="Name"
        hint="What listens there, as “outage planner”."
        error={faults["name"]}
        name="name"
        maxLength={limits.nameLength}
        autoFocus
      />
      <TextField
        label="Address"
        hint="https, reachable over the public network."
        error={faults["url"]}
        name="url"
        type="url"
        maxLength={limits.webhookUrlLength}
        spellCheck={false}
      />
      <ChoiceList
        legend="What it is told"
        name="events"
        choices={webhookEvents.map((event) => ({ value: event, words: eventWords[event] }))}
        error={faults["events"]}
      />
      {create.isError && <Failure error={create.error} what="The webhook was not added." />}
      <div className="flex flex-wrap justify-end gap-2">
        <Button onClick={onCancel}>Cancel</Button>
        <Button type="submit" look="main" busy={create.isPending}>
          Add webhook
        </Button>
      </div>
    </form>
  );
}

function wordsFor(faults: FieldFaults): FieldFaults {
  return {
    ...("name" in faults ? { name: `A name of 1 to ${limits.nameLength} characters is needed.` } : {}),
    ...("url" in faults ? { url: "An address such as https://hooks.example.com/borewright is needed." } : {}),
    ...("events" in faults ? { events: "Choose at least one." } : {}),
  };
}
