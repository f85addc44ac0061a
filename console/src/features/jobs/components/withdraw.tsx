import { useState } from "react";
import { withdrawalRequest } from "../../../../../shared/schemas/job-entries.ts";
import { Button } from "../../../components/ui/button.tsx";
import { Dialog } from "../../../components/ui/dialog.tsx";
import { TextAreaField } from "../../../components/ui/text-field.tsx";
import { textOf } from "../../../lib/read-form.ts";
import { EntryForm } from "./entry-form.tsx";

/** Takes back an entry made by mistake, with a reason. It stays in the log. */
export function Withdraw({ job, entry, what }: { job: string; entry: string; what: string }) {
  const [asking, setAsking] = useState(false);
  return (
    <>
      <Button aria-label={`Withdraw ${what}`} onClick={() => setAsking(true)}>
        Withdraw
      </Button>
      {asking && (
        <Dialog title={`Withdraw ${what}?`} onDismiss={() => setAsking(false)}>
          <p className="mb-4">It stays in the log, struck, and counts no more.</p>
          <EntryForm
            job={job}
            part={`entries/${encodeURIComponent(entry)}/withdrawal`}
            schema={withdrawalRequest}
            read={(data) => ({ reason: textOf(data, "reason") })}
            fields={["/reason"]}
            button="Withdraw entry"
            failed="The entry was not withdrawn."
            onAdded={() => setAsking(false)}
          >
            {(fault) => (
              <TextAreaField label="Reason" name="reason" error={fault("/reason")} data-first-focus />
            )}
          </EntryForm>
          <div className="mt-3">
            <Button onClick={() => setAsking(false)}>Keep entry</Button>
          </div>
        </Dialog>
      )}
    </>
  );
}
