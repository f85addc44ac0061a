import type { AxisDeviationResult } from "../../../../../shared/schemas/axis-deviations.ts";
import { VerdictWord } from "../../../components/ui/verdict-mark.tsx";

/** How many stations came out how, and the one that uses most of its tolerance. */
export function VerdictSummary({ summary }: { summary: AxisDeviationResult["summary"] }) {
  const judged = (["conforms", "undecided", "exceeds"] as const).filter((verdict) => summary[verdict] > 0);
  return (
    <dl className="flex flex-wrap gap-x-10 gap-y-3" aria-label="Verdicts">
      {judged.map((verdict) => (
        <div key={verdict}>
          <dt>
            <VerdictWord verdict={verdict} />
          </dt>
          <dd className="text-xl">{summary[verdict]}</dd>
        </div>
      ))}
      {summary.worst !== null && (
        <div>
          <dt className="field-name">uses most of its tolerance</dt>
          <dd className="text-xl">
            {summary.worst.id}{" "}
            <span className="whitespace-nowrap">{(summary.worst.ratio * 100).toFixed(0)} %</span>
          </dd>
        </div>
      )}
    </dl>
  );
}
