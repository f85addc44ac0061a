import { useRef, useState, type ReactNode, type SubmitEvent } from "react";
import type { z } from "zod";
import { Button } from "../../../components/ui/button.tsx";
import { Failure } from "../../../components/ui/failure.tsx";
import { FaultList } from "../../../components/ui/fault-list.tsx";
import { apiPaths } from "../../../config/paths.ts";
import {
  checkBody,
  faultAt,
  faultsAtPointers,
  faultsElsewhere,
  type PointerFaults,
} from "../../../lib/pointer-faults.ts";
import { useAddToJob } from "../api/add-to-job.ts";

interface EntryFormProps {
  job: string;
  /** What the entry is added to, under the job's address: "comments". */
  part: string;
  /** The service's own. */
  schema: z.ZodType;
  /** The body, from what was typed. */
  read: (data: FormData) => unknown;
  button: string;
  /** What is so when it fails: "The comment was not added." */
  failed: string;
  /** Pointers that have a field of their own here. */
  fields: readonly string[];
  onAdded?: (ids: readonly string[]) => void;
  /** The fields; each is told the fault at its pointer. The error tells what the service asks for beyond them. */
  children: (fault: (pointer: string) => string | undefined, error: unknown) => ReactNode;
}

/** A form that adds one entry to a job's log. What was typed stays until the service has taken it. */
export function EntryForm({
  job,
  part,
  schema,
  read,
  button,
  failed,
  fields,
  onAdded,
  children,
}: EntryFormProps) {
  const [faults, setFaults] = useState<PointerFaults>({});
  const form = useRef<HTMLFormElement>(null);
  const add = useAddToJob();
  const submit = (event: SubmitEvent<HTMLFormElement>): void => {
    event.preventDefault();
    if (add.isPending) return;
    const checked = checkBody(schema, read(new FormData(event.currentTarget)));
    setFaults(checked.faults ?? {});
    if (checked.faults) return focusFirstFault(form.current);
    add.mutate(
      { path: `${apiPaths.job(job)}/${part}`, body: checked.body },
      {
        onSuccess: ({ ids }) => {
          form.current?.reset();
          onAdded?.(ids);
        },
        onError: (error) => setFaults(faultsAtPointers(error)),
      },
    );
  };
  return (
    <form ref={form} onSubmit={submit} noValidate className="grid max-w-3xl gap-4">
      {children((pointer) => faultAt(faults, pointer), add.error)}
      {add.isError && (
        <Failure error={add.error} what={failed}>
          <FaultList faults={faultsElsewhere(add.error, fields)} />
        </Failure>
      )}
      <UnplacedFaults faults={faults} fields={fields} hidden={add.isError} />
      <div>
        <Button type="submit" look="main" busy={add.isPending}>
          {button}
        </Button>
      </div>
    </form>
  );
}

/** What the schema says of members that have no field here: better said than swallowed. */
function UnplacedFaults({
  faults,
  fields,
  hidden,
}: {
  faults: PointerFaults;
  fields: readonly string[];
  hidden: boolean;
}) {
  const unplaced = Object.entries(faults).filter(
    ([pointer]) => !fields.some((field) => pointer === field || pointer.startsWith(`${field}/`)),
  );
  if (hidden || unplaced.length === 0) return null;
  return (
    <ul role="alert" className="text-signal">
      {unplaced.map(([pointer, words]) => (
        <li key={pointer}>
          <code>{pointer === "" ? "the whole" : pointer}</code>: {words}
        </li>
      ))}
    </ul>
  );
}

function focusFirstFault(form: HTMLFormElement | null): void {
  // The fields are marked by the time the next frame is drawn.
  requestAnimationFrame(() => form?.querySelector<HTMLElement>("[aria-invalid='true']")?.focus());
}
