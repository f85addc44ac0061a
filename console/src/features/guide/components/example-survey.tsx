import { boreSectionOf } from "../../../../../shared/figures/bore-section/bore-section-of.ts";
import { drawBoreSection } from "../../../../../shared/figures/bore-section/draw-bore-section.ts";
import { tabulateBoreFits } from "../../../../../shared/figures/bore-section/tabulate-bore-fits.ts";
import { FigureView } from "../../../components/ui/figure-view.tsx";
import { NumberTable } from "../../../components/ui/number-table.tsx";
import { SectionHeading } from "../../../components/ui/section-heading.tsx";
import type { AlignmentExample } from "../api/get-worked-example.ts";
import type { FollowedExample } from "../worked/follow-example.ts";
import { Formulas } from "./formula.tsx";

interface ExampleProps {
  example: AlignmentExample;
  followed: FollowedExample;
}

/** From readings to a verdict. */
export function ExampleSurvey({ example, followed }: ExampleProps) {
  return (
    <>
      <section>
        <SectionHeading>1. Readings to a centre</SectionHeading>
        <div className="sheet-stack">
          <Formulas
            label="Formula of a turned gauge's points and of the circle through them"
            lines={[
              "r_i = D/2 ± reading_i,   h_i = r_i · sin(clockDeg_i),   v_i = r_i · cos(clockDeg_i)",
              "minimise Σ (|p_i − c| − R)²",
            ]}
          />
          <div className="sheet-stack items-start xl:grid-cols-2">
            <Section example={example} boreIndex={followed.boreIndex} />
            {followed.points && <NumberTable table={followed.points} />}
          </div>
          <NumberTable table={tabulateBoreFits(example.result.fits, example.request.units)} />
          {followed.fit && <NumberTable table={followed.fit} />}
        </div>
      </section>
      <section>
        <SectionHeading>2. Centres to the reference axis</SectionHeading>
        <div className="sheet-stack">
          <Formulas
            label="Formula of the axis"
            lines={["centre − target = a + b · z, at the reference stations"]}
          />
          {followed.axis.map((table) => (
            <NumberTable key={table.caption} table={table} />
          ))}
        </div>
      </section>
      <section>
        <SectionHeading>3. Deviation and verdict</SectionHeading>
        <div className="sheet-stack">
          <Formulas
            label="Formula of the deviation and of its uncertainty"
            lines={["d = centre − target − axis(z)", "U = k_2 · √(larger eigenvalue of the covariance of d)"]}
          />
          {followed.deviation && <NumberTable table={followed.deviation} />}
          {followed.verdict !== null && <p>{followed.verdict}</p>}
        </div>
      </section>
    </>
  );
}

function Section({
  example: { request, result },
  boreIndex,
}: Pick<ExampleProps, "example"> & { boreIndex: number }) {
  const [bore, fit] = [request.bores[boreIndex], result.fits[boreIndex]];
  const model = bore && fit ? boreSectionOf(bore, fit, request.units, request.seen) : null;
  if (!model) return null;
  return <FigureView number={1} printWidthMm={130} draw={(width) => drawBoreSection(model, width)} />;
}
