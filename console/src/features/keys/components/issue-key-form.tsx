import { useState, type SubmitEvent } from "react";
import { scopesOfRole } from "../../../../../shared/access.ts";
import { limits } from "../../../../../shared/limits.ts";
import { createKeyRequest, type CreatedKey } from "../../../../../shared/schemas/keys.ts";
import { Button } from "../../../components/ui/button.tsx";
import { Failure } from "../../../components/ui/failure.tsx";
import { Field } from "../../../components/ui/field.tsx";
import { checkForm, faultsOfProblem, textOf, type FieldFaults } from "../../../lib/read-form.ts";
import type { Member } from "../../../lib/session-store.ts";
import { useCreateKey } from "../api/create-key.ts";
import { expiryChoices, expiryDefault, expiryOf } from "./expiry.ts";
import { scopeWords } from "./scope-words.ts";

interface IssueKeyFormProps {
  role: Member["role"];
  onIssued: (key: CreatedKey) => void;
  onCancel: () => void;
}

export function IssueKeyForm({ role, onIssued, onCancel }: IssueKeyFormProps) {
  const [faults, setFaults] = useState<FieldFaults>({});
  // The moment of opening, so that pressing the button twice sends one and the same order.
  const [opened] = useState(() => new Date());
  const create = useCreateKey();
  const submit = (event: SubmitEvent<HTMLFormElement>): void => {
    event.preventDefault();
    if (create.isPending) return;
    const data = new FormData(event.currentTarget);
    const checked = checkForm(createKeyRequest, {
      name: textOf(data, "name"),
      scopes: data.getAll("scopes"),
      expiresAt: expiryOf(textOf(data, "expires"), opened),
    });
    setFaults(wordsFor(checked.faults ?? {}));
    if (checked.values === null) return;
    create.mutate(checked.values, {
      onSuccess: onIssued,
      onError: (error) => setFaults(faultsOfProblem(error)),
    });
  };
  return (
    <form onSubmit={submit} noValidate className="grid gap-5">
      <Field label="Name" hint="What the key is for, as “outage planning, unit 2”." error={faults["name"]}>
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
      <fieldset aria-describedby={faults["scopes"] ? "scopes-error" : undefined}>
        <legend className="field-name mb-1">What it may do</legend>
        <div className="border border-hair">
          {scopesOfRole(role).map((scope) => (
            <label
              key={scope}
              className="flex cursor-pointer items-baseline gap-3 border-b border-hair px-3 py-1.5 last:border-b-0 hover:bg-well"
            >
              <input
                type="checkbox"
                name="scopes"
                value={scope}
                defaultChecked={scope.startsWith("calculations:")}
                className="accent-ink"
              />
              <span className="min-w-0">
                {scopeWords[scope]}
                <span className="block text-xs text-muted">{scope}</span>
              </span>
            </label>
          ))}
        </div>
        {faults["scopes"] !== undefined && (
          <p id="scopes-error" className="mt-1 text-xs text-signal">
            {faults["scopes"]}
          </p>
        )}
      </fieldset>
      <Field label="Expires after" error={faults["expiresAt"]}>
        {(attributes) => (
          <select {...attributes} name="expires" defaultValue={expiryDefault} className="control">
            {expiryChoices.map((choice) => (
              <option key={choice.value} value={choice.value}>
                {choice.words}
              </option>
            ))}
          </select>
        )}
      </Field>
      {create.isError && <Failure error={create.error} what="The key was not issued." />}
      <div className="flex flex-wrap justify-end gap-2">
        <Button onClick={onCancel}>Cancel</Button>
        <Button type="submit" look="main" busy={create.isPending}>
          Issue key
        </Button>
      </div>
    </form>
  );
}

function wordsFor(faults: FieldFaults): FieldFaults {
  return {
    ...("name" in faults ? { name: `A name of 1 to ${limits.nameLength} characters is needed.` } : {}),
    ...("scopes" in faults ? { scopes: "Choose at least one." } : {}),
    ...("expiresAt" in faults ? { expiresAt: "Choose one of the times." } : {}),
  };
}
