import { useState } from "react";
import type { JobRecord } from "../../../../../shared/schemas/jobs.ts";
import { Disclosure } from "../../../components/ui/disclosure.tsx";
import { NumberTable } from "../../../components/ui/number-table.tsx";
import { SectionHeading } from "../../../components/ui/section-heading.tsx";
import { SelectField } from "../../../components/ui/select-field.tsx";
import { useJobWatch } from "../api/use-job-watch.ts";
import { IndicationForm } from "./indication-form.tsx";
import { LastReadings } from "./last-readings.tsx";
import { LiveState } from "./live-state.tsx";
import { tabulateLeft, tabulateNeighbours, viewMove, type JobPlan } from "./move-view.ts";
import { StopReasons } from "./stop-reasons.tsx";

interface FollowMoveProps {
  record: JobRecord;
  mayAct: boolean;
}

/** A part while it moves: what is left at each support, what its neighbours do, and when to stop. */
export function FollowMove({ record, mayAct }: FollowMoveProps) {
  const plan = record.plans.at(-1);
  return (
    <section id="follow" aria-label="Follow a move" className="sheet-stack no-print">
      <SectionHeading>Follow a move</SectionHeading>
      {!plan ? (
        <p className="text-muted">Plan moves first: a move is followed against its plan.</p>
      ) : plan.result.steps.length === 0 ? (
        <p className="text-muted">The newest plan moves nothing.</p>
      ) : (
        <Following key={plan.id} record={record} plan={plan} mayAct={mayAct} />
      )}
    </section>
  );
}

function Following({ record, plan, mayAct }: FollowMoveProps & { plan: JobPlan }) {
  const { steps } = plan.result;
  const [component, setComponent] = useState(() => nextToMove(record, plan));
  const { state, error, answers, start, stop, add } = useJobWatch(record.id);
  const view = viewMove(answers, plan, component);
  const unit = record.machine.units.offset;
  const neighbours = tabulateNeighbours(view, unit);
  return (
    <>
      <div className="grid gap-4">
        <div className="max-w-sm">
          <SelectField
            label="Step of the plan"
            value={component}
            options={steps.map(({ order, component: id, increments }) => ({
              value: id,
              words: `${order}. ${id}, ${increments.length} ${increments.length === 1 ? "part" : "parts"}`,
            }))}
            onChange={(event) => setComponent(event.target.value)}
          />
        </div>
        <LiveState state={state} error={error} start={start} stop={stop} />
        {!plan.current && (
          <p className="max-w-prose font-semibold text-signal">
            The survey was computed again since this plan was made: what is left is told of the older result.
            Plan again before moving on.
          </p>
        )}
        <StopReasons view={view} />
      </div>
      <NumberTable table={tabulateLeft(view, plan, component, unit)} />
      {neighbours && <NumberTable table={neighbours} />}
      <LastReadings answers={view.answers} unit={unit} />
      {mayAct ? (
        <Disclosure title="Enter a reading">
          <IndicationForm key={component} record={record} plan={plan} component={component} onAnswer={add} />
        </Disclosure>
      ) : (
        <p className="max-w-prose text-muted">{whyNot(record)}</p>
      )}
    </>
  );
}

/** The first step whose component is not finished yet; the first of all where each is. */
function nextToMove({ moves }: JobRecord, { result: { steps } }: JobPlan): string {
  const done = new Set(moves.filter(({ finished }) => finished).map(({ component }) => component));
  return (steps.find(({ component }) => !done.has(component)) ?? steps[0])?.component ?? "";
}

function whyNot({ signature }: JobRecord): string {
  if (signature) return "The job is signed: it takes no more readings.";
  return "You may follow a move and not enter readings: an engineer or an administrator enters them, or a key with the scope jobs:write.";
}
