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
import { jobFilterNames, useJobs } from "../../features/jobs/api/list-jobs.ts";
import { JobsTable } from "../../features/jobs/components/jobs-table.tsx";
import { useMachineChoices } from "../../features/machines/api/list-machines.ts";
import { useMay } from "../../lib/use-session.ts";
import { zoneName } from "../../lib/write-instant.ts";

export function JobsPage() {
  const [search] = useSearchParams();
  const mayWrite = useMay("jobs:write");
  const jobs = useJobs(search);
  const machines = useMachineChoices();
  const chosen = (name: string): string => search.get(name) ?? "";
  return (
    <>
      <PageHeading
        title="Jobs"
        lead={`One outage of one machine, from as found to the signature. Times are in ${zoneName()}.`}
      >
        {mayWrite && (
          <ButtonLink look="main" to={paths.newJob}>
            Start a job
          </ButtonLink>
        )}
      </PageHeading>
      <FilterBar label="Filter jobs" path={paths.jobs} search={search} names={jobFilterNames}>
        <SelectField
          label="Machine"
          name="machineId"
          defaultValue={chosen("machineId")}
          options={[
            { value: "", words: "any" },
            ...(machines.data?.data ?? []).map(({ id, name }) => ({ value: id, words: name })),
          ]}
        />
        <SelectField
          label="State"
          name="state"
          defaultValue={chosen("state")}
          options={[
            { value: "", words: "any" },
            { value: "open", words: "open" },
            { value: "signed", words: "signed" },
          ]}
        />
        <TextField label="Title or id" type="search" name="q" maxLength={100} defaultValue={chosen("q")} />
      </FilterBar>
      <ListStates
        list={jobs}
        what="the jobs"
        path={paths.jobs}
        search={search}
        empty={<NothingFound search={search} mayWrite={mayWrite} />}
      >
        {(found) => <JobsTable jobs={found} />}
      </ListStates>
    </>
  );
}

function NothingFound({ search, mayWrite }: { search: URLSearchParams; mayWrite: boolean }) {
  if (search.size > 0) {
    return <NothingFits what="job" path={paths.jobs} shows="all" />;
  }
  return (
    <Empty title="No jobs yet">
      {mayWrite ? (
        <>
          <p>Describe a machine first, then start a job on it.</p>
          <p className="mt-4 flex flex-wrap justify-center gap-2">
            <ButtonLink to={paths.machines}>See the machines</ButtonLink>
            <ButtonLink look="main" to={paths.newJob}>
              Start a job
            </ButtonLink>
          </p>
        </>
      ) : (
        "An engineer or an administrator starts jobs here."
      )}
    </Empty>
  );
}
