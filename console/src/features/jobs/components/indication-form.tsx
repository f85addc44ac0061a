import { useRef, useState, type SubmitEvent } from "react";
import { indicationRequest, type IndicationAnswer } from "../../../../../shared/schemas/indications.ts";
import type { JobRecord } from "../../../../../shared/schemas/jobs.ts";
import { Button } from "../../../components/ui/button.tsx";
import { Failure } from "../../../components/ui/failure.tsx";
import { FaultList } from "../../../components/ui/fault-list.tsx";
import { TextField } from "../../../components/ui/text-field.tsx";
import { apiPaths } from "../../../config/paths.ts";
import {
  checkBody,
  faultAt,
  faultsAtPointers,
  faultsElsewhere,
  type PointerFaults,
} from "../../../lib/pointer-faults.ts";
import { useAddIndication } from "../api/add-indication.ts";
import { fieldNames, indicationFrom, readingFields } from "./indication-draft.ts";
import type { JobPlan } from "./move-view.ts";

interface IndicationFormProps {
  record: JobRecord;
  plan: JobPlan;
  component: string;
  onAnswer: (answer: IndicationAnswer) => void;
}

/** What is read at one moment. Who reads stays in the form; the readings go once the service has them. */
export function IndicationForm({ record, plan, component, onAnswer }: IndicationFormProps) {
  const form = useRef<HTMLFormElement>(null);
  /** When the readings were taken: kept while the same ones are sent again, so that they are stored once. */
  const takenAt = useRef<string | null>(null);
  const [faults, setFaults] = useState<PointerFaults>({});
  // Fields left empty are not sent, so a fault's place counts only those that were.
  const [sent, setSent] = useState({ indicators: [] as string[], sights: [] as string[] });
  const add = useAddIndication();
  const fields = readingFields(record, plan, component);
  const unit = record.machine.units.offset;

  const submit = (event: SubmitEvent<HTMLFormElement>): void => {
    event.preventDefault();
    if (add.isPending) return;
    takenAt.current ??= new Date().toISOString();
    const head = { plan: plan.id, component, at: takenAt.current };
    const body = indicationFrom(new FormData(event.currentTarget), fields, head);
    const { indicators = [], sights = [] } = body;
    setSent({ indicators: indicators.map(({ id }) => id), sights: sights.map(({ station }) => station) });
    if (indicators.length + sights.length === 0) {
      setFaults({ "": "Type at least one reading." });
      return form.current?.querySelector("input")?.focus();
    }
    const checked = checkBody(indicationRequest, body);
    setFaults(checked.faults ?? {});
    if (checked.faults) return;
    add.mutate(
      { path: apiPaths.indications(record.id), body: checked.body },
      {
        onSuccess: (answer) => {
          takenAt.current = null;
          clearReadings(form.current);
          onAnswer(answer);
        },
        onError: (error) => setFaults(faultsAtPointers(error)),
      },
    );
  };
  const faultOf = (list: "indicators" | "sights", id: string, member: string): string | undefined => {
    const place = sent[list].indexOf(id);
    return place < 0
      ? undefined
      : (faultAt(faults, `/${list}/${place}/${member}`) ?? faultOfId(faults, list, place));
  };
  return (
    <form
      ref={form}
      onSubmit={submit}
      onChange={() => (takenAt.current = null)}
      noValidate
      className="grid max-w-5xl gap-5"
    >
      {fields.indicators.length > 0 && (
        <fieldset className="grid gap-x-4 gap-y-3 sm:grid-cols-2 lg:grid-cols-4">
          <legend className="field-name mb-1">
            Indicators, {unit}, since {component} began to move
          </legend>
          {fields.indicators.map(({ id, hint }) => (
            <TextField
              key={id}
              label={id}
              name={fieldNames.indicator(id)}
              inputMode="decimal"
              hint={hint}
              error={faultOf("indicators", id, "reading")}
            />
          ))}
        </fieldset>
      )}
      {[true, false].map((own) => {
        const sights = fields.sights.filter((one) => one.own === own);
        return (
          sights.length > 0 && (
            <fieldset key={String(own)} className="grid grid-cols-2 gap-x-4 gap-y-3 lg:grid-cols-4">
              <legend className="field-name mb-1">
                {own ? `Stations of ${component}` : "Neighbours"}, {unit}, off the line of sight, seen
                downstream
              </legend>
              {sights.flatMap(({ station, hints }) =>
                (["h", "v"] as const).map((plane) => (
                  <TextField
                    key={`${station} ${plane}`}
                    label={`${station} ${plane}`}
                    name={fieldNames.sight(station, plane)}
                    inputMode="decimal"
                    error={faultOf("sights", station, `centre/${plane}`)}
                    {...(hints[plane] === undefined ? {} : { hint: hints[plane] })}
                  />
                )),
              )}
            </fieldset>
          )
        );
      })}
      <div className="max-w-sm">
        <TextField label="Read by" name="person" hint="You, when empty." error={faultAt(faults, "/person")} />
      </div>
      {faults[""] !== undefined && !add.isError && (
        <p role="alert" className="text-signal">
          {faults[""]}
        </p>
      )}
      {add.isError && (
        <Failure error={add.error} what="The reading was not stored.">
          <FaultList faults={faultsElsewhere(add.error, ["/indicators", "/sights", "/person"])} />
        </Failure>
      )}
      <div>
        <Button type="submit" look="main" busy={add.isPending}>
          Send reading
        </Button>
      </div>
    </form>
  );
}

function faultOfId(faults: PointerFaults, list: "indicators" | "sights", place: number): string | undefined {
  return faults[`/${list}/${place}/${list === "indicators" ? "id" : "station"}`];
}

function clearReadings(form: HTMLFormElement | null): void {
  const inputs = [...(form?.querySelectorAll("input") ?? [])].filter(({ name }) => name !== "person");
  for (const input of inputs) input.value = "";
  inputs[0]?.focus();
}
