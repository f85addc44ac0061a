import { useNavigate, useSearchParams } from "react-router-dom";
import { ButtonLink } from "../../components/ui/button.tsx";
import { Empty } from "../../components/ui/empty.tsx";
import { Failure } from "../../components/ui/failure.tsx";
import { PageHeading } from "../../components/ui/page-heading.tsx";
import { Pager } from "../../components/ui/pager.tsx";
import { Skeleton } from "../../components/ui/skeleton.tsx";
import { paths, serverPaths } from "../../config/paths.ts";
import { filterNames, useCalculations } from "../../features/calculations/api/list-calculations.ts";
import { CalculationsTable } from "../../features/calculations/components/calculations-table.tsx";
import { Filters } from "../../features/calculations/components/filters.tsx";
import { useKeyNames } from "../../features/keys/api/list-keys.ts";
import { useMay } from "../../lib/use-session.ts";
import { zoneName } from "../../lib/write-instant.ts";

export function CalculationsPage() {
  const [search] = useSearchParams();
  const navigate = useNavigate();
  const mayCompute = useMay("calculations:write");
  const keys = useKeyNames(useMay("keys:read"));
  return (
    <>
      <PageHeading
        title="Calculations"
        lead={`Every call leaves a record that does not change. Times are in ${zoneName()}.`}
      >
        {mayCompute && (
          <ButtonLink look="main" to={paths.tryCall}>
            Try a call
          </ButtonLink>
        )}
      </PageHeading>
      <Filters search={search} keys={keys} onApply={(next) => void navigate(addressOf(next))} />
      <CalculationsList search={search} mayCompute={mayCompute} />
    </>
  );
}

function CalculationsList({ search, mayCompute }: { search: URLSearchParams; mayCompute: boolean }) {
  const page = useCalculations(search);
  if (page.isPending) return <Skeleton what="the calculations" lines={9} />;
  if (page.isError) {
    return (
      <Failure
        error={page.error}
        what="The calculations could not be read."
        onRetry={() => void page.refetch()}
      />
    );
  }
  const { data, nextCursor } = page.data;
  if (data.length === 0) return <NothingFound search={search} mayCompute={mayCompute} />;
  return (
    <div aria-busy={page.isPlaceholderData} className={page.isPlaceholderData ? "opacity-60" : undefined}>
      <CalculationsTable records={data} />
      <Pager
        newest={search.has("cursor") ? addressOf(withCursor(search, null)) : null}
        older={nextCursor === null ? null : addressOf(withCursor(search, nextCursor))}
      />
    </div>
  );
}

function NothingFound({ search, mayCompute }: { search: URLSearchParams; mayCompute: boolean }) {
  if (filterNames.some((name) => search.has(name)) || search.has("cursor")) {
    return (
      <Empty title="No calculation fits these filters">
        Widen them, or clear them to see all.
        <p className="mt-4">
          <ButtonLink to={paths.calculations}>Clear filters</ButtonLink>
        </p>
      </Empty>
    );
  }
  return (
    <Empty title="No calculations yet">
      {mayCompute ? (
        <>
          <p>Try a call here with one of the examples, or issue a key and send one from your own software.</p>
          <p className="mt-4">
            <ButtonLink look="main" to={paths.tryCall}>
              Try a call
            </ButtonLink>
          </p>
        </>
      ) : (
        <p>
          Records appear here when a colleague or your software computes something. What it takes is written
          in{" "}
          <a className="link" href={serverPaths.docs}>
            the documents
          </a>
          .
        </p>
      )}
    </Empty>
  );
}

function addressOf(search: URLSearchParams): string {
  const query = search.toString();
  return query === "" ? paths.calculations : `${paths.calculations}?${query}`;
}

function withCursor(search: URLSearchParams, cursor: string | null): URLSearchParams {
  const next = new URLSearchParams(search);
  if (cursor === null) next.delete("cursor");
  else next.set("cursor", cursor);
  return next;
}
