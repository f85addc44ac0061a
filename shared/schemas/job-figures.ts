import { z } from "zod";

/** plan-elevation, end-view, or bore-<survey>-<station>, both counted from 1 in the order of the record. */
export const figureId = z.string().regex(/^(plan-elevation|end-view|bore-[1-9]\d{0,4}-[1-9]\d{0,4})$/);

export const jobFigureList = z
  .object({
    data: z.array(
      z
        .object({
          id: figureId,
          title: z.string(),
          survey: z.uuid().nullable().meta({ description: "Of a bore section: the survey it was read in." }),
          station: z.string().nullable().meta({ description: "Of a bore section: the station." }),
          href: z.string().meta({ description: "Address of the figure as SVG." }),
        })
        .meta({ id: "JobFigure" }),
    ),
  })
  .meta({
    id: "JobFigureList",
    description: "Every figure that the job has: none before a survey is computed.",
  });
