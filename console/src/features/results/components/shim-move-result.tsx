import { drawPlanElevation } from "../../../../../shared/figures/plan-elevation/draw-plan-elevation.ts";
import { planElevationOfMoves } from "../../../../../shared/figures/plan-elevation/plan-elevation-of-moves.ts";
import type { ShimMoveRequest, ShimMoveResult as Result } from "../../../../../shared/schemas/shim-moves.ts";
import { FigureView } from "../../../components/ui/figure-view.tsx";
import { MoveSheet } from "./move-sheet.tsx";

/** Figure 2, before and after, then the move sheet. */
export function ShimMoveResult({ request, result }: { request: ShimMoveRequest; result: Result }) {
  const model = planElevationOfMoves(request, result);
  return (
    <div className="sheet-stack">
      <FigureView number={2} draw={(width) => drawPlanElevation(model, width)} />
      <MoveSheet call={request} result={result} />
    </div>
  );
}
