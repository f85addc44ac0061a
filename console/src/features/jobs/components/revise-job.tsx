import { useState, type SubmitEvent } from "react";
import { reviseJobRequest } from "../../../../../shared/schemas/jobs.ts";
import { Button } from "../../../components/ui/button.tsx";
import { Dialog } from "../../../components/ui/dialog.tsx";
import { Failure } from "../../../components/ui/failure.tsx";
import { TextAreaField } from "../../../components/ui/text-field.tsx";
import { apiPaths } from "../../../config/paths.ts";
import { checkBody, faultAt, faultsAtPointers, type PointerFaults } from "../../../lib/pointer-faults.ts";
import { textOf } from "../../../lib/read-form.ts";
import { useChangeJob } from "../api/change-job.ts";

/** Opens a signed job again as its next revision. The signed one stays readable. */
export function ReviseJob({ job }: { job: string }) {
  const [asking, setAsking] = useState(false);
  const [faults, setFaults] = useState<PointerFaults>({});
  const change = useChangeJob();
  const submit = (event: SubmitEvent<HTMLFormElement>): void => {
    event.preventDefault();
    if (change.isPending) return;
    const checked = checkBody(reviseJobRequest, {
      reason: textOf(new FormData(event.currentTarget), "reason"),
    });
    setFaults(checked.faults ?? {});
    if (checked.faults) return;
    change.mutate(
      { path: `${apiPaths.job(job)}/revisions`, body: checked.body },
      { onSuccess: () => setAsking(false), onError: (error) => setFaults(faultsAtPointers(error)) },
    );
  };
  return (
    <>
      <Button onClick={() => setAsking(true)}>Open a new revision</Button>
      {asking && (
        <Dialog title="Open a new revision?" onDismiss={() => setAsking(false)}>
          <form onSubmit={submit} noValidate className="grid gap-4">
            <p>The job can be changed again, and signed again. The signed revision stays as it is.</p>
            <TextAreaField label="Reason" name="reason" error={faultAt(faults, "/reason")} data-first-focus />
            {change.isError && <Failure error={change.error} what="No revision was opened." />}
            <div className="flex flex-wrap justify-end gap-2">
              <Button onClick={() => setAsking(false)}>Leave it signed</Button>
              <Button type="submit" look="main" busy={change.isPending}>
                Open revision
              </Button>
            </div>
          </form>
        </Dialog>
      )}
    </>
  );
}
