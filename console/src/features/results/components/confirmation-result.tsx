import { tabulateAsLeft } from "../../../../../shared/figures/confirmation/tabulate-as-left.ts";
import {
  tabulateCommonChange,
  tabulateMoved,
  tabulateReference,
  tabulateUnmoved,
} from "../../../../../shared/figures/confirmation/tabulate-changes.ts";
import type { ConfirmationResult as Result } from "../../../../../shared/schemas/confirmation-answers.ts";
import type { ConfirmationRequest } from "../../../../../shared/schemas/confirmations.ts";
import { NumberTable } from "../../../components/ui/number-table.tsx";
import { Remeasure } from "./remeasure.tsx";
import { Tables } from "./tables.tsx";
import { Warnings, type PlacedWarning } from "./warnings.tsx";

/** Whether the moves did what they should and nothing else: the judgement first, then what it rests on. */
export function ConfirmationResult({
  request,
  result,
}: {
  request: Pick<ConfirmationRequest, "units">;
  result: Result;
}) {
  const { units } = request;
  const long = [tabulateMoved(result, units), tabulateUnmoved(result, units), tabulateAsLeft(result, units)];
  return (
    <div className="sheet-stack">
      <Judgement result={result} />
      <Warnings warnings={warningsOf(result)} />
      <Tables tables={[tabulateReference(result, units), tabulateCommonChange(result, units)]} />
      {long.map((table) => table !== null && <NumberTable key={table.caption} table={table} />)}
      <Remeasure title="Measure still, in this order" stations={result.outstanding} />
    </div>
  );
}

function Judgement({ result }: { result: Result }) {
  const { reference, unexpected, frame } = result;
  return (
    <dl className="grid max-w-prose gap-3" aria-label="Judgement">
      <div>
        <dt className="field-name">reference stations</dt>
        <dd className={reference.repeats === false ? "font-semibold text-signal" : undefined}>
          {referenceWords(reference)}
        </dd>
      </div>
      <div>
        <dt className="field-name">changes are taken</dt>
        <dd>{frame === "fixed" ? "as read" : "off the shift and tilt that the reference stations share"}</dd>
      </div>
      <div>
        <dt className="field-name">moved without being meant to</dt>
        <dd className={unexpected.length > 0 ? "font-semibold text-signal" : undefined}>
          {unexpected.length > 0 ? unexpected.join(", ") : "none shown"}
        </dd>
      </div>
    </dl>
  );
}

const causeWords: Record<NonNullable<Result["reference"]["cause"]>, string> = {
  none: "no cause",
  common: "all share a shift and a tilt",
  station: "one moved by itself",
  common_and_station: "all share a shift and a tilt, and one moved by itself",
  several: "more than one moved by itself",
  undetermined: "too few, or changed too little, to tell why",
};

function referenceWords({ repeats, cause, moved }: Result["reference"]): string {
  if (repeats === null) return "not shown either way";
  if (repeats) return "repeat";
  const why = cause === null ? "" : `: ${causeWords[cause]}`;
  return `do not repeat${why}${moved.length > 0 ? ` (${moved.join(", ")})` : ""}`;
}

function warningsOf({ warnings, verdicts }: Result): PlacedWarning[] {
  return [
    ...warnings.map((warning) => ({ where: null, ...warning })),
    ...verdicts.flatMap(({ id, warnings: own }) => own.map((warning) => ({ where: id, ...warning }))),
  ];
}
