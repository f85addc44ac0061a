import { useRef, useState, type SubmitEvent } from "react";
import type { JobRecord } from "../../../../../shared/schemas/jobs.ts";
import { signatureRequest } from "../../../../../shared/schemas/jobs.ts";
import { Button } from "../../../components/ui/button.tsx";
import { Dialog } from "../../../components/ui/dialog.tsx";
import { Failure } from "../../../components/ui/failure.tsx";
import { SectionHeading } from "../../../components/ui/section-heading.tsx";
import { TextAreaField, TextField } from "../../../components/ui/text-field.tsx";
import { checkBody, faultAt, faultsAtPointers, type PointerFaults } from "../../../lib/pointer-faults.ts";
import { textOf } from "../../../lib/read-form.ts";
import { ProblemError } from "../../../lib/service-error.ts";
import { useSignJob } from "../api/sign-job.ts";

/** The signature: only while nothing stands in the way, and with the password again. */
export function Sign({ record }: { record: JobRecord }) {
  const [asking, setAsking] = useState(false);
  const { ready, obstacles } = record.signOff;
  return (
    <section id="sign" aria-label="Signature" className="no-print">
      <SectionHeading>Signature</SectionHeading>
      <div className="flex flex-wrap items-center gap-4">
        <Button look="main" disabled={!ready} onClick={() => setAsking(true)}>
          Sign job
        </Button>
        {!ready && (
          <a className="link" href="#before-signature">
            {obstacles.length} {obstacles.length === 1 ? "point is" : "points are"} open
          </a>
        )}
      </div>
      {asking && (
        <Dialog title="Sign this job?" onDismiss={() => setAsking(false)}>
          <SignForm job={record.id} onDone={() => setAsking(false)} />
        </Dialog>
      )}
    </section>
  );
}

function SignForm({ job, onDone }: { job: string; onDone: () => void }) {
  const form = useRef<HTMLFormElement>(null);
  const [faults, setFaults] = useState<PointerFaults>({});
  const read = () => {
    const data = new FormData(form.current ?? undefined);
    return { password: textOf(data, "password"), meaning: textOf(data, "meaning") };
  };
  const sign = useSignJob(job, read);
  const submit = (event: SubmitEvent<HTMLFormElement>): void => {
    event.preventDefault();
    if (sign.isPending) return;
    const { faults: found } = checkBody(signatureRequest, read());
    setFaults(found ?? {});
    if (found) return;
    sign.mutate(undefined, {
      onSuccess: onDone,
      onError: (error) => {
        setFaults(faultsAtPointers(error));
        if (isWrongPassword(error))
          form.current?.querySelector<HTMLInputElement>("[type=password]")?.select();
      },
    });
  };
  return (
    <form ref={form} onSubmit={submit} noValidate className="grid gap-4">
      <p>
        The record is closed with a hash over every entry. It changes no more; a correction needs a new
        revision with a reason.
      </p>
      <TextAreaField
        label="What your signature says"
        name="meaning"
        hint="As “As-left condition reviewed and accepted.”"
        error={faultAt(faults, "/meaning")}
        data-first-focus
      />
      <TextField
        label="Your password"
        name="password"
        type="password"
        autoComplete="current-password"
        error={faultAt(faults, "/password")}
      />
      {isWrongPassword(sign.error) && (
        <p role="alert" className="font-semibold text-signal">
          The job is not signed. Type your own password again.
        </p>
      )}
      {sign.isError && !isWrongPassword(sign.error) && (
        <Failure error={sign.error} what="The job is not signed.">
          {sign.error instanceof ProblemError && (
            <ul className="mt-2 grid gap-1">
              {(sign.error.problem.obstacles ?? []).map(({ detail }) => (
                <li key={detail}>{detail}</li>
              ))}
            </ul>
          )}
        </Failure>
      )}
      <div className="flex flex-wrap justify-end gap-2">
        <Button onClick={onDone}>Do not sign</Button>
        <Button type="submit" look="grave" busy={sign.isPending}>
          Sign job
        </Button>
      </div>
    </form>
  );
}

/** Said at its field: nothing has failed, and nobody has to look up the request. */
function isWrongPassword(error: unknown): boolean {
  return error instanceof ProblemError && error.problem.code === "password_wrong";
}
