import {
  asFoundReadings,
  asFoundSurvey,
  asLeftReadings,
  asLeftSurvey,
  fellgateChecks,
  fellgateJobDetails,
  movesAsPlanned,
} from "../../server/demo/fellgate-job.ts";
import { writeFellgateJob } from "./job-record.ts";

/** The files of `examples/jobs/`, by name: the demo's job as the driven example sends it. */
export function jobExampleFiles(): Record<string, unknown> {
  const record = writeFellgateJob("planned").record();
  const [survey] = record.surveys;
  const [plan] = record.plans;
  if (!survey?.result || !plan) throw new Error("The demo's job has no plan.");
  return {
    "details.json": fellgateJobDetails,
    "checks.json": fellgateChecks,
    "as-found-survey.json": asFoundSurvey,
    "as-found-readings.json": asFoundReadings(),
    "moves.json": movesAsPlanned(plan.result),
    "as-left-survey.json": asLeftSurvey,
    "as-left-readings.json": asLeftReadings(survey.result, plan.result),
  };
}
