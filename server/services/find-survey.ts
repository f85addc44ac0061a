import { HttpProblem } from "../http/http-problem.ts";
import type { JobEntry, SurveyState } from "../jobs/job-log.ts";

/** @throws HttpProblem not_found */
export function surveyOf(surveys: readonly SurveyState[], id: string): SurveyState {
  const survey = surveys.find(({ entry }) => entry.id === id);
  if (!survey) throw new HttpProblem("not_found", "The job has no survey with this id.");
  return survey;
}

/** @throws HttpProblem not_found, survey_not_computed */
export function computedSurvey(
  surveys: readonly SurveyState[],
  id: string,
): { readonly survey: SurveyState; readonly result: JobEntry<"survey_result"> } {
  const survey = surveyOf(surveys, id);
  if (!survey.result || !survey.isCurrent) {
    throw new HttpProblem("survey_not_computed", `Survey ${id} has readings that were not computed yet.`);
  }
  return { survey, result: survey.result };
}
