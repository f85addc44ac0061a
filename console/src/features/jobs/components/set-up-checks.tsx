import { useRef } from "react";
import { limits } from "../../../../../shared/limits.ts";
import type { JobRecord } from "../../../../../shared/schemas/jobs.ts";
import { Button } from "../../../components/ui/button.tsx";
import { Failure } from "../../../components/ui/failure.tsx";
import { Instant } from "../../../components/ui/instant.tsx";
import { SectionHeading } from "../../../components/ui/section-heading.tsx";
import { apiPaths } from "../../../config/paths.ts";
import { useAddToJob } from "../api/add-to-job.ts";
import { answerWords } from "./job-words.ts";

type Check = JobRecord["checks"][number];

/** What has to be so before a survey can be trusted; the latest answer counts. */
export function SetUpChecks({ record, mayAct }: { record: JobRecord; mayAct: boolean }) {
  const open = record.checks.filter(({ answer }) => answer === null).length;
  return (
    <section id="checks" aria-label="Set-up checks">
      <SectionHeading aside={open > 0 && <span className="text-signal">{open} not answered</span>}>
        Set-up checks
      </SectionHeading>
      <ul className="grid">
        {record.checks.map((check) => (
          <li key={check.check} className="grid gap-x-6 gap-y-2 border-b border-hair py-2.5 lg:grid-cols-2">
            <CheckAnswer check={check} />
            {mayAct && <AnswerCheck job={record.id} check={check} />}
          </li>
        ))}
      </ul>
    </section>
  );
}

function CheckAnswer({ check: { text, answer, by, at, remark } }: { check: Check }) {
  return (
    <div className="min-w-0">
      <p>{text}</p>
      <p className="text-xs text-muted">
        {answer === null ? (
          <span className="text-signal">not answered</span>
        ) : (
          <>
            <strong className={answer === "no" ? "font-semibold text-signal" : "font-semibold text-ink"}>
              {answerWords[answer]}
            </strong>
            {by !== null && `, ${by}`}
            {at !== null && (
              <>
                , <Instant at={at} />
              </>
            )}
          </>
        )}
        {remark !== null && <span className="block break-words">{remark}</span>}
      </p>
    </div>
  );
}

function AnswerCheck({ job, check: { check, text } }: { job: string; check: Check }) {
  const remark = useRef<HTMLInputElement>(null);
  const add = useAddToJob();
  const answer = (chosen: keyof typeof answerWords): void => {
    const typed = remark.current?.value.trim() ?? "";
    add.mutate(
      {
        path: `${apiPaths.job(job)}/checks`,
        body: { check, answer: chosen, ...(typed === "" ? {} : { remark: typed }) },
      },
      {
        onSuccess: () => {
          if (remark.current) remark.current.value = "";
        },
      },
    );
  };
  return (
    <fieldset className="no-print min-w-0">
      <legend className="sr-only">{text}</legend>
      <div className="flex flex-wrap gap-2">
        {(["yes", "no", "not_applicable"] as const).map((chosen) => (
          <Button key={chosen} busy={add.isPending} onClick={() => answer(chosen)}>
            {chosen === "not_applicable" ? "n/a" : answerWords[chosen]}
          </Button>
        ))}
        <input
          ref={remark}
          aria-label="Remark"
          placeholder="Remark"
          maxLength={limits.noteLength}
          className="control min-w-40 flex-1"
        />
      </div>
      {add.isError && (
        <div className="mt-2">
          <Failure error={add.error} what="The answer was not stored." />
        </div>
      )}
    </fieldset>
  );
}
