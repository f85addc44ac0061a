import {
  tabulateAdded,
  tabulatePlans,
  tabulatePredictions,
} from "../../../../../shared/figures/measurement-plan/tabulate-plans.ts";
import type {
  BoreMeasurementPlan,
  MeasurementPlanRequest,
} from "../../../../../shared/schemas/measurement-plans.ts";
import { NumberTable } from "../../../components/ui/number-table.tsx";
import { Tables } from "./tables.tsx";
import { Warnings } from "./warnings.tsx";

interface MeasurementPlanResultProps {
  request: MeasurementPlanRequest;
  plans: readonly BoreMeasurementPlan[];
}

/** Whether the readings do, and which to add where they do not. */
export function MeasurementPlanResult({ request, plans }: MeasurementPlanResultProps) {
  return (
    <div className="sheet-stack">
      <NumberTable table={tabulatePlans(plans, request.units)} />
      <Tables tables={[tabulateAdded(plans), tabulatePredictions(plans, request.units)]} />
      <Warnings
        warnings={plans.flatMap(({ id, warnings }) => warnings.map((warning) => ({ where: id, ...warning })))}
      />
    </div>
  );
}
