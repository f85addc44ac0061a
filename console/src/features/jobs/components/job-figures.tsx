import type { ReactNode } from "react";
import { drawEndView } from "../../../../../shared/figures/end-view/draw-end-view.ts";
import { comparedSurveys } from "../../../../../shared/figures/job/compared-surveys.ts";
import { endViewOfJob, planElevationOfJob } from "../../../../../shared/figures/job/job-models.ts";
import { drawPlanElevation } from "../../../../../shared/figures/plan-elevation/draw-plan-elevation.ts";
import type { JobRecord } from "../../../../../shared/schemas/jobs.ts";
import { FigureView } from "../../../components/ui/figure-view.tsx";
import { VerdictSummary } from "../../results/components/verdict-summary.tsx";

/** As found and as left together, how the newest survey came out, then what needs a person, then the end view. */
export function JobFigures({ record, children }: { record: JobRecord; children: ReactNode }) {
  const planElevation = planElevationOfJob(record);
  const endView = endViewOfJob(record);
  const newest = comparedSurveys(record).at(-1);
  if (!planElevation || !endView || !newest) {
    return (
      <>
        <p className="border border-hair px-4 py-6 text-muted">
          The figure stands here as soon as a survey is computed.
        </p>
        {children}
      </>
    );
  }
  return (
    <>
      <FigureView number={2} draw={(width) => drawPlanElevation(planElevation, width)} />
      <section aria-label="How it came out" className="grid gap-2">
        <p className="field-name">Of the survey {newest.name}</p>
        <VerdictSummary summary={newest.result.summary} />
      </section>
      {children}
      <FigureView number={3} draw={(width) => drawEndView(endView, width)} />
    </>
  );
}
