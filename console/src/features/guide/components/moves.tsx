import { FigureView } from "../../../components/ui/figure-view.tsx";
import { SectionHeading } from "../../../components/ui/section-heading.tsx";
import { fewestMoves } from "../content/fewest-moves.ts";
import { moveSolving } from "../content/move-solving.ts";
import { shimChoice } from "../content/shim-choice.ts";
import { drawShimSigns } from "../drawings/draw-shim-signs.ts";
import { MethodSheet } from "./method-sheet.tsx";

export function Moves() {
  return (
    <>
      <section>
        <SectionHeading>Moves</SectionHeading>
        <MethodSheet methods={moveSolving} />
      </section>
      <section>
        <SectionHeading>Fewest moves</SectionHeading>
        <MethodSheet methods={fewestMoves} />
      </section>
      <section>
        <SectionHeading>Shims</SectionHeading>
        <FigureView number={1} draw={drawShimSigns} />
        <div className="mt-8">
          <MethodSheet methods={shimChoice} />
        </div>
      </section>
    </>
  );
}
