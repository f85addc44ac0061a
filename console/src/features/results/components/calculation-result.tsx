import { useMemo } from "react";
import { readCalculation } from "./read-calculation.ts";
import type { CalculationKind } from "../../../config/paths.ts";
import { AlignmentResult } from "./alignment-result.tsx";
import { AxisDeviationResult } from "./axis-deviation-result.tsx";
import { BoreFitResult } from "./bore-fit-result.tsx";
import { ColdTargetResult } from "./cold-target-result.tsx";
import { ConfirmationResult } from "./confirmation-result.tsx";
import { FewestMovesResult } from "./fewest-moves-result.tsx";
import { MeasurementPlanResult } from "./measurement-plan-result.tsx";
import { RepeatabilityResult } from "./repeatability-result.tsx";
import { ShimMoveResult } from "./shim-move-result.tsx";
import { SightLineResult } from "./sight-line-result.tsx";

interface CalculationResultProps {
  kind: CalculationKind;
  request: unknown;
  response: unknown;
  /** Which bore's section is shown. */
  chosen: string | null;
  onChoose: (id: string) => void;
}

/** The answer of a calculation as figures and tables. */
export function CalculationResult({ kind, request, response, chosen, onChoose }: CalculationResultProps) {
  const read = useMemo(() => readCalculation(kind, request, response), [kind, request, response]);
  if (read === null) {
    return (
      <p className="max-w-prose text-muted">
        This answer was made by an engine version whose form the console does not draw. Its JSON below is
        whole.
      </p>
    );
  }
  switch (read.kind) {
    case "bore-fit":
      return (
        <BoreFitResult request={read.request} fits={read.result.bores} chosen={chosen} onChoose={onChoose} />
      );
    case "axis-deviation":
      return <AxisDeviationResult call={read.request} result={read.result} />;
    case "alignment":
      return (
        <AlignmentResult request={read.request} result={read.result} chosen={chosen} onChoose={onChoose} />
      );
    case "shim-move":
      return <ShimMoveResult request={read.request} result={read.result} />;
    case "fewest-moves":
      return <FewestMovesResult request={read.request} result={read.result} />;
    case "cold-target":
      return <ColdTargetResult request={read.request} result={read.result} />;
    case "confirmation":
      return <ConfirmationResult request={read.request} result={read.result} />;
    case "measurement-plan":
      return <MeasurementPlanResult request={read.request} plans={read.result.bores} />;
    case "sight-line-setup":
      return <SightLineResult request={read.request} result={read.result} />;
    case "repeatability-study":
      return <RepeatabilityResult request={read.request} result={read.result} />;
  }
}
