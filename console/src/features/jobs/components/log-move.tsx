import { useState } from "react";
import { decimalsAcross, writeSigned } from "../../../../../shared/figures/write-number.ts";
import { loggedMoveRequest } from "../../../../../shared/schemas/job-entries.ts";
import { plannedBoreMoves } from "../../../../../shared/planned-move.ts";
import type { JobRecord } from "../../../../../shared/schemas/jobs.ts";
import { SelectField } from "../../../components/ui/select-field.tsx";
import { TextAreaField, TextField } from "../../../components/ui/text-field.tsx";
import { fromLocalMoment, toLocalMoment } from "../../../lib/local-moment.ts";
import { readDecimal } from "../../../lib/read-decimal.ts";
import { textOf } from "../../../lib/read-form.ts";
import { ProblemError } from "../../../lib/service-error.ts";
import { EntryForm } from "./entry-form.tsx";

/** What was moved, as read on the indicators. A reason is asked for where the service asks for one. */
export function LogMove({ record }: { record: JobRecord }) {
  const { components = [], units } = record.machine;
  const [chosen, setChosen] = useState(components[0]?.id ?? "");
  const [now] = useState(() => toLocalMoment(new Date()));
  // Supports left empty are not sent, so a fault's place counts only those that were.
  const [sent, setSent] = useState<readonly string[]>([]);
  const supports = (components.find(({ id }) => id === chosen)?.supports ?? []).map(({ id }) => id);
  const planned = plannedBoreMoves(record.plans.at(-1)?.result.components.find(({ id }) => id === chosen));
  const plannedWords = (support: string, plane: "h" | "v"): string | undefined => {
    const move = planned.find((one) => one.support === support);
    return move && `planned ${writeSigned(move[plane], decimalsAcross(units.offset))}`;
  };
  return (
    <EntryForm
      job={record.id}
      part="moves"
      schema={loggedMoveRequest}
      read={(data) => {
        const move = moveFrom(data, chosen, supports);
        setSent((move.moved ?? []).map(({ support }) => support));
        return move;
      }}
      fields={["/component", "/at", "/person", "/moved", "/reason"]}
      button="Log move"
      failed="The move was not logged."
    >
      {(fault, error) => (
        <>
          <div className="grid gap-4 sm:grid-cols-2">
            <SelectField
              label="Component"
              value={chosen}
              options={components.map(({ id }) => ({ value: id, words: id }))}
              error={fault("/component")}
              onChange={(event) => setChosen(event.target.value)}
            />
            <TextField
              label="Moved at"
              name="at"
              type="datetime-local"
              defaultValue={now}
              error={fault("/at")}
            />
            <TextField label="Moved by" name="person" hint="You, when empty." error={fault("/person")} />
            <label className="flex items-center gap-3 self-end py-2">
              <input type="checkbox" name="finished" defaultChecked className="accent-ink" />
              Finished: it stays there, and is locked
            </label>
          </div>
          {supports.map((support) => (
            <fieldset key={`${chosen} ${support}`} className="grid grid-cols-2 gap-4">
              <legend className="field-name mb-1">
                {support}, {units.offset}, from where it stood before
              </legend>
              {(["h", "v"] as const).map((plane) => {
                const hint = plannedWords(support, plane);
                return (
                  <TextField
                    key={plane}
                    label={`${support} ${plane}`}
                    name={`${plane} ${support}`}
                    inputMode="decimal"
                    error={
                      sent.includes(support) ? fault(`/moved/${sent.indexOf(support)}/${plane}`) : undefined
                    }
                    {...(hint === undefined ? {} : { hint })}
                  />
                );
              })}
            </fieldset>
          ))}
          {asksForReason(error) && (
            <TextAreaField
              label="Reason for this order"
              name="reason"
              hint="Casings and shrouds come before bearings, each locked before the next. The reason is kept with the move."
              error={fault("/reason")}
            />
          )}
        </>
      )}
    </EntryForm>
  );
}

function asksForReason(error: unknown): boolean {
  if (!(error instanceof ProblemError)) return false;
  const { code, errors = [] } = error.problem;
  return code === "reason_required" || errors.some((fault) => fault.code === "reason_required");
}

/** Supports of which nothing was typed are left out; a place with one of the two typed has the other at zero. */
function moveFrom(data: FormData, component: string, supports: readonly string[]) {
  const moved = supports.flatMap((support) => {
    const [h, v] = (["h", "v"] as const).map((plane) => readDecimal(textOf(data, `${plane} ${support}`)));
    return h === null && v === null ? [] : [{ support, h: h ?? 0, v: v ?? 0 }];
  });
  const [person, reason] = [textOf(data, "person").trim(), textOf(data, "reason").trim()];
  return {
    component,
    at: fromLocalMoment(textOf(data, "at")),
    finished: data.get("finished") !== null,
    ...(person === "" ? {} : { person }),
    ...(moved.length === 0 ? {} : { moved }),
    ...(reason === "" ? {} : { reason }),
  };
}
