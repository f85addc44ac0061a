import { useRef, useState, type SubmitEvent } from "react";
import { limits } from "../../../../../shared/limits.ts";
import type { JobRecord } from "../../../../../shared/schemas/jobs.ts";
import { Button } from "../../../components/ui/button.tsx";
import { CopyButton } from "../../../components/ui/copy-button.tsx";
import { DataTable, type DataColumn } from "../../../components/ui/data-table.tsx";
import { Disclosure } from "../../../components/ui/disclosure.tsx";
import { DownloadButton } from "../../../components/ui/download-button.tsx";
import { Failure } from "../../../components/ui/failure.tsx";
import { Field } from "../../../components/ui/field.tsx";
import { Instant } from "../../../components/ui/instant.tsx";
import { SectionHeading } from "../../../components/ui/section-heading.tsx";
import { TextField } from "../../../components/ui/text-field.tsx";
import { apiPaths } from "../../../config/paths.ts";
import { textOf } from "../../../lib/read-form.ts";
import { useAddToJob } from "../api/add-to-job.ts";
import { authorName } from "./job-words.ts";
import { Withdraw } from "./withdraw.tsx";

type Attachment = JobRecord["attachments"][number];
const mediaTypes = ["image/jpeg", "image/png", "application/pdf"];
const bytesPerMebibyte = 1024 * 1024;

/** Photographs and certificates, each by its hash. */
export function Attachments({ record, mayAct }: { record: JobRecord; mayAct: boolean }) {
  return (
    <section id="attachments" aria-label="Attachments" className="sheet-stack">
      <SectionHeading>Attachments</SectionHeading>
      {record.attachments.length === 0 ? (
        <p className="text-muted">None.</p>
      ) : (
        <DataTable
          caption="Attachments"
          columns={columnsOf(record.id, mayAct)}
          rows={record.attachments}
          rowKey={({ id }) => id}
        />
      )}
      {mayAct && (
        <Disclosure title="Attach a file">
          <AttachFile job={record.id} />
        </Disclosure>
      )}
    </section>
  );
}

function columnsOf(job: string, mayAct: boolean): DataColumn<Attachment>[] {
  return [
    {
      heading: "file",
      lead: true,
      cell: ({ name, caption }) => (
        <>
          <span className="font-semibold break-all">{name}</span>
          {caption !== null && <span className="block">{caption}</span>}
        </>
      ),
    },
    { heading: "kind", cell: ({ mediaType }) => mediaType },
    {
      heading: "size",
      align: "end",
      cell: ({ bytes }) => <span className="whitespace-nowrap">{bytes} bytes</span>,
    },
    {
      heading: "sha256",
      cell: ({ sha256, name }) => (
        <span className="flex items-center gap-2">
          <span className="text-xs break-all">{sha256}</span>
          <CopyButton text={sha256} what={`hash of ${name}`} />
        </span>
      ),
    },
    { heading: "by", cell: ({ author }) => authorName(author) },
    { heading: "attached", cell: ({ createdAt }) => <Instant at={createdAt} /> },
    {
      heading: "action",
      align: "end",
      cell: ({ id, file, name }) => (
        <span className="no-print inline-flex flex-wrap gap-2">
          <DownloadButton
            path={`${apiPaths.job(job)}/files/${encodeURIComponent(file)}`}
            fileName={name}
            label={`Download ${name}`}
          >
            Download
          </DownloadButton>
          {mayAct && <Withdraw job={job} entry={id} what={`attachment ${name}`} />}
        </span>
      ),
    },
  ];
}

function AttachFile({ job }: { job: string }) {
  const form = useRef<HTMLFormElement>(null);
  const [wrong, setWrong] = useState<string>();
  const add = useAddToJob();
  const submit = (event: SubmitEvent<HTMLFormElement>): void => {
    event.preventDefault();
    if (add.isPending) return;
    const data = new FormData(event.currentTarget);
    const file = data.get("file");
    const fault = file instanceof File ? faultOf(file) : "Choose a file.";
    setWrong(fault);
    if (!(file instanceof File) || fault !== undefined) return;
    const query = new URLSearchParams({ name: file.name });
    const caption = textOf(data, "caption").trim();
    if (caption !== "") query.set("caption", caption);
    add.mutate(
      {
        path: `${apiPaths.job(job)}/attachments?${query.toString()}`,
        file: { content: file, mediaType: file.type, name: file.name },
      },
      { onSuccess: () => form.current?.reset() },
    );
  };
  return (
    <form ref={form} onSubmit={submit} noValidate className="grid max-w-3xl gap-4">
      <Field
        label="File"
        hint={`JPEG, PNG or PDF, at most ${limits.attachmentBytes / bytesPerMebibyte} MiB.`}
        error={wrong}
      >
        {(attributes) => (
          <input {...attributes} type="file" name="file" accept={mediaTypes.join(",")} className="control" />
        )}
      </Field>
      <TextField label="What it shows" name="caption" maxLength={limits.nameLength} />
      {add.isError && <Failure error={add.error} what="The file was not attached." />}
      <div>
        <Button type="submit" look="main" busy={add.isPending}>
          Attach file
        </Button>
      </div>
    </form>
  );
}

function faultOf(file: File): string | undefined {
  if (file.size === 0) return "Choose a file that is not empty.";
  if (!mediaTypes.includes(file.type)) return "Only JPEG, PNG and PDF are taken.";
  if (file.size > limits.attachmentBytes) return "The file is too large.";
  return undefined;
}
