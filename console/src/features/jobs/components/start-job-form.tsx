import { useState, type SubmitEvent } from "react";
import { useNavigate } from "react-router-dom";
import { axisMethods } from "../../../../../shared/schemas/axis-deviations.ts";
import { limits } from "../../../../../shared/limits.ts";
import { createJobRequest } from "../../../../../shared/schemas/jobs.ts";
import type { Machine } from "../../../../../shared/schemas/machines.ts";
import { Button } from "../../../components/ui/button.tsx";
import { Failure } from "../../../components/ui/failure.tsx";
import { FaultList } from "../../../components/ui/fault-list.tsx";
import { SelectField } from "../../../components/ui/select-field.tsx";
import { TextField } from "../../../components/ui/text-field.tsx";
import { apiPaths, paths } from "../../../config/paths.ts";
import { checkBody, faultAt, faultsAtPointers, type PointerFaults } from "../../../lib/pointer-faults.ts";
import { ProblemError } from "../../../lib/service-error.ts";
import { useChangeJob } from "../api/change-job.ts";
import { InstrumentRows } from "./instrument-rows.tsx";
import { jobBodyOf, emptyInstrument, sentInstruments, type InstrumentDraft } from "./start-job-body.ts";

/** What a job begins with. What was typed stays until the service has taken it. */
export function StartJobForm({ machine }: { machine: Machine }) {
  const navigate = useNavigate();
  const [instruments, setInstruments] = useState<readonly InstrumentDraft[]>([emptyInstrument]);
  const [faults, setFaults] = useState<PointerFaults>({});
  const change = useChangeJob();
  const fault = (pointer: string): string | undefined => faultAt(faults, `/details${pointer}`);
  const submit = (event: SubmitEvent<HTMLFormElement>): void => {
    event.preventDefault();
    if (change.isPending) return;
    const data = new FormData(event.currentTarget);
    const checked = checkBody(createJobRequest, jobBodyOf(machine.id, data, instruments));
    setFaults(checked.faults ?? {});
    if (checked.faults) return;
    change.mutate(
      { path: apiPaths.jobs, body: checked.body },
      {
        onSuccess: ({ id }) => void navigate(paths.job(id)),
        onError: (error) => setFaults(faultsAtPointers(error)),
      },
    );
  };
  const { stations, reference = [], units } = machine.document;
  return (
    <form onSubmit={submit} noValidate className="grid gap-5">
      <TextField
        label="Title"
        name="title"
        hint="As “Unit 2, major outage”."
        maxLength={limits.nameLength}
        error={fault("/title")}
      />
      <div className="grid gap-4 sm:grid-cols-2">
        <TextField label="Order number" name="orderNumber" error={fault("/orderNumber")} />
        <TextField label="Site" name="site" error={fault("/site")} />
        <TextField label="Starts on" name="startsOn" type="date" error={fault("/startsOn")} />
        <TextField label="Ends on" name="endsOn" type="date" error={fault("/endsOn")} />
        <SelectField
          label="Readers look"
          name="seen"
          hint={`Downstream: ${machine.document.downstream}`}
          options={[
            { value: "downstream", words: "downstream" },
            { value: "upstream", words: "upstream" },
          ]}
          error={fault("/seen")}
        />
        <SelectField
          label="Axis"
          name="method"
          defaultValue={reference.length === 2 ? "two_station" : "least_squares"}
          options={axisMethods.map((method) => ({ value: method, words: method.replaceAll("_", " ") }))}
          error={fault("/axis/method")}
        />
      </div>
      <fieldset aria-describedby={fault("/axis/through") ? "axis-stations-error" : undefined}>
        <legend className="field-name mb-1">Stations that set the axis</legend>
        <div className="flex flex-wrap gap-x-5 gap-y-2 border border-hair px-3 py-2">
          {stations.map(({ id }) => (
            <label key={id} className="flex cursor-pointer items-center gap-2">
              <input
                type="checkbox"
                name="through"
                value={id}
                defaultChecked={reference.includes(id)}
                className="accent-ink"
              />
              {id}
            </label>
          ))}
        </div>
        {fault("/axis/through") !== undefined && (
          <p id="axis-stations-error" className="mt-1 text-xs text-signal">
            {fault("/axis/through")}
          </p>
        )}
      </fieldset>
      <InstrumentRows
        instruments={instruments}
        unit={units.offset}
        fault={(row, field) => {
          const at = sentInstruments(instruments).findIndex((one) => one === instruments[row]);
          return at < 0 ? undefined : fault(`/instruments/${at}/${field}`);
        }}
        onChange={setInstruments}
      />
      {change.isError && (
        <Failure error={change.error} what="The job was not started.">
          {change.error instanceof ProblemError && (
            <FaultList faults={change.error.problem.errors ?? []} more={change.error.problem.more} />
          )}
        </Failure>
      )}
      {!change.isError && Object.keys(faults).length > 0 && (
        <p role="alert" className="text-signal">
          Correct the marked fields.
        </p>
      )}
      <div>
        <Button type="submit" look="main" busy={change.isPending}>
          Start job
        </Button>
      </div>
    </form>
  );
}
