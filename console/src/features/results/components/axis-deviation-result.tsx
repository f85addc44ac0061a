import { drawPlanElevation } from "../../../../../shared/figures/plan-elevation/draw-plan-elevation.ts";
import type { Survey } from "../../../../../shared/figures/plan-elevation/plan-elevation-model.ts";
import {
  planElevationOf,
  type PlannedCall,
} from "../../../../../shared/figures/plan-elevation/plan-elevation-of.ts";
import { tabulateAxis } from "../../../../../shared/figures/plan-elevation/tabulate-axis.ts";
import { tabulatePlanElevation } from "../../../../../shared/figures/plan-elevation/tabulate-plan-elevation.ts";
import { tabulateTrials } from "../../../../../shared/figures/trials/tabulate-trials.ts";
import type { AxisDeviationResult as Result } from "../../../../../shared/schemas/axis-deviations.ts";
import { FigureView } from "../../../components/ui/figure-view.tsx";
import { NumberTable } from "../../../components/ui/number-table.tsx";
import { Tables } from "./tables.tsx";
import { VerdictSummary } from "./verdict-summary.tsx";
import { Warnings, type PlacedWarning } from "./warnings.tsx";

interface AxisDeviationResultProps {
  call: PlannedCall;
  result: Result;
  /** As left by prediction, drawn over what was found. */
  predicted?: Survey;
}

/** Figure 2, what became of the stations in one line, and the numbers. */
export function AxisDeviationResult({ call, result, predicted }: AxisDeviationResultProps) {
  const model = planElevationOf(call, result, predicted);
  const [found] = tabulatePlanElevation(model);
  return (
    <div className="sheet-stack">
      <FigureView number={2} draw={(width) => drawPlanElevation(model, width)} />
      <VerdictSummary summary={result.summary} />
      {found && <NumberTable table={found} />}
      <Tables
        tables={[
          tabulateAxis(result.axis, call.units),
          tabulateTrials(result.stations, call.units, "station"),
        ]}
      />
      <Warnings warnings={warningsOf(result)} />
    </div>
  );
}

function warningsOf(result: Result): PlacedWarning[] {
  return [
    ...result.axis.warnings.map((warning) => ({ where: "axis", ...warning })),
    ...result.stations.flatMap((station) =>
      [...station.warnings, ...(station.monteCarlo?.warnings ?? [])].map((warning) => ({
        where: station.id,
        ...warning,
      })),
    ),
  ];
}
