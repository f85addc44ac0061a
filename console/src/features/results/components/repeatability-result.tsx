import {
  tabulateComponents,
  tabulatePeople,
  tabulateVariance,
} from "../../../../../shared/figures/repeatability/tabulate-crossed.ts";
import {
  tabulateDrift,
  tabulateFarthest,
  tabulateRepeats,
} from "../../../../../shared/figures/repeatability/tabulate-one-station.ts";
import { tabulateToleranceShare } from "../../../../../shared/figures/repeatability/tabulate-tolerance-share.ts";
import type {
  RepeatabilityStudyRequest,
  RepeatabilityStudyResult,
} from "../../../../../shared/schemas/repeatability-studies.ts";
import type { Units } from "../../../../../shared/units.ts";
import { NumberTable } from "../../../components/ui/number-table.tsx";
import { Tables } from "./tables.tsx";
import { Warnings } from "./warnings.tsx";

interface RepeatabilityResultProps {
  request: RepeatabilityStudyRequest;
  result: RepeatabilityStudyResult;
}

/** How well readings repeat: of one station by one person, or of stations by people. */
export function RepeatabilityResult({ request: { units }, result }: RepeatabilityResultProps) {
  return (
    <div className="sheet-stack">
      {result.form === "one_station" ? (
        <>
          <NumberTable table={tabulateRepeats(result, units)} />
          <Tables tables={[tabulateDrift(result, units), tabulateFarthest(result)]} />
          <NoDrift result={result} />
        </>
      ) : (
        <Crossed result={result} units={units} />
      )}
      <Tables tables={[tabulateToleranceShare(result)]} />
      <Warnings warnings={result.warnings.map((warning) => ({ where: null, ...warning }))} />
    </div>
  );
}

function NoDrift({ result }: { result: Extract<RepeatabilityStudyResult, { form: "one_station" }> }) {
  if (result.drift !== null) return null;
  return <p className="text-muted">Too few readings, or all at one time: drift cannot be told.</p>;
}

function Crossed({
  result,
  units,
}: {
  result: Extract<RepeatabilityStudyResult, { form: "crossed" }>;
  units: Units;
}) {
  return (
    <>
      <p>
        {result.stations.length} stations, {result.people.length} people, {result.repeats} readings each.
        Interaction: {result.interaction.rule}.
      </p>
      <Tables tables={[tabulateComponents(result, units), tabulatePeople(result, units)]} />
      {tabulateVariance(result, units).map((table) => (
        <NumberTable key={table.caption} table={table} />
      ))}
    </>
  );
}
