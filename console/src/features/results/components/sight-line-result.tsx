import {
  tabulateBeam,
  tabulateSightErrors,
  tabulateSourceMoves,
} from "../../../../../shared/figures/sight-line/tabulate-sight-line.ts";
import type { SightLineResult as Result } from "../../../../../shared/schemas/sight-line-answers.ts";
import type { SightLineSetupRequest } from "../../../../../shared/schemas/sight-line-setups.ts";
import { NumberTable } from "../../../components/ui/number-table.tsx";
import { Tables } from "./tables.tsx";
import { Warnings } from "./warnings.tsx";

const nextWords: Record<Result["next"], string> = {
  go_on: "The beam runs as wanted at both stations: measure.",
  adjust_and_read_again: "Move the source, then read both stations again.",
  read_again: "The beam wandered too far while it was read: hold the source still, then read again.",
};

/** What to do next, where the beam runs, and how the source moves. */
export function SightLineResult({ request, result }: { request: SightLineSetupRequest; result: Result }) {
  const { units } = request;
  return (
    <div className="sheet-stack">
      <dl className="max-w-prose" aria-label="What to do next">
        <dt className="field-name">next</dt>
        <dd className={result.repeat ? "font-semibold text-signal" : undefined}>{nextWords[result.next]}</dd>
      </dl>
      <Warnings warnings={result.warnings.map((warning) => ({ where: null, ...warning }))} />
      <NumberTable table={tabulateBeam(result, units)} />
      <Tables tables={[tabulateSourceMoves(result, units), tabulateSightErrors(result, units)]} />
    </div>
  );
}
