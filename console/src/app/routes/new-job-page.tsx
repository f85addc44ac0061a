import { useSearchParams } from "react-router-dom";
import { Breadcrumb } from "../../components/ui/breadcrumb.tsx";
import { ButtonLink } from "../../components/ui/button.tsx";
import { Empty } from "../../components/ui/empty.tsx";
import { Failure } from "../../components/ui/failure.tsx";
import { PageHeading } from "../../components/ui/page-heading.tsx";
import { SelectField } from "../../components/ui/select-field.tsx";
import { Skeleton } from "../../components/ui/skeleton.tsx";
import { paths } from "../../config/paths.ts";
import { StartJobForm } from "../../features/jobs/components/start-job-form.tsx";
import { useMachine } from "../../features/machines/api/get-machine.ts";
import { useMachineChoices } from "../../features/machines/api/list-machines.ts";
import { useMay } from "../../lib/use-session.ts";

export function NewJobPage() {
  const mayWrite = useMay("jobs:write");
  return (
    <>
      <Breadcrumb steps={[{ to: paths.jobs, words: "Jobs" }]} />
      <PageHeading
        title="Start a job"
        lead="A job keeps the machine's revision of today: later changes of the machine leave it alone."
      />
      {mayWrite ? (
        <ChooseMachine />
      ) : (
        <Empty title="Your role reads jobs">Engineers and administrators start them.</Empty>
      )}
    </>
  );
}

function ChooseMachine() {
  const [search, setSearch] = useSearchParams();
  const machines = useMachineChoices();
  const chosen = search.get("machine") ?? machines.data?.data[0]?.id ?? "";
  const machine = useMachine(chosen);
  if (machines.isPending) return <Skeleton what="the machines" />;
  if (machines.isError) {
    return (
      <Failure
        error={machines.error}
        what="The machines could not be read."
        onRetry={() => void machines.refetch()}
      />
    );
  }
  if (machines.data.data.length === 0 && chosen === "") {
    return (
      <Empty title="No machine is described yet">
        A job needs a machine: its bores along z and the parts that carry them.
        <p className="mt-4">
          <ButtonLink look="main" to={paths.newMachine}>
            Describe a machine
          </ButtonLink>
        </p>
      </Empty>
    );
  }
  return (
    <div className="grid max-w-3xl gap-6">
      <SelectField
        label="Machine"
        value={chosen}
        options={machines.data.data.map(({ id, name, revision }) => ({
          value: id,
          words: `${name}, revision ${revision}`,
        }))}
        onChange={(event) => setSearch({ machine: event.target.value }, { replace: true })}
      />
      {machine.data ? (
        <StartJobForm key={machine.data.id} machine={machine.data} />
      ) : machine.isError ? (
        <Failure
          error={machine.error}
          what="The machine could not be read."
          onRetry={() => void machine.refetch()}
        />
      ) : (
        <Skeleton what="the machine" />
      )}
    </div>
  );
}
