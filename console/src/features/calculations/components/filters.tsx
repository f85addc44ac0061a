import type { SubmitEvent } from "react";
import { calculationKinds } from "../../../../../shared/schemas/calculations.ts";
import { Button, ButtonLink } from "../../../components/ui/button.tsx";
import { Field } from "../../../components/ui/field.tsx";
import { computations, paths } from "../../../config/paths.ts";
import { textOf } from "../../../lib/read-form.ts";
import { filterNames } from "../api/list-calculations.ts";

interface FiltersProps {
  search: URLSearchParams;
  /** Keys to choose from; empty for who may not read them. */
  keys: readonly { id: string; name: string }[];
  onApply: (search: URLSearchParams) => void;
}

/** What is asked for stands in the address: it can be kept, sent on, and gone back to. */
export function Filters({ search, keys, onApply }: FiltersProps) {
  const submit = (event: SubmitEvent<HTMLFormElement>): void => {
    event.preventDefault();
    const data = new FormData(event.currentTarget);
    const chosen = filterNames.map((name) => [name, textOf(data, name).trim()] as const);
    onApply(new URLSearchParams(chosen.filter(([, value]) => value !== "").map((pair) => [...pair])));
  };
  const chosen = (name: string): string => search.get(name) ?? "";
  const filtered = filterNames.some((name) => search.has(name));
  return (
    <form
      // A new address fills the form anew: the back button brings its filters back too.
      key={search.toString()}
      onSubmit={submit}
      role="search"
      aria-label="Filter calculations"
      className="no-print mb-6 grid grid-cols-2 items-end gap-3 border-y border-hair py-4 sm:grid-cols-4 xl:grid-cols-[repeat(6,minmax(0,1fr))_auto]"
    >
      <Choice label="Kind" name="kind" value={chosen("kind")} options={kindOptions} />
      <Choice label="Status" name="status" value={chosen("status")} options={statusOptions} />
      {keys.length > 0 && (
        <Choice
          label="Key"
          name="keyId"
          value={chosen("keyId")}
          options={keys.map((key) => ({ value: key.id, words: key.name }))}
        />
      )}
      <Field label="From day">
        {(attributes) => (
          <input {...attributes} type="date" name="from" defaultValue={chosen("from")} className="control" />
        )}
      </Field>
      <Field label="To day">
        {(attributes) => (
          <input {...attributes} type="date" name="to" defaultValue={chosen("to")} className="control" />
        )}
      </Field>
      <Field label="Note or id">
        {(attributes) => (
          <input
            {...attributes}
            type="search"
            name="q"
            maxLength={100}
            defaultValue={chosen("q")}
            className="control"
          />
        )}
      </Field>
      <div className="col-span-2 flex flex-wrap gap-2 sm:col-span-4 xl:col-span-1">
        <Button type="submit" className="min-h-10">
          Apply filters
        </Button>
        {filtered && (
          <ButtonLink to={paths.calculations} className="min-h-10">
            Clear
          </ButtonLink>
        )}
      </div>
    </form>
  );
}

const kindOptions = calculationKinds.map((kind) => ({ value: kind, words: computations[kind].name }));
const statusOptions = [
  { value: "succeeded", words: "succeeded" },
  { value: "failed", words: "failed" },
];

interface ChoiceProps {
  label: string;
  name: string;
  value: string;
  options: readonly { value: string; words: string }[];
}

function Choice({ label, name, value, options }: ChoiceProps) {
  const known = value === "" || options.some((option) => option.value === value);
  return (
    <Field label={label}>
      {(attributes) => (
        <select {...attributes} name={name} defaultValue={value} className="control">
          <option value="">any</option>
          {!known && <option value={value}>{value}</option>}
          {options.map((option) => (
            <option key={option.value} value={option.value}>
              {option.words}
            </option>
          ))}
        </select>
      )}
    </Field>
  );
}
