import { useState } from "react";
import type { JobRecord } from "../../../../../shared/schemas/jobs.ts";
import { Button } from "../../../components/ui/button.tsx";
import { Disclosure } from "../../../components/ui/disclosure.tsx";
import { Failure } from "../../../components/ui/failure.tsx";
import { JsonDocument } from "../../../components/ui/json-document.tsx";
import { SectionHeading } from "../../../components/ui/section-heading.tsx";
import { apiPaths } from "../../../config/paths.ts";
import { ProblemError } from "../../../lib/service-error.ts";
import { useDraftText } from "../../../lib/use-draft-text.ts";
import { writeJson } from "../../../lib/write-json.ts";
import { useChangeJob } from "../api/change-job.ts";
import { detailFields } from "./detail-fields.ts";

/** Who, with what, and how the axis is set. */
export function JobDetails({ record, mayAct }: { record: JobRecord; mayAct: boolean }) {
  return (
    <section id="details" aria-label="Details" className="sheet-stack">
      <SectionHeading>Details</SectionHeading>
      <dl className="grid gap-x-8 gap-y-2 sm:grid-cols-2">
        {detailFields(record).map(({ name, value }) => (
          <div key={name} className="min-w-0">
            <dt className="field-name">{name}</dt>
            <dd className="break-words whitespace-pre-line">{value}</dd>
          </div>
        ))}
      </dl>
      {mayAct && (
        <Disclosure title="Change the details">
          <EditDetails record={record} />
        </Disclosure>
      )}
    </section>
  );
}

function EditDetails({ record }: { record: JobRecord }) {
  // Begun from what was read when it was opened: the version sent must be that of the text it was written over.
  const [base, setBase] = useState({ version: record.version, details: record.details });
  const [sent, setSent] = useState("");
  const draft = useDraftText(`job.${record.id}.details`, writeJson(base.details));
  const change = useChangeJob();
  const isStale = change.error instanceof ProblemError && change.error.problem.code === "version_stale";
  const save = (text: string, version: number): void => {
    setSent(text);
    change.mutate(
      { method: "PATCH", path: apiPaths.job(record.id), bodyText: `{"details":${text}}`, version },
      {
        onSuccess: (changed) => {
          draft.restore();
          setBase({ version: changed.version, details: changed.details });
        },
      },
    );
  };
  const problem = change.error instanceof ProblemError ? change.error.problem : null;
  return (
    <JsonDocument
      label="Details, JSON"
      text={draft.text}
      onChange={draft.change}
      busy={change.isPending}
      refusal={problem && { problem: { ...problem, errors: withinDetails(problem.errors) }, text: sent }}
      onSend={(text) => save(text, base.version)}
    >
      {change.isError && (
        <Failure error={change.error} what="The details were not changed.">
          {isStale && (
            <p className="mt-2">
              Somebody added to the job meanwhile. Its details are now shown above; your text is kept.{" "}
              <Button onClick={() => save(draft.text, record.version)}>Change them all the same</Button>
            </p>
          )}
        </Failure>
      )}
      <div className="flex flex-wrap gap-2">
        <Button look="main" busy={change.isPending} type="submit">
          Change details
        </Button>
        {draft.isEdited && <Button onClick={draft.restore}>Put back</Button>}
      </div>
    </JsonDocument>
  );
}

type Faults = NonNullable<ProblemError["problem"]["errors"]>;

function withinDetails(faults: Faults = []): Faults {
  return faults.map((fault) => ({ ...fault, pointer: (fault.pointer ?? "").replace(/^\/details/, "") }));
}
