import type { CalculationRecord } from "../../../../../shared/schemas/calculations.ts";
import { FaultList } from "../../../components/ui/fault-list.tsx";
import { JsonView } from "../../../components/ui/json-view.tsx";
import { SectionHeading } from "../../../components/ui/section-heading.tsx";
import { CalculationResult } from "../../results/components/calculation-result.tsx";
import { RecordTitleBlock } from "./record-title-block.tsx";
import { Replay } from "./replay.tsx";

interface RecordSheetProps {
  record: CalculationRecord;
  owner: string;
  mayReplay: boolean;
  chosen: string | null;
  onChoose: (id: string) => void;
}

/** A record as a sheet: the figure first, the tables under it, what was sent and answered, the title block at its foot. */
export function RecordSheet({ record, owner, mayReplay, chosen, onChoose }: RecordSheetProps) {
  return (
    <article className="sheet-stack">
      {record.problem !== null ? (
        <Refusal problem={record.problem} />
      ) : (
        <CalculationResult
          kind={record.kind}
          request={record.request}
          response={record.response}
          chosen={chosen}
          onChoose={onChoose}
        />
      )}
      <section className="no-print">
        <SectionHeading>As sent and as answered</SectionHeading>
        <div className="grid gap-2">
          <JsonView title="Request" value={record.request} />
          {record.problem === null ? (
            <JsonView title="Response" value={record.response} />
          ) : (
            <JsonView title="Refusal" value={record.problem} />
          )}
        </div>
      </section>
      {mayReplay && (
        <section className="no-print">
          <SectionHeading>Replay</SectionHeading>
          <Replay id={record.id} />
        </section>
      )}
      <RecordTitleBlock record={record} owner={owner} />
    </article>
  );
}

function Refusal({ problem }: { problem: NonNullable<CalculationRecord["problem"]> }) {
  return (
    <section aria-label="Refusal" className="border border-l-4 border-signal px-4 py-3">
      <h2 className="font-semibold text-signal">{problem.title}</h2>
      <p className="mt-1 max-w-prose">{problem.detail}</p>
      {problem.fix !== undefined && <p className="mt-1 max-w-prose text-muted">{problem.fix}</p>}
      <FaultList faults={problem.errors ?? []} more={problem.more} />
    </section>
  );
}
