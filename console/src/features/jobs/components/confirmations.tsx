import { computedSurveys } from "../../../../../shared/figures/job/compared-surveys.ts";
import { jobConfirmationRequest } from "../../../../../shared/schemas/job-entries.ts";
import type { JobRecord } from "../../../../../shared/schemas/jobs.ts";
import { Disclosure } from "../../../components/ui/disclosure.tsx";
import { Instant } from "../../../components/ui/instant.tsx";
import { SectionHeading } from "../../../components/ui/section-heading.tsx";
import { SelectField } from "../../../components/ui/select-field.tsx";
import { TextField } from "../../../components/ui/text-field.tsx";
import { textOf } from "../../../lib/read-form.ts";
import { ConfirmationResult } from "../../results/components/confirmation-result.tsx";
import { EntryForm } from "./entry-form.tsx";
import { authorName } from "./job-words.ts";

/** Whether the moves did what they should and nothing else. */
export function Confirmations({ record, mayAct }: { record: JobRecord; mayAct: boolean }) {
  const computed = computedSurveys(record);
  const choices = computed.map(({ survey, name }) => ({ value: survey.id, words: name }));
  const nameOf = (id: string): string => choices.find(({ value }) => value === id)?.words ?? "a survey";
  const newestFirst = record.confirmations.toReversed();
  const { axial, bore, offset } = record.machine.units;
  return (
    <section id="confirmation" aria-label="Confirmation" className="sheet-stack">
      <SectionHeading>Confirmation</SectionHeading>
      {newestFirst.length === 0 && <p className="text-muted">No survey has been confirmed.</p>}
      {newestFirst.map((confirmation) => (
        <div key={confirmation.id} className="sheet-stack">
          <p className="text-xs text-muted">
            {nameOf(confirmation.after)} against {nameOf(confirmation.before)}, by{" "}
            {authorName(confirmation.author)} <Instant at={confirmation.createdAt} />
          </p>
          {!confirmation.current && (
            <p className="font-semibold text-signal">
              A survey of the two was computed again since, or its readings have changed. Confirm again.
            </p>
          )}
          <ConfirmationResult request={{ units: { axial, bore, offset } }} result={confirmation.result} />
        </div>
      ))}
      {mayAct && choices.length > 1 && (
        <Disclosure title="Confirm a survey against an earlier one">
          <EntryForm
            job={record.id}
            part="confirmations"
            schema={jobConfirmationRequest}
            read={(data) => ({
              before: textOf(data, "before"),
              after: textOf(data, "after"),
              ...(textOf(data, "note").trim() === "" ? {} : { note: textOf(data, "note").trim() }),
            })}
            fields={["/before", "/after", "/note"]}
            button="Confirm survey"
            failed="The survey was not confirmed."
          >
            {(fault) => (
              <div className="grid gap-4 sm:grid-cols-2">
                <SelectField
                  label="Before"
                  name="before"
                  options={choices}
                  defaultValue={choices[0]?.value ?? ""}
                  error={fault("/before")}
                />
                <SelectField
                  label="After"
                  name="after"
                  options={choices}
                  defaultValue={choices.at(-1)?.value ?? ""}
                  error={fault("/after")}
                />
                <TextField label="Note" name="note" error={fault("/note")} />
              </div>
            )}
          </EntryForm>
        </Disclosure>
      )}
    </section>
  );
}
