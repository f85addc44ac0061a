import { useState, type SubmitEvent } from "react";
import { limits } from "../../../../../shared/limits.ts";
import {
  createWebhookRequest,
  webhookEvents,
  type WebhookWithSecret,
} from "../../../../../shared/schemas/webhooks.ts";
import { Button } from "../../../components/ui/button.tsx";
import { Failure } from "../../../components/ui/failure.tsx";
import { Field } from "../../../components/ui/field.tsx";
import { checkForm, faultsOfProblem, textOf, type FieldFaults } from "../../../lib/read-form.ts";
import { useCreateWebhook } from "../api/change-webhooks.ts";
import { eventWords } from "./event-words.ts";

interface AddWebhookFormProps {
  onAdded: (made: WebhookWithSecret) => void;
  onCancel: () => void;
}

export function AddWebhookForm({ onAdded, onCancel }: AddWebhookFormProps) {
  const [faults, setFaults] = useState<FieldFaults>({});
  const create = useCreateWebhook();
  const submit = (event: SubmitEvent<HTMLFormElement>): void => {
    event.preventDefault();
    if (create.isPending) return;
    const data = new FormData(event.currentTarget);
    const checked = checkForm(createWebhookRequest, {
      name: textOf(data, "name"),
      url: textOf(data, "url"),
      events: data.getAll("events"),
    });
    setFaults(wordsFor(checked.faults ?? {}));
    if (checked.values === null) return;
    create.mutate(checked.values, {
      onSuccess: onAdded,
      onError: (error) => setFaults(faultsOfProblem(error)),
    });
  };
  return (
    <form onSubmit={submit} noValidate className="grid gap-5">
      <Field label="Name" hint="What listens there, as “outage planner”." error={faults["name"]}>
        {(attributes) => (
          <input
            {...attributes}
            name="name"
            className="control"
            maxLength={limits.nameLength}
            autoComplete="off"
            autoFocus
          />
        )}
      </Field>
      <Field label="Address" hint="https, reachable over the public network." error={faults["url"]}>
        {(attributes) => (
          <input
            {...attributes}
            name="url"
            type="url"
            className="control"
            maxLength={limits.webhookUrlLength}
            autoComplete="off"
            spellCheck={false}
          />
        )}
      </Field>
      <fieldset aria-describedby={faults["events"] ? "events-error" : undefined}>
        <legend className="field-name mb-1">What it is told</legend>
        <div className="border border-hair">
          {webhookEvents.map((event) => (
            <label
              key={event}
              className="flex cursor-pointer items-baseline gap-3 border-b border-hair px-3 py-1.5 last:border-b-0 hover:bg-well"
            >
              <input type="checkbox" name="events" value={event} className="accent-ink" />
              <span className="min-w-0">
                {eventWords[event]}
                <span className="block text-xs text-muted">{event}</span>
              </span>
            </label>
          ))}
        </div>
        {faults["events"] !== undefined && (
          <p id="events-error" className="mt-1 text-xs text-signal">
            {faults["events"]}
          </p>
        )}
      </fieldset>
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
