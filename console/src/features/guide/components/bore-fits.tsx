import { FigureView } from "../../../components/ui/figure-view.tsx";
import { SectionHeading } from "../../../components/ui/section-heading.tsx";
import { circleCriteria, limitingSays } from "../content/circle-criteria.ts";
import { fitQuality } from "../content/fit-quality.ts";
import { readingForms } from "../content/reading-forms.ts";
import { drawCriteria } from "../drawings/draw-criteria.ts";
import { drawForms } from "../drawings/draw-forms.ts";
import { MethodSheet } from "./method-sheet.tsx";
import { Sentences } from "./sentences.tsx";

export function BoreFits() {
  return (
    <>
      <section>
        <SectionHeading>Forms of reading</SectionHeading>
        <FigureView number={1} draw={drawForms} />
        <div className="mt-8">
          <MethodSheet methods={readingForms} />
        </div>
      </section>
      <section>
        <SectionHeading>Criteria</SectionHeading>
        <FigureView number={2} draw={drawCriteria} />
        <div className="mt-8">
          <MethodSheet methods={circleCriteria} />
        </div>
        <div className="mt-6">
          <Sentences lines={limitingSays} />
        </div>
      </section>
      <section>
        <SectionHeading>Size, slips and uncertainty</SectionHeading>
        <MethodSheet methods={fitQuality} />
      </section>
    </>
  );
}
