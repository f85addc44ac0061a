import {
  tabulateGrowths,
  tabulateRotor,
  tabulateWire,
} from "../../../../../shared/figures/cold-target/tabulate-target-parts.ts";
import { tabulateTargets } from "../../../../../shared/figures/cold-target/tabulate-targets.ts";
import type {
  ColdTargetRequest,
  ColdTargetResult as Result,
} from "../../../../../shared/schemas/cold-targets.ts";
import { NumberTable } from "../../../components/ui/number-table.tsx";
import { Tables } from "./tables.tsx";
import { Warnings, type PlacedWarning } from "./warnings.tsx";

/** Where every bore should lie cold, and what each target was made of. */
export function ColdTargetResult({ request, result }: { request: ColdTargetRequest; result: Result }) {
  const { units } = request;
  return (
    <div className="sheet-stack">
      <NumberTable table={tabulateTargets(result, units)} />
      <Tables
        tables={[tabulateGrowths(result, units), tabulateRotor(result, units), tabulateWire(result, units)]}
      />
      <Warnings warnings={warningsOf(result)} />
    </div>
  );
}

function warningsOf({ rotor, stations }: Result): PlacedWarning[] {
  return [
    ...(rotor?.warnings ?? []).map((warning) => ({ where: "rotor", ...warning })),
    ...stations.flatMap(({ id, warnings }) => warnings.map((warning) => ({ where: id, ...warning }))),
  ];
}
