import type { JobRecord } from "../../../../../shared/schemas/jobs.ts";
import { Instant } from "../../../components/ui/instant.tsx";
import { Attachments } from "./attachments.tsx";
import { Comments } from "./comments.tsx";
import { AxisAcceptances, Concessions } from "./concessions.tsx";
import { Confirmations } from "./confirmations.tsx";
import { FollowMove } from "./follow-move.tsx";
import { Flags } from "./flags.tsx";
import { MakerCautions } from "../../machines/components/maker-cautions.tsx";
import { JobDetails } from "./job-details.tsx";
import { JobFigures } from "./job-figures.tsx";
import { JobLog } from "./job-log.tsx";
import { JobTitleBlock } from "./job-title-block.tsx";
import { Moves } from "./moves.tsx";
import { Obstacles } from "./obstacles.tsx";
import { Plans } from "./plans.tsx";
import { Reports } from "./reports.tsx";
import { ReviseJob } from "./revise-job.tsx";
import { SheetContents } from "./sheet-contents.tsx";
import { SetUpChecks } from "./set-up-checks.tsx";
import { Sign } from "./sign.tsx";
import { Surveys } from "./surveys.tsx";

interface JobSheetProps {
  record: JobRecord;
  organisation: string;
  /** Whether this is the newest revision: an older one can only be read. */
  isNewest: boolean;
  mayWrite: boolean;
}

/** A job as a sheet: the figure first, what needs a person next, then the work in its order, the title block at its foot. */
export function JobSheet({ record, organisation, isNewest, mayWrite }: JobSheetProps) {
  const isOpen = record.signature === null;
  const mayAct = mayWrite && isNewest && isOpen;
  return (
    <article className="sheet-stack">
      {record.signature && (
        <Signed signature={record.signature}>{mayWrite && isNewest && <ReviseJob job={record.id} />}</Signed>
      )}
      <SheetContents />
      <JobFigures record={record}>
        <Flags flags={record.flags} />
      </JobFigures>
      <MakerCautions cautions={record.machine.cautions ?? []} />
      {isOpen && isNewest && <Obstacles signOff={record.signOff} />}
      <SetUpChecks record={record} mayAct={mayAct} />
      <Surveys record={record} mayAct={mayAct} />
      <Plans record={record} mayAct={mayAct} />
      {isNewest && <FollowMove record={record} mayAct={mayAct} />}
      <Moves record={record} mayAct={mayAct} />
      <Confirmations record={record} mayAct={mayAct} />
      <Concessions record={record} mayAct={mayAct} />
      <AxisAcceptances record={record} mayAct={mayAct} />
      <Comments record={record} mayAct={mayAct} />
      <Attachments record={record} mayAct={mayAct} />
      <JobDetails record={record} mayAct={mayAct} />
      {mayAct && <Sign record={record} />}
      <Reports record={record} />
      {isNewest && <JobLog job={record.id} />}
      <JobTitleBlock record={record} organisation={organisation} />
    </article>
  );
}

function Signed({
  signature: { name, meaning, createdAt },
  children,
}: {
  signature: NonNullable<JobRecord["signature"]>;
  children: React.ReactNode;
}) {
  return (
    <section
      aria-label="Signed"
      className="flex flex-wrap items-center justify-between gap-4 border-2 border-ink bg-well px-4 py-3"
    >
      <p className="min-w-0">
        <strong className="font-semibold">Signed</strong> by {name}, <Instant at={createdAt} />: {meaning}
        <span className="block text-muted">This revision changes no more.</span>
      </p>
      {children}
    </section>
  );
}
