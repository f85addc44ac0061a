import { useParams } from "react-router-dom";
import { Breadcrumb } from "../../components/ui/breadcrumb.tsx";
import { Empty } from "../../components/ui/empty.tsx";
import { PageHeading } from "../../components/ui/page-heading.tsx";
import { paths } from "../../config/paths.ts";
import { useMachine } from "../../features/machines/api/get-machine.ts";
import { EditMachineForm } from "../../features/machines/components/edit-machine-form.tsx";
import { MachineStates } from "../../features/machines/components/machine-states.tsx";
import { useMay } from "../../lib/use-session.ts";

export function EditMachinePage() {
  const { id = "" } = useParams();
  const mayWrite = useMay("machines:write");
  const machine = useMachine(id);
  return (
    <>
      <Breadcrumb
        steps={[
          { to: paths.machines, words: "Machines" },
          { to: paths.machine(id), words: machine.data?.name ?? "Machine" },
        ]}
      />
      <PageHeading
        title={machine.data ? `Change ${machine.data.name}` : "Change a machine"}
        lead="Stored as a new revision. Jobs keep the revision they started with."
      />
      {mayWrite ? (
        <MachineStates machine={machine}>
          {(read) => <EditMachineForm key={read.id} machine={read} />}
        </MachineStates>
      ) : (
        <Empty title="Your role reads machines">Engineers and administrators change them.</Empty>
      )}
    </>
  );
}
