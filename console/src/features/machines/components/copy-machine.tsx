import { useState, type SubmitEvent } from "react";
import { useNavigate } from "react-router-dom";
import { limits } from "../../../../../shared/limits.ts";
import { copyMachineRequest, type Machine } from "../../../../../shared/schemas/machines.ts";
import { Button } from "../../../components/ui/button.tsx";
import { Dialog } from "../../../components/ui/dialog.tsx";
import { Failure } from "../../../components/ui/failure.tsx";
import { TextField } from "../../../components/ui/text-field.tsx";
import { apiPaths, paths } from "../../../config/paths.ts";
import { checkBody, faultAt, faultsAtPointers, type PointerFaults } from "../../../lib/pointer-faults.ts";
import { textOf } from "../../../lib/read-form.ts";
import { useChangeMachine } from "../api/change-machine.ts";

/** The newest revision under another name, for a sister unit. */
export function CopyMachine({ machine }: { machine: Machine }) {
  const [asking, setAsking] = useState(false);
  const [faults, setFaults] = useState<PointerFaults>({});
  const navigate = useNavigate();
  const change = useChangeMachine();
  const submit = (event: SubmitEvent<HTMLFormElement>): void => {
    event.preventDefault();
    if (change.isPending) return;
    const checked = checkBody(copyMachineRequest, {
      name: textOf(new FormData(event.currentTarget), "name"),
    });
    setFaults(checked.faults ?? {});
    if (checked.faults) return;
    change.mutate(
      { path: `${apiPaths.machine(machine.id)}/copies`, body: checked.body },
      {
        onSuccess: ({ id }) => {
          setAsking(false);
          void navigate(paths.machine(id));
        },
        onError: (error) => setFaults(faultsAtPointers(error)),
      },
    );
  };
  return (
    <>
      <Button onClick={() => setAsking(true)}>Copy machine</Button>
      {asking && (
        <Dialog title={`Copy machine “${machine.name}”`} onDismiss={() => setAsking(false)}>
          <form onSubmit={submit} noValidate className="grid gap-4">
            <TextField
              label="Name of the copy"
              name="name"
              hint="As “Unit 3”. It begins with revision 1, and without a plant tag."
              maxLength={limits.nameLength}
              error={faultAt(faults, "/name")}
              data-first-focus
            />
            {change.isError && <Failure error={change.error} what="The machine was not copied." />}
            <div className="flex flex-wrap justify-end gap-2">
              <Button onClick={() => setAsking(false)}>Cancel</Button>
              <Button type="submit" look="main" busy={change.isPending}>
                Copy machine
              </Button>
            </div>
          </form>
        </Dialog>
      )}
    </>
  );
}
