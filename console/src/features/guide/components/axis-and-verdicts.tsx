import { FigureView } from "../../../components/ui/figure-view.tsx";
import { SectionHeading } from "../../../components/ui/section-heading.tsx";
import { axisMethods } from "../content/axis-methods.ts";
import { verdictRules } from "../content/verdict-rules.ts";
import { drawDeviation } from "../drawings/draw-deviation.ts";
import { drawGuard } from "../drawings/draw-guard.ts";
import { MethodSheet } from "./method-sheet.tsx";

export function AxisAndVerdicts() {
  return (
    <>
      <section>
        <SectionHeading>Reference axis</SectionHeading>
        <FigureView number={1} draw={drawDeviation} />
        <div className="mt-8">
          <MethodSheet methods={axisMethods} />
        </div>
      </section>
      <section>
        <SectionHeading>Deviations and verdicts</SectionHeading>
        <FigureView number={2} draw={drawGuard} />
        <div className="mt-8">
          <MethodSheet methods={verdictRules} />
        </div>
      </section>
    </>
  );
}
