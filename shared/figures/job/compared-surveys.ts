import type { JobRecord } from "../../schemas/jobs.ts";
import type { JobSurvey, SurveyResult } from "../../schemas/job-surveys.ts";

export interface ComputedSurvey {
  readonly survey: JobSurvey;
  readonly result: SurveyResult;
  /** Among all surveys of the job, counted from 1. */
  readonly number: number;
  /** In words: "as found", "as left". */
  readonly name: string;
}

const stageWords = { as_found: "as found", after_step: "after a step", as_left: "as left" } as const;

/** The survey's name: its stage, and what people called it. */
export function surveyName({ survey: { stage, label } }: JobSurvey): string {
  return label ? `${label} (${stageWords[stage]})` : stageWords[stage];
}

/** Every survey of a job that has a result, in order. Two of one stage are told apart by their number. */
export function computedSurveys({ surveys }: Pick<JobRecord, "surveys">): ComputedSurvey[] {
  const computed = surveys.flatMap((survey, index) =>
    survey.result ? [{ survey, result: survey.result, number: index + 1 }] : [],
  );
  return computed.map(({ survey, result, number }) => {
    const words = stageWords[survey.survey.stage];
    const alone = computed.filter((other) => other.survey.survey.stage === survey.survey.stage).length === 1;
    return { survey, result, number, name: alone ? words : `${words}, survey ${number}` };
  });
}

/** What a job's figures compare: the newest survey as found (or the first at all), and the last one where it is another. */
export function comparedSurveys(record: Pick<JobRecord, "surveys">): ComputedSurvey[] {
  const computed = computedSurveys(record);
  const before = computed.filter(({ survey }) => survey.survey.stage === "as_found").at(-1) ?? computed[0];
  const after = computed.at(-1);
  return [before, after === before ? undefined : after].filter((one) => one !== undefined);
}
