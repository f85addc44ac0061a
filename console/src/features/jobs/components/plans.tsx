import { computedSurveys } from "../../../../../shared/figures/job/compared-surveys.ts";
import { planRequest } from "../../../../../shared/schemas/job-entries.ts";
import type { JobRecord } from "../../../../../shared/schemas/jobs.ts";
import { Disclosure } from "../../../components/ui/disclosure.tsx";
import { Instant } from "../../../components/ui/instant.tsx";
import { SectionHeading } from "../../../components/ui/section-heading.tsx";
import { SelectField } from "../../../components/ui/select-field.tsx";
import { TextField } from "../../../components/ui/text-field.tsx";
import { textOf } from "../../../lib/read-form.ts";
import { MoveSheet } from "../../results/components/move-sheet.tsx";
import { EntryForm } from "./entry-form.tsx";
import { authorName } from "./job-words.ts";
import { moveCallOf } from "./move-call-of.ts";

type Plan = JobRecord["plans"][number];

/** The newest plan as the sheet a crew works from; earlier ones behind it. */
export function Plans({ record, mayAct }: { record: JobRecord; mayAct: boolean }) {
  const [newest, ...earlier] = record.plans.toReversed();
  const computed = computedSurveys(record);
  return (
    <section id="plan" aria-label="Plan" className="sheet-stack">
      <SectionHeading>Plan</SectionHeading>
      {newest ? (
        <PlanSheet record={record} plan={newest} />
      ) : (
        <p className="text-muted">No moves are planned.</p>
      )}
      {earlier.map((plan) => (
        <Disclosure key={plan.id} title={`Earlier plan, of ${plan.createdAt.slice(0, 10)}`}>
          <PlanSheet record={record} plan={plan} />
        </Disclosure>
      ))}
      {mayAct && computed.length > 0 && (
        <Disclosure title="Plan moves">
          <EntryForm
            job={record.id}
            part="plans"
            schema={planRequest}
            read={planFrom}
            fields={["/survey", "/objective", "/note"]}
            button="Plan moves"
            failed="No plan was made."
          >
            {(fault) => (
              <div className="grid gap-4 sm:grid-cols-2">
                <SelectField
                  label="From the survey"
                  name="survey"
                  options={computed.map(({ survey, name }) => ({ value: survey.id, words: name }))}
                  defaultValue={computed.at(-1)?.survey.id ?? ""}
                  error={fault("/survey")}
                />
                <SelectField
                  label="Make least"
                  name="objective"
                  options={[
                    { value: "", words: "as the job says" },
                    { value: "least_squares", words: "the squares of all deviations" },
                    { value: "minimax", words: "the largest deviation" },
                  ]}
                  error={fault("/objective")}
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

function planFrom(data: FormData): unknown {
  const [objective, note] = [textOf(data, "objective"), textOf(data, "note").trim()];
  return {
    survey: textOf(data, "survey"),
    ...(objective === "" ? {} : { objective }),
    ...(note === "" ? {} : { note }),
  };
}

function PlanSheet({ record, plan }: { record: JobRecord; plan: Plan }) {
  return (
    <div className="sheet-stack">
      <p className="text-xs text-muted">
        Planned by {authorName(plan.author)} <Instant at={plan.createdAt} />
      </p>
      {!plan.current && (
        <p className="font-semibold text-signal">
          The survey was computed again after this plan, or its readings have changed. Plan again.
        </p>
      )}
      <MoveSheet call={moveCallOf(record, plan)} result={plan.result} />
    </div>
  );
}
