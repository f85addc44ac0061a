import { useNavigate, useSearchParams } from "react-router-dom";
import { ButtonLink } from "../../components/ui/button.tsx";
import { Empty } from "../../components/ui/empty.tsx";
import { ListStates } from "../../components/ui/list-states.tsx";
import { NothingFits } from "../../components/ui/nothing-fits.tsx";
import { PageHeading } from "../../components/ui/page-heading.tsx";
import { paths, serverPaths } from "../../config/paths.ts";
import { filterNames, useCalculations } from "../../features/calculations/api/list-calculations.ts";
import { CalculationsTable } from "../../features/calculations/components/calculations-table.tsx";
import { Filters } from "../../features/calculations/components/filters.tsx";
import { useKeyNames } from "../../features/keys/api/list-keys.ts";
import { addressOf } from "../../lib/address-of.ts";
import { useMay } from "../../lib/use-session.ts";
import { zoneName } from "../../lib/write-instant.ts";

export function CalculationsPage() {
  const [search] = useSearchParams();
  const navigate = useNavigate();
  const calculations = useCalculations(search);
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
      <Filters
        search={search}
        keys={keys}
        onApply={(next) => void navigate(addressOf(paths.calculations, next))}
      />
      <ListStates
        list={calculations}
        what="the calculations"
        path={paths.calculations}
        search={search}
        empty={<NothingFound search={search} mayCompute={mayCompute} />}
      >
        {(found) => <CalculationsTable records={found} />}
      </ListStates>
    </>
  );
}

function NothingFound({ search, mayCompute }: { search: URLSearchParams; mayCompute: boolean }) {
  if (filterNames.some((name) => search.has(name)) || search.has("cursor")) {
    return <NothingFits what="calculation" path={paths.calculations} shows="all" />;
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
