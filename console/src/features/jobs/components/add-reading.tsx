import { useState, type SubmitEvent } from "react";
import { addReadingsRequest } from "../../../../../shared/schemas/job-entries.ts";
import type { JobRecord } from "../../../../../shared/schemas/jobs.ts";
import { Button } from "../../../components/ui/button.tsx";
import { Failure } from "../../../components/ui/failure.tsx";
import { FaultList } from "../../../components/ui/fault-list.tsx";
import { SelectField } from "../../../components/ui/select-field.tsx";
import { TextField } from "../../../components/ui/text-field.tsx";
import { apiPaths } from "../../../config/paths.ts";
import { toLocalMoment } from "../../../lib/local-moment.ts";
import { checkBody, faultAt, faultsAtPointers, type PointerFaults } from "../../../lib/pointer-faults.ts";
import { ProblemError } from "../../../lib/service-error.ts";
import { useDraftText } from "../../../lib/use-draft-text.ts";
import { useAddToJob } from "../api/add-to-job.ts";
import { readingForms, stationChoices } from "./job-words.ts";
import { bodyOf, emptyDraft, readKeptDraft, type ReadingDraft, type TypedForm } from "./reading-draft.ts";
import { GaugeFields, WireFields } from "./reading-fields.tsx";
import { ReadingRows } from "./reading-rows.tsx";

/** One bore's reading, typed in. Kept for this tab until the service has taken it. */
export function AddReading({ record, survey }: { record: JobRecord; survey: string }) {
  const stations = stationChoices(record);
  const [beginning] = useState(() =>
    JSON.stringify(emptyDraft(stations[0]?.value ?? "", toLocalMoment(new Date()))),
  );
  const text = useDraftText(`job.${record.id}.${survey}.reading`, beginning);
  const draft = readKeptDraft(text.text, beginning);
  const set = (change: Partial<ReadingDraft>): void => text.change(JSON.stringify({ ...draft, ...change }));
  const [faults, setFaults] = useState<PointerFaults>({});
  const [stored, setStored] = useState<string | null>(null);
  const add = useAddToJob();
  const fault = (pointer: string): string | undefined => faultAt(faults, pointer);
  const submit = (event: SubmitEvent<HTMLFormElement>): void => {
    event.preventDefault();
    if (add.isPending) return;
    setStored(null);
    const checked = checkBody(addReadingsRequest, bodyOf(draft));
    setFaults(checked.faults ?? {});
    if (checked.faults) return;
    add.mutate(
      {
        path: `${apiPaths.job(record.id)}/surveys/${encodeURIComponent(survey)}/readings`,
        body: checked.body,
      },
      {
        onSuccess: () => {
          setStored(draft.station);
          const next = stations[stations.findIndex(({ value }) => value === draft.station) + 1]?.value;
          const fresh = emptyDraft(next ?? draft.station, toLocalMoment(new Date()));
          // The next bore is read by the same person in the same way.
          const { form, person, upperHalf, sense, zero, gaugeSag, measuredTo, wireDiameter } = draft;
          const same = { form, person, upperHalf, sense, zero, gaugeSag, measuredTo, wireDiameter };
          text.change(JSON.stringify({ ...fresh, ...same }));
        },
        onError: (error) => setFaults(faultsAtPointers(error)),
      },
    );
  };
  return (
    <form onSubmit={submit} noValidate className="grid gap-4">
      <div className="grid gap-4 sm:grid-cols-2 lg:grid-cols-3">
        <SelectField
          label="Station"
          options={stations}
          value={draft.station}
          error={fault("/readings/0/station")}
          onChange={(event) => set({ station: event.target.value })}
        />
        <SelectField
          label="Read with"
          options={typedForms}
          value={draft.form}
          onChange={(event) => set({ form: event.target.value as TypedForm })}
        />
        <TextField
          label="Taken at"
          type="datetime-local"
          value={draft.takenAt}
          error={fault("/readings/0/takenAt")}
          onChange={(event) => set({ takenAt: event.target.value })}
        />
        <TextField
          label="Read by"
          hint="You, when empty."
          value={draft.person}
          error={fault("/readings/0/person")}
          onChange={(event) => set({ person: event.target.value })}
        />
        <SelectField
          label="Upper half"
          options={[
            { value: "on", words: "on" },
            { value: "off", words: "off" },
            { value: "", words: "not stated" },
          ]}
          value={draft.upperHalf}
          onChange={(event) => set({ upperHalf: event.target.value })}
        />
        <label className="flex items-center gap-3 self-end py-2">
          <input
            type="checkbox"
            className="accent-ink"
            checked={draft.closing}
            onChange={(event) => set({ closing: event.target.checked })}
          />
          Closing reading, for the drift
        </label>
        {draft.form === "turned_gauge" && (
          <GaugeFields draft={draft} fault={fault} units={record.machine.units} onChange={set} />
        )}
        {draft.form === "wire" && (
          <WireFields draft={draft} fault={fault} units={record.machine.units} onChange={set} />
        )}
      </div>
      <ReadingRows
        draft={draft}
        units={record.machine.units}
        fault={fault}
        onChange={(rows) => set({ rows: { ...draft.rows, [draft.form]: rows } })}
      />
      <OtherFaults faults={faults} error={add.error} />
      {add.isError && (
        <Failure error={add.error} what="The reading was not stored.">
          {add.error instanceof ProblemError && (
            <FaultList faults={add.error.problem.errors ?? []} more={add.error.problem.more} />
          )}
        </Failure>
      )}
      <div className="flex flex-wrap items-center gap-4">
        <Button type="submit" look="main" busy={add.isPending}>
          Store reading
        </Button>
        <span role="status">{stored !== null && `The reading of ${stored} is stored.`}</span>
      </div>
    </form>
  );
}

/** Faults found before sending, of the list of rows as a whole. */
function OtherFaults({ faults, error }: { faults: PointerFaults; error: unknown }) {
  const lists = ["/readings/0/readings", "/readings/0/points", "/readings/0/wire"];
  const words = lists.flatMap((pointer) => faults[pointer] ?? []);
  if (error !== null || words.length === 0) return null;
  return (
    <p role="alert" className="text-signal">
      {words.join(" ")}
    </p>
  );
}

const typedForms = (["turned_gauge", "points", "wire"] as const).map((form) => ({
  value: form,
  words: readingForms[form],
}));
