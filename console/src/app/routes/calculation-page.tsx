import type { CalculationRecord } from "../../../../shared/schemas/calculations.ts";
import { Link, useParams, useSearchParams } from "react-router-dom";
import { Button, ButtonLink } from "../../components/ui/button.tsx";
import { CopyButton } from "../../components/ui/copy-button.tsx";
import { Empty } from "../../components/ui/empty.tsx";
import { Failure } from "../../components/ui/failure.tsx";
import { PageHeading } from "../../components/ui/page-heading.tsx";
import { Skeleton } from "../../components/ui/skeleton.tsx";
import { computations, paths } from "../../config/paths.ts";
import { useCalculation } from "../../features/calculations/api/get-calculation.ts";
import { RecordSheet } from "../../features/calculations/components/record-sheet.tsx";
import { ProblemError } from "../../lib/service-error.ts";
import { useMay, useMember } from "../../lib/use-session.ts";

export function CalculationPage() {
  const { id = "" } = useParams();
  const record = useCalculation(id);
  return (
    <>
      <nav aria-label="Breadcrumb" className="no-print mb-2 text-xs text-muted">
        <Link className="link" to={paths.calculations}>
          Calculations
        </Link>
      </nav>
      <PageHeading
        title={record.isSuccess ? computations[record.data.kind].name : "Record"}
        lead={<RecordLead id={id} note={record.data?.note ?? null} />}
      >
        {record.isSuccess && <Button onClick={() => window.print()}>Print sheet</Button>}
      </PageHeading>
      {record.isPending ? (
        <Skeleton what="the record" lines={12} />
      ) : record.isSuccess ? (
        <Sheet record={record.data} />
      ) : isAbsent(record.error) ? (
        <NoSuchRecord />
      ) : (
        <Failure
          error={record.error}
          what="The record could not be read."
          onRetry={() => void record.refetch()}
        />
      )}
    </>
  );
}

function Sheet({ record }: { record: CalculationRecord }) {
  const [search, setSearch] = useSearchParams();
  const member = useMember();
  return (
    <RecordSheet
      record={record}
      owner={member?.organisation.name ?? ""}
      mayReplay={useMay("calculations:write")}
      chosen={search.get("bore")}
      onChoose={(bore) => setSearch({ bore }, { replace: true, preventScrollReset: true })}
    />
  );
}

/** What the caller wrote beside the call, then the id to name it by. */
function RecordLead({ id, note }: { id: string; note: string | null }) {
  return (
    <>
      {note !== null && note !== "" && (
        <span className="block break-words whitespace-pre-line text-ink">{note}</span>
      )}
      <span className="mt-1 flex items-center gap-2 text-xs">
        <span className="break-all">{id}</span>
        <CopyButton text={id} what="record id" />
      </span>
    </>
  );
}

function NoSuchRecord() {
  return (
    <Empty title="There is no record with this id">
      It may belong to another organisation, or the id is cut short.
      <p className="mt-4">
        <ButtonLink to={paths.calculations}>See all calculations</ButtonLink>
      </p>
    </Empty>
  );
}

function isAbsent(error: unknown): boolean {
  return error instanceof ProblemError && error.problem.status === 404;
}
