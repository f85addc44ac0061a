import { limits } from "../../../../../shared/limits.ts";
import { surveyRequest } from "../../../../../shared/schemas/job-entries.ts";
import type { JobRecord } from "../../../../../shared/schemas/jobs.ts";
import { SelectField } from "../../../components/ui/select-field.tsx";
import { TextField } from "../../../components/ui/text-field.tsx";
import { readDecimal } from "../../../lib/read-decimal.ts";
import { textOf } from "../../../lib/read-form.ts";
import { EntryForm } from "./entry-form.tsx";
import { stageChoices } from "./job-words.ts";

export function OpenSurvey({ record }: { record: JobRecord }) {
  const instruments = record.details.instruments ?? [];
  const isFirst = record.surveys.length === 0;
  return (
    <EntryForm
      job={record.id}
      part="surveys"
      schema={surveyRequest}
      read={surveyFrom}
      fields={["/stage", "/label", "/sameSetUp", "/instrument", "/conditions"]}
      button="Open survey"
      failed="The survey was not opened."
    >
      {(fault) => (
        <div className="grid gap-4 sm:grid-cols-2">
          <SelectField
            label="Stage"
            name="stage"
            options={stageChoices}
            defaultValue={isFirst ? "as_found" : "as_left"}
            error={fault("/stage")}
          />
          <TextField label="Label" name="label" maxLength={limits.nameLength} error={fault("/label")} />
          <SelectField
            label="Set-up"
            name="setUp"
            options={[
              { value: "own", words: "set up anew" },
              ...(isFirst ? [] : [{ value: "same", words: "as in the survey before" }]),
            ]}
            hint="Whether the instrument stands as it did."
            error={fault("/sameSetUp")}
          />
          <SelectField
            label="Instrument"
            name="instrument"
            options={[
              { value: "", words: "not stated" },
              ...instruments.map(({ id, description }) => ({ value: id, words: `${id}, ${description}` })),
            ]}
            defaultValue={instruments[0]?.id ?? ""}
            error={fault("/instrument")}
          />
          <TextField
            label="Air temperature"
            name="ambient"
            inputMode="decimal"
            error={fault("/conditions/ambient")}
          />
          <SelectField
            label="Temperature unit"
            name="temperatureUnit"
            options={[
              { value: "C", words: "°C" },
              { value: "F", words: "°F" },
            ]}
          />
        </div>
      )}
    </EntryForm>
  );
}

function surveyFrom(data: FormData): unknown {
  const ambient = readDecimal(textOf(data, "ambient"));
  const [label, instrument] = [textOf(data, "label").trim(), textOf(data, "instrument")];
  return {
    stage: textOf(data, "stage"),
    sameSetUp: textOf(data, "setUp") === "same",
    ...(label === "" ? {} : { label }),
    ...(instrument === "" ? {} : { instrument }),
    ...(ambient === null
      ? {}
      : { conditions: { temperatureUnit: textOf(data, "temperatureUnit"), ambient } }),
  };
}
