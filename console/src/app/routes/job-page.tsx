import { Link, useParams, useSearchParams } from "react-router-dom";
import type { JobRecord } from "../../../../shared/schemas/jobs.ts";
import { Breadcrumb } from "../../components/ui/breadcrumb.tsx";
import { Button, ButtonLink } from "../../components/ui/button.tsx";
import { CopyButton } from "../../components/ui/copy-button.tsx";
import { Empty } from "../../components/ui/empty.tsx";
import { Failure } from "../../components/ui/failure.tsx";
import { PageHeading } from "../../components/ui/page-heading.tsx";
import { Skeleton } from "../../components/ui/skeleton.tsx";
import { paths } from "../../config/paths.ts";
import { useJob } from "../../features/jobs/api/get-job.ts";
import { JobSheet } from "../../features/jobs/components/job-sheet.tsx";
import { ProblemError } from "../../lib/service-error.ts";
import { useMay, useMember } from "../../lib/use-session.ts";

export function JobPage() {
  const { id = "" } = useParams();
  const [search] = useSearchParams();
  const revision = search.get("revision");
  const job = useJob(id, revision);
  const member = useMember();
  const mayWrite = useMay("jobs:write");
  const record = job.data;
  return (
    <>
      <Breadcrumb steps={[{ to: paths.jobs, words: "Jobs" }]} />
      <PageHeading title={record?.title ?? "Job"} lead={<Lead id={id} record={record} />}>
        {record && <Button onClick={() => window.print()}>Print sheet</Button>}
      </PageHeading>
      {/* A read that fails later leaves the sheet where it is: forms on it hold what was typed. */}
      {job.isError && !isAbsent(job.error) && (
        <div className="mb-6">
          <Failure error={job.error} what="The job could not be read." onRetry={() => void job.refetch()} />
        </div>
      )}
      {record ? (
        <>
          <Revisions record={record} shown={revision} />
          <JobSheet
            key={`${id} ${revision ?? ""}`}
            record={record}
            organisation={member?.organisation.name ?? ""}
            isNewest={revision === null}
            mayWrite={mayWrite}
          />
        </>
      ) : job.isPending ? (
        <Skeleton what="the job" lines={12} />
      ) : (
        isAbsent(job.error) && (
          <Empty title="There is no job with this id">
            It may belong to another organisation, or the id is cut short.
            <p className="mt-4">
              <ButtonLink to={paths.jobs}>See all jobs</ButtonLink>
            </p>
          </Empty>
        )
      )}
    </>
  );
}

function Lead({ id, record }: { id: string; record: JobRecord | undefined }) {
  return (
    <>
      {record && (
        <span className="block text-ink">
          <Link className="link" to={paths.machine(record.machineId)}>
            {record.machineName}
          </Link>
          , revision {record.revision}, {record.state === "signed" ? "signed" : "open, a draft until signed"}
        </span>
      )}
      <span className="mt-1 flex items-center gap-2 text-xs">
        <span className="break-all">{id}</span>
        <CopyButton text={id} what="job id" />
      </span>
    </>
  );
}

/** Where there is more than one: which is shown, and the way to the others. */
function Revisions({ record, shown }: { record: JobRecord; shown: string | null }) {
  const newest = record.revisions.at(-1)?.revision ?? record.revision;
  if (record.revisions.length < 2) return null;
  return (
    <nav aria-label="Revisions of the job" className="mb-6 border-y border-hair py-3">
      <ul className="grid gap-1">
        {record.revisions.map(({ revision, reason, signedAt }) => {
          const isShown = String(revision) === (shown ?? String(newest));
          return (
            <li key={revision}>
              {isShown ? (
                <strong className="font-semibold" aria-current="page">
                  Revision {revision}
                </strong>
              ) : (
                <Link
                  className="link"
                  to={paths.job(record.id) + (revision === newest ? "" : `?revision=${revision}`)}
                >
                  Revision {revision}
                </Link>
              )}
              <span className="text-muted">
                {signedAt === null ? ", open" : `, signed ${signedAt.slice(0, 10)}`}
                {reason !== null && `: ${reason}`}
              </span>
            </li>
          );
        })}
      </ul>
    </nav>
  );
}

function isAbsent(error: unknown): boolean {
  return error instanceof ProblemError && error.problem.status === 404;
}
