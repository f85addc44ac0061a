import { useState } from "react";
import type { MachineSummary } from "../../../../../shared/schemas/machines.ts";
import { Button } from "../../../components/ui/button.tsx";
import { Dialog } from "../../../components/ui/dialog.tsx";
import { Failure } from "../../../components/ui/failure.tsx";
import { apiPaths } from "../../../config/paths.ts";
import { useChangeMachine } from "../api/change-machine.ts";

/** Puts a machine away, or back. Its jobs stay as they are. */
export function ArchiveMachine({
  machine: { id, name, archived, version },
}: {
  machine: Pick<MachineSummary, "id" | "name" | "archived" | "version">;
}) {
  const [asking, setAsking] = useState(false);
  const change = useChangeMachine();
  const close = (): void => {
    setAsking(false);
    change.reset();
  };
  const word = archived ? "Restore" : "Archive";
  return (
    <>
      <Button onClick={() => setAsking(true)} aria-label={`${word} machine ${name}`}>
        {word}
      </Button>
      {asking && (
        <Dialog title={`${word} machine “${name}”?`} onDismiss={close}>
          <p>
            {archived
              ? "It stands in the list again, and jobs can be started on it."
              : "It leaves the list and no new job starts on it. Its jobs, revisions and history stay readable."}
          </p>
          {change.isError && (
            <div className="mt-4">
              <Failure
                error={change.error}
                what={archived ? "The machine is not restored." : "The machine is not archived."}
              />
            </div>
          )}
          <div className="mt-5 flex flex-wrap justify-end gap-2">
            <Button onClick={close} autoFocus>
              {archived ? "Leave it archived" : "Keep machine"}
            </Button>
            <Button
              look="main"
              busy={change.isPending}
              onClick={() =>
                change.mutate(
                  { method: "PATCH", path: apiPaths.machine(id), body: { archived: !archived }, version },
                  { onSuccess: close },
                )
              }
            >
              {word} machine
            </Button>
          </div>
        </Dialog>
      )}
    </>
  );
}
