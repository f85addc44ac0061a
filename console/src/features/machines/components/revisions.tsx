import { Link, useSearchParams } from "react-router-dom";
import type { Machine, MachineRevisionSummary } from "../../../../../shared/schemas/machines.ts";
import { ButtonLink } from "../../../components/ui/button.tsx";
import { CopyButton } from "../../../components/ui/copy-button.tsx";
import { DataTable, type DataColumn } from "../../../components/ui/data-table.tsx";
import { Failure } from "../../../components/ui/failure.tsx";
import { Instant } from "../../../components/ui/instant.tsx";
import { SectionHeading } from "../../../components/ui/section-heading.tsx";
import { Skeleton } from "../../../components/ui/skeleton.tsx";
import { paths } from "../../../config/paths.ts";
import { authorName } from "../../jobs/components/job-words.ts";
import { useMachineRevisions } from "../api/list-revisions.ts";
import { CompareRevisions } from "./compare-revisions.tsx";

/** Who changed the machine, when and why; and what, between any two. */
export function Revisions({ machine }: { machine: Machine }) {
  const [search] = useSearchParams();
  const cursor = search.get("revisions");
  const revisions = useMachineRevisions(machine.id, cursor);
  return (
    <section aria-label="Revisions" className="sheet-stack">
      <SectionHeading>Revisions</SectionHeading>
      {revisions.isPending ? (
        <Skeleton what="the revisions" />
      ) : revisions.isError ? (
        <Failure
          error={revisions.error}
          what="The revisions could not be read."
          onRetry={() => void revisions.refetch()}
        />
      ) : (
        <>
          <DataTable
            caption="Revisions, newest first"
            columns={columnsOf(machine.id)}
            rows={revisions.data.data}
            rowKey={({ revision }) => String(revision)}
          />
          {revisions.data.nextCursor !== null && (
            <p className="no-print">
              <ButtonLink
                to={`${paths.machine(machine.id)}?revisions=${encodeURIComponent(revisions.data.nextCursor)}`}
                preventScrollReset
              >
                Older revisions
              </ButtonLink>
            </p>
          )}
        </>
      )}
      {machine.revision > 1 && <CompareRevisions id={machine.id} newest={machine.revision} />}
    </section>
  );
}

function columnsOf(id: string): DataColumn<MachineRevisionSummary>[] {
  return [
    {
      heading: "revision",
      lead: true,
      cell: ({ revision }) => (
        <Link className="link font-semibold" to={`${paths.machine(id)}?revision=${revision}`}>
          Revision {revision}
        </Link>
      ),
    },
    { heading: "why", cell: ({ reason }) => <span className="break-words">{reason}</span> },
    { heading: "who", cell: ({ by }) => authorName(by) },
    { heading: "when", cell: ({ createdAt }) => <Instant at={createdAt} /> },
    {
      heading: "hash of the document",
      cell: ({ documentHash, revision }) => (
        <span className="flex items-center gap-2">
          <span className="text-xs break-all text-muted">{documentHash.slice(0, 19)}…</span>
          <CopyButton text={documentHash} what={`hash of revision ${revision}`} />
        </span>
      ),
    },
  ];
}
