import { surveyName } from "../../../../../shared/figures/job/compared-surveys.ts";
import type { JobRecord } from "../../../../../shared/schemas/jobs.ts";
import type { JobSurvey } from "../../../../../shared/schemas/job-surveys.ts";
import { Button } from "../../../components/ui/button.tsx";
import { Disclosure } from "../../../components/ui/disclosure.tsx";
import { Failure } from "../../../components/ui/failure.tsx";
import { Instant } from "../../../components/ui/instant.tsx";
import { SectionHeading } from "../../../components/ui/section-heading.tsx";
import { apiPaths } from "../../../config/paths.ts";
import { useAddToJob } from "../api/add-to-job.ts";
import { AddReading } from "./add-reading.tsx";
import { Flags } from "./flags.tsx";
import { authorName } from "./job-words.ts";
import { OpenSurvey } from "./open-survey.tsx";
import { ReadingsTable } from "./readings-table.tsx";
import { SurveyResult } from "./survey-result.tsx";
import { UploadReadings } from "./upload-readings.tsx";

/** Every survey of the job in order, and a new one. */
export function Surveys({ record, mayAct }: { record: JobRecord; mayAct: boolean }) {
  return (
    <section id="surveys" aria-label="Surveys" className="grid grid-cols-[minmax(0,1fr)] gap-8">
      <SectionHeading>Surveys</SectionHeading>
      {record.surveys.length === 0 && <p className="text-muted">No survey has been opened.</p>}
      {record.surveys.map((survey, index) => (
        <Survey key={survey.id} record={record} survey={survey} number={index + 1} mayAct={mayAct} />
      ))}
      {mayAct && (
        <Disclosure title="Open a survey">
          <OpenSurvey record={record} />
        </Disclosure>
      )}
    </section>
  );
}

interface SurveyProps {
  record: JobRecord;
  survey: JobSurvey;
  number: number;
  mayAct: boolean;
}

function Survey({ record, survey, number, mayAct }: SurveyProps) {
  const name = `Survey ${number}, ${surveyName(survey)}`;
  const counting = survey.readings.filter(({ counts }) => counts).length;
  return (
    <section aria-label={name} className="sheet-stack border-l border-rule pl-4">
      <div>
        <h3 className="font-semibold">{name}</h3>
        <p className="text-xs text-muted">
          {survey.survey.sameSetUp ? "same set-up as the survey before" : "its own set-up"}
          {survey.survey.instrument && `, ${survey.survey.instrument}`}
          {survey.survey.conditions?.ambient !== undefined &&
            survey.survey.conditions?.ambient !== null &&
            `, air ${survey.survey.conditions.ambient} °${survey.survey.conditions.temperatureUnit}`}
          , opened by {authorName(survey.author)} <Instant at={survey.createdAt} />
        </p>
      </div>
      <Flags flags={survey.flags} title={`Flags of survey ${number}`} />
      {survey.result ? (
        <SurveyResult machine={record.machine} survey={survey} result={survey.result} />
      ) : (
        <p className="text-muted">
          {counting === 0 ? "No reading counts yet: add some, then compute." : "Not computed yet."}
        </p>
      )}
      {survey.readings.length > 0 && (
        <Disclosure title={`${survey.readings.length} readings, ${counting} of which count`}>
          <ReadingsTable
            job={record.id}
            caption={`Readings of survey ${number}`}
            readings={survey.readings}
            mayAct={mayAct}
          />
        </Disclosure>
      )}
      {mayAct && (
        <div className="no-print grid gap-2">
          <Disclosure title="Add a reading">
            <AddReading record={record} survey={survey.id} />
          </Disclosure>
          <Disclosure title="Upload a file of readings">
            <UploadReadings job={record.id} survey={survey.id} />
          </Disclosure>
          {counting > 0 && (
            <ComputeSurvey job={record.id} survey={survey.id} isAgain={survey.result !== null} />
          )}
        </div>
      )}
    </section>
  );
}

function ComputeSurvey({ job, survey, isAgain }: { job: string; survey: string; isAgain: boolean }) {
  const compute = useAddToJob();
  const path = `${apiPaths.job(job)}/surveys/${encodeURIComponent(survey)}/results`;
  return (
    <div className="grid justify-items-start gap-3">
      <Button
        look={isAgain ? "plain" : "main"}
        busy={compute.isPending}
        onClick={() => compute.mutate({ path })}
      >
        {isAgain ? "Compute survey again" : "Compute survey"}
      </Button>
      {compute.isPending && (
        <p role="status" className="late text-muted">
          Computing
        </p>
      )}
      {compute.isError && <Failure error={compute.error} what="The survey was not computed." />}
    </div>
  );
}
