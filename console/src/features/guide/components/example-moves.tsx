import { tabulateStacks } from "../../../../../shared/figures/move-sheet/tabulate-stacks.ts";
import { tabulateSteps } from "../../../../../shared/figures/move-sheet/tabulate-steps.ts";
import { drawPlanElevation } from "../../../../../shared/figures/plan-elevation/draw-plan-elevation.ts";
import { predictedOf } from "../../../../../shared/figures/plan-elevation/plan-elevation-of-moves.ts";
import { planElevationOf } from "../../../../../shared/figures/plan-elevation/plan-elevation-of.ts";
import { FigureView } from "../../../components/ui/figure-view.tsx";
import { NumberTable } from "../../../components/ui/number-table.tsx";
import { SectionHeading } from "../../../components/ui/section-heading.tsx";
import { Remeasure } from "../../results/components/remeasure.tsx";
import type { AlignmentExample } from "../api/get-worked-example.ts";
import type { FollowedExample } from "../worked/follow-example.ts";
import { Formulas } from "./formula.tsx";

/** From the deviations to shims, steps, and what to measure again. */
export function ExampleMoves({
  example,
  followed,
}: {
  example: AlignmentExample;
  followed: FollowedExample;
}) {
  const { request, result } = example;
  const { moves } = result;
  if (moves === null) return null;
  const model = planElevationOf(request, result, predictedOf(moves));
  const stacks = tabulateStacks(moves, request.units);
  return (
    <section>
      <SectionHeading>4. Deviations to shims</SectionHeading>
      <div className="sheet-stack">
        <Formulas
          label="Formula of the move and of the shims"
          lines={[
            "minimise Σ (d_i + m(z_i))² / T_i²,   m straight along z",
            "feet: left and right +v;   side keys outside: key-left +h, key-right −h",
          ]}
        />
        {followed.stacks && <NumberTable table={followed.stacks} />}
        {stacks && <NumberTable table={stacks} />}
        {followed.prediction && <NumberTable table={followed.prediction} />}
        <FigureView number={2} draw={(width) => drawPlanElevation(model, width)} />
        <div className="sheet-flow">
          {tabulateSteps(moves, request.units).map((table) => (
            <NumberTable key={table.caption} table={table} />
          ))}
        </div>
        <Remeasure stations={moves.remeasure} />
      </div>
    </section>
  );
}
