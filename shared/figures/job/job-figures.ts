import type { JobRecord } from "../../schemas/jobs.ts";
import { drawBoreSection } from "../bore-section/draw-bore-section.ts";
import { drawEndView } from "../end-view/draw-end-view.ts";
import { drawPlanElevation } from "../plan-elevation/draw-plan-elevation.ts";
import type { Figure } from "../shape.ts";
import { computedSurveys } from "./compared-surveys.ts";
import { boreSectionOfJob, endViewOfJob, planElevationOfJob } from "./job-models.ts";

/** One figure of a job, not drawn yet. */
export interface JobFigure {
  /** As it stands in addresses: plan-elevation, end-view, bore-<survey>-<station>, both counted from 1. */
  readonly id: string;
  readonly title: string;
  /** Of a bore section: whose. Null elsewhere. */
  readonly survey: string | null;
  readonly station: string | null;
  /** For a sheet so many millimetres wide. */
  readonly draw: (width: number) => Figure;
}

/** Every figure that a job has. */
export function jobFigures(record: JobRecord): JobFigure[] {
  const planElevation = planElevationOfJob(record);
  const endView = endViewOfJob(record);
  const whole = { survey: null, station: null };
  return [
    ...(planElevation
      ? [
          {
            id: "plan-elevation",
            title: "Plan and elevation",
            ...whole,
            draw: (width: number) => drawPlanElevation(planElevation, width),
          },
        ]
      : []),
    ...(endView
      ? [
          {
            id: "end-view",
            title: "End view",
            ...whole,
            draw: (width: number) => drawEndView(endView, width),
          },
        ]
      : []),
    ...boreFigures(record),
  ];
}

function boreFigures(record: JobRecord): JobFigure[] {
  return computedSurveys(record).flatMap((computed) => {
    const surveyNumber = record.surveys.indexOf(computed.survey) + 1;
    return record.machine.stations.flatMap(({ id }, index): JobFigure[] => {
      const model = boreSectionOfJob(record, computed, id);
      if (!model) return [];
      const title = `Bore section ${id}, ${computed.name}`;
      return [
        {
          id: `bore-${surveyNumber}-${index + 1}`,
          title,
          survey: computed.survey.id,
          station: id,
          draw: (width) => ({ ...drawBoreSection(model, width), title }),
        },
      ];
    });
  });
}
