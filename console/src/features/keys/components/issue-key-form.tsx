import { useState } from "react";
import { scopesOfRole } from "../../../../../shared/access.ts";
import { limits } from "../../../../../shared/limits.ts";
import { createKeyRequest, type CreatedKey } from "../../../../../shared/schemas/keys.ts";
import { Button } from "../../../components/ui/button.tsx";
import { ChoiceList } from "../../../components/ui/choice-list.tsx";
import { Failure } from "../../../components/ui/failure.tsx";
import { Field } from "../../../components/ui/field.tsx";
import { TextField } from "../../../components/ui/text-field.tsx";
import { textOf, type FieldFaults } from "../../../lib/read-form.ts";
import type { Member } from "../../../lib/session-store.ts";
import { useOrderForm } from "../../../lib/use-order-form.ts";
import { useCreateKey } from "../api/create-key.ts";
import { expiryChoices, expiryDefault, expiryOf } from "./expiry.ts";
import { scopeWords } from "./scope-words.ts";

interface IssueKeyFormProps {
  role: Member["role"];
  onIssued: (key: CreatedKey) => void;
  onCancel: () => void;
}

export function IssueKeyForm({ role, onIssued, onCancel }: IssueKeyFormProps) {
  // The moment of opening, so that pressing the button twice sends one and the same order.
  const [opened] = useState(() => new Date());
  const create = useCreateKey();
  const { faults, submit } = useOrderForm({
    schema: createKeyRequest,
    read: (data) => ({
      name: textOf(data, "name"),
      scopes: data.getAll("scopes"),
      expiresAt: expiryOf(textOf(data, "expires"), opened),
    }),
    wordsFor,
    create,
    onMade: onIssued,
  });
  return (
    <form onSubmit={submit} noValidate className="grid gap-5">
      <TextField
        label="Name"
        hint="What the key is for, as “outage planning, unit 2”."
        error={faults["name"]}
        name="name"
        maxLength={limits.nameLength}
        autoFocus
      />
      <ChoiceList
        legend="What it may do"
        name="scopes"
        choices={scopesOfRole(role).map((scope) => ({
          value: scope,
          words: scopeWords[scope],
          chosen: scope.startsWith("calculations:"),
        }))}
        error={faults["scopes"]}
      />
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
