import { computedSurveys } from "../../../../../shared/figures/job/compared-surveys.ts";
import { limits } from "../../../../../shared/limits.ts";
import { axisAcceptanceRequest, concessionRequest } from "../../../../../shared/schemas/job-entries.ts";
import type { JobRecord } from "../../../../../shared/schemas/jobs.ts";
import { Disclosure } from "../../../components/ui/disclosure.tsx";
import { Instant } from "../../../components/ui/instant.tsx";
import { SectionHeading } from "../../../components/ui/section-heading.tsx";
import { SelectField } from "../../../components/ui/select-field.tsx";
import { TextAreaField, TextField } from "../../../components/ui/text-field.tsx";
import { textOf } from "../../../lib/read-form.ts";
import { EntryForm } from "./entry-form.tsx";
import { stationChoices } from "./job-words.ts";
import { Withdraw } from "./withdraw.tsx";

interface SectionProps {
  record: JobRecord;
  mayAct: boolean;
}

/** Stations left outside their tolerance, or undecided, by name and with a reason. */
export function Concessions({ record, mayAct }: SectionProps) {
  const stations = stationChoices(record);
  const judged = record.signOff.obstacles.find(({ code }) => code === "station_does_not_conform");
  return (
    <section id="concessions" aria-label="Concessions" className="sheet-stack">
      <SectionHeading>Concessions</SectionHeading>
      {record.concessions.length === 0 ? (
        <p className="text-muted">None.</p>
      ) : (
        <ul className="grid gap-3">
          {record.concessions.map((one) => (
            <NamedEntry key={one.id} what={one.station} by={one.name} reason={one.reason} at={one.createdAt}>
              {mayAct && <Withdraw job={record.id} entry={one.id} what={`concession of ${one.station}`} />}
            </NamedEntry>
          ))}
        </ul>
      )}
      {mayAct && (
        <Disclosure title="Grant a concession">
          <EntryForm
            job={record.id}
            part="concessions"
            schema={concessionRequest}
            read={(data) => ({
              station: textOf(data, "station"),
              name: textOf(data, "name"),
              reason: textOf(data, "reason"),
            })}
            fields={["/station", "/name", "/reason"]}
            button="Grant concession"
            failed="The concession was not granted."
          >
            {(fault) => (
              <>
                <div className="grid gap-4 sm:grid-cols-2">
                  <SelectField
                    label="Station"
                    name="station"
                    options={stations}
                    defaultValue={judged?.station ?? stations[0]?.value ?? ""}
                    error={fault("/station")}
                  />
                  <TextField
                    label="Granted by"
                    name="name"
                    maxLength={limits.nameLength}
                    error={fault("/name")}
                  />
                </div>
                <TextAreaField label="Reason" name="reason" error={fault("/reason")} />
              </>
            )}
          </EntryForm>
        </Disclosure>
      )}
    </section>
  );
}

/** A new axis taken by name, where a reference station moved or cannot be shown to have stayed. */
export function AxisAcceptances({ record, mayAct }: SectionProps) {
  const computed = computedSurveys(record);
  return (
    <section id="axis" aria-label="Axis" className="sheet-stack">
      <SectionHeading>New axis</SectionHeading>
      {record.axisAcceptances.length === 0 ? (
        <p className="text-muted">The axis is as first set.</p>
      ) : (
        <ul className="grid gap-3">
          {record.axisAcceptances.map((one) => (
            <NamedEntry
              key={one.id}
              what={`axis of the survey ${computed.find(({ survey }) => survey.id === one.survey)?.name ?? "not computed"}${one.current ? "" : ", which was computed again since"}`}
              by={one.name}
              reason={one.reason}
              at={one.createdAt}
            >
              {mayAct && <Withdraw job={record.id} entry={one.id} what="axis acceptance" />}
            </NamedEntry>
          ))}
        </ul>
      )}
      {mayAct && computed.length > 0 && (
        <Disclosure title="Accept a new axis by name">
          <EntryForm
            job={record.id}
            part="axis-acceptances"
            schema={axisAcceptanceRequest}
            read={(data) => ({
              survey: textOf(data, "survey"),
              name: textOf(data, "name"),
              reason: textOf(data, "reason"),
            })}
            fields={["/survey", "/name", "/reason"]}
            button="Accept axis"
            failed="The axis was not accepted."
          >
            {(fault) => (
              <>
                <div className="grid gap-4 sm:grid-cols-2">
                  <SelectField
                    label="Axis of the survey"
                    name="survey"
                    options={computed.map(({ survey, name }) => ({ value: survey.id, words: name }))}
                    defaultValue={computed.at(-1)?.survey.id ?? ""}
                    error={fault("/survey")}
                  />
                  <TextField
                    label="Accepted by"
                    name="name"
                    maxLength={limits.nameLength}
                    error={fault("/name")}
                  />
                </div>
                <TextAreaField label="Reason" name="reason" error={fault("/reason")} />
              </>
            )}
          </EntryForm>
        </Disclosure>
      )}
    </section>
  );
}

interface NamedEntryProps {
  what: string;
  by: string;
  reason: string;
  at: string;
  children: React.ReactNode;
}

function NamedEntry({ what, by, reason, at, children }: NamedEntryProps) {
  return (
    <li className="flex flex-wrap items-start justify-between gap-3 border-b border-hair pb-3">
      <div className="min-w-0">
        <p>
          <strong className="font-semibold">{what}</strong>, {by}
        </p>
        <p className="max-w-prose break-words whitespace-pre-line">{reason}</p>
        <p className="text-xs text-muted">
          <Instant at={at} />
        </p>
      </div>
      {children}
    </li>
  );
}
