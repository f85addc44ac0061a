import { useSearchParams } from "react-router-dom";
import { ButtonLink } from "../../components/ui/button.tsx";
import { Empty } from "../../components/ui/empty.tsx";
import { FilterBar } from "../../components/ui/filter-bar.tsx";
import { ListStates } from "../../components/ui/list-states.tsx";
import { NothingFits } from "../../components/ui/nothing-fits.tsx";
import { PageHeading } from "../../components/ui/page-heading.tsx";
import { SelectField } from "../../components/ui/select-field.tsx";
import { TextField } from "../../components/ui/text-field.tsx";
import { paths } from "../../config/paths.ts";
import { machineFilterNames, useMachines } from "../../features/machines/api/list-machines.ts";
import { MachinesTable } from "../../features/machines/components/machines-table.tsx";
import { useMay } from "../../lib/use-session.ts";

export function MachinesPage() {
  const [search] = useSearchParams();
  const mayWrite = useMay("machines:write");
  const machines = useMachines(search);
  return (
    <>
      <PageHeading
        title="Machines"
        lead="Bores along z, the parts that carry them, what those rest on, and the shims at hand."
      >
        {mayWrite && (
          <ButtonLink look="main" to={paths.newMachine}>
            Describe a machine
          </ButtonLink>
        )}
      </PageHeading>
      <FilterBar label="Filter machines" path={paths.machines} search={search} names={machineFilterNames}>
        <TextField
          label="Name or id"
          type="search"
          name="q"
          maxLength={100}
          defaultValue={search.get("q") ?? ""}
        />
        <SelectField
          label="Archived"
          name="archived"
          defaultValue={search.get("archived") ?? ""}
          options={[
            { value: "", words: "no" },
            { value: "true", words: "yes" },
          ]}
        />
      </FilterBar>
      <ListStates
        list={machines}
        what="the machines"
        path={paths.machines}
        search={search}
        empty={<NothingFound search={search} mayWrite={mayWrite} />}
      >
        {(found) => <MachinesTable machines={found} mayWrite={mayWrite} />}
      </ListStates>
    </>
  );
}

function NothingFound({ search, mayWrite }: { search: URLSearchParams; mayWrite: boolean }) {
  if (search.size > 0) {
    return <NothingFits what="machine" path={paths.machines} shows="all in use" />;
  }
  return (
    <Empty title="No machines yet">
      {mayWrite ? (
        <>
          <p>Describe one from a JSON file, or begin with the example.</p>
          <p className="mt-4">
            <ButtonLink look="main" to={paths.newMachine}>
              Describe a machine
            </ButtonLink>
          </p>
        </>
      ) : (
        "An engineer or an administrator describes machines here."
      )}
    </Empty>
  );
}
