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
  const [search, setSearch] = useSearchParams();
  const record = useCalculation(id);
  const member = useMember();
  const mayReplay = useMay("calculations:write");
  if (record.isPending) {
    return (
      <>
        <PageHeading title="Record" />
        <Skeleton what="the record" lines={12} />
      </>
    );
  }
  if (record.isError) {
    return (
      <>
        <PageHeading title="Record" />
        {isAbsent(record.error) ? (
          <NoSuchRecord />
        ) : (
          <Failure error={record.error} what="The record could not be read." onRetry={() => void record.refetch()} />
        )}
      </>
    );
  }
  return (
    <>
      <nav aria-label="Breadcrumb" className="no-print mb-2 text-xs text-muted">
        <Link className="link" to={paths.calculations}>
          Calculations
        </Link>
      </nav>
      <PageHeading
        title={computations[record.data.kind].name}
        lead={
          <span className="flex items-center gap-2 text-xs">
            <span className="break-all">{record.data.id}</span>
            <CopyButton text={record.data.id} what="record id" />
          </span>
        }
      >
        <Button onClick={() => window.print()}>Print sheet</Button>
      </PageHeading>
      <RecordSheet
        record={record.data}
        owner={member?.organisation.name ?? ""}
        mayReplay={mayReplay}
        chosen={search.get("bore")}
        onChoose={(bore) => setSearch({ bore }, { replace: true, preventScrollReset: true })}
      />
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
