import { Link, useParams, useSearchParams } from "react-router-dom";
import type { Machine } from "../../../../shared/schemas/machines.ts";
import { Breadcrumb } from "../../components/ui/breadcrumb.tsx";
import { Button, ButtonLink } from "../../components/ui/button.tsx";
import { CopyButton } from "../../components/ui/copy-button.tsx";
import { DownloadButton } from "../../components/ui/download-button.tsx";
import { Failure } from "../../components/ui/failure.tsx";
import { PageHeading } from "../../components/ui/page-heading.tsx";
import { Skeleton } from "../../components/ui/skeleton.tsx";
import { apiPaths, paths } from "../../config/paths.ts";
import { useMachine, useMachineRevision } from "../../features/machines/api/get-machine.ts";
import { ArchiveMachine } from "../../features/machines/components/archive-machine.tsx";
import { CopyMachine } from "../../features/machines/components/copy-machine.tsx";
import { MachineSheet } from "../../features/machines/components/machine-sheet.tsx";
import { MachineStates } from "../../features/machines/components/machine-states.tsx";
import { MachineTitleBlock } from "../../features/machines/components/machine-title-block.tsx";
import { Revisions } from "../../features/machines/components/revisions.tsx";
import { useMay, useMember } from "../../lib/use-session.ts";

export function MachinePage() {
  const { id = "" } = useParams();
  const machine = useMachine(id);
  const mayWrite = useMay("machines:write");
  const mayStart = useMay("jobs:write");
  const read = machine.data;
  return (
    <>
      <Breadcrumb steps={[{ to: paths.machines, words: "Machines" }]} />
      <PageHeading title={read?.name ?? "Machine"} lead={<Lead id={id} machine={read} />}>
        {read && (
          <>
            <ButtonLink to={paths.machineHistory(id)}>History</ButtonLink>
            <ButtonLink to={`${paths.jobs}?machineId=${id}`}>Jobs</ButtonLink>
            {mayWrite && <ButtonLink to={paths.editMachine(id)}>Change machine</ButtonLink>}
            {mayWrite && <CopyMachine machine={read} />}
            {mayWrite && <ArchiveMachine machine={read} />}
            <DownloadButton
              path={`${apiPaths.machine(id)}/workbook`}
              fileName={`machine-${id}-revision-${read.revision}.xlsx`}
            >
              Workbook (XLSX)
            </DownloadButton>
            <Button onClick={() => window.print()}>Print sheet</Button>
            {mayStart && !read.archived && (
              <ButtonLink look="main" to={`${paths.newJob}?machine=${id}`}>
                Start a job
              </ButtonLink>
            )}
          </>
        )}
      </PageHeading>
      <MachineStates machine={machine}>{(newest) => <Sheet machine={newest} />}</MachineStates>
    </>
  );
}

function Sheet({ machine }: { machine: Machine }) {
  const [search] = useSearchParams();
  const chosen = search.get("revision");
  const isOlder = chosen !== null && chosen !== String(machine.revision);
  const older = useMachineRevision(machine.id, isOlder ? chosen : null);
  const member = useMember();
  const organisation = member?.organisation.name ?? "";
  return (
    <article className="sheet-stack">
      {isOlder && (
        <p className="border-2 border-ink bg-well px-4 py-3">
          This is revision {chosen} of {machine.revision}.{" "}
          <Link className="link" to={paths.machine(machine.id)}>
            See the newest
          </Link>
        </p>
      )}
      {!isOlder ? (
        <MachineSheet document={machine.document} />
      ) : older.isPending ? (
        <Skeleton what="the revision" lines={12} />
      ) : older.isError ? (
        <Failure
          error={older.error}
          what="The revision could not be read."
          onRetry={() => void older.refetch()}
        />
      ) : (
        <MachineSheet document={older.data.document} />
      )}
      <Revisions machine={machine} />
      <MachineTitleBlock machine={machine} revision={older.data ?? null} organisation={organisation} />
    </article>
  );
}

function Lead({ id, machine }: { id: string; machine: Machine | undefined }) {
  return (
    <>
      {machine && (
        <span className="block text-ink">
          {machine.plantTag !== null && `${machine.plantTag}, `}revision {machine.revision}
          {machine.archived && ", archived"}
        </span>
      )}
      <span className="mt-1 flex items-center gap-2 text-xs">
        <span className="break-all">{id}</span>
        <CopyButton text={id} what="machine id" />
      </span>
    </>
  );
}
